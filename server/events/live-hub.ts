import type { Topic } from "../../shared/events.ts";

/** What a browser is told: ids and versions only; it refetches through policy and presenter. */
export type LiveMessage = {
  readonly topic: Topic;
  readonly id: string | null;
  /** Graph version, for the topic `graph`. */
  readonly version: number | null;
};

type Listener = {
  readonly tell: (message: LiveMessage) => void;
  readonly end: () => void;
};

/** Carries messages from the dispatcher to the open live streams of this process. */
export type LiveHub = {
  /**
   * Adds a stream of an investigation.
   * @param listener `tell` gets each message, `end` is called when the server stops
   * @returns call it when the stream is closed
   */
  subscribe(investigationId: string, listener: Listener): () => void;
  publish(investigationId: string, message: LiveMessage): void;
  /** Ends all streams; later subscriptions end at once. */
  close(): void;
};

export function createLiveHub(): LiveHub {
  const streams = new Map<string, Set<Listener>>();
  let closed = false;
  return {
    subscribe(investigationId, listener) {
      if (closed) {
        listener.end();
        return () => {};
      }
      const all = streams.get(investigationId) ?? new Set<Listener>();
      streams.set(investigationId, all.add(listener));
      return () => {
        all.delete(listener);
        if (all.size === 0 && streams.get(investigationId) === all) streams.delete(investigationId);
      };
    },
    publish(investigationId, message) {
      for (const { tell } of streams.get(investigationId) ?? []) tell(message);
    },
    close() {
      closed = true;
      for (const all of streams.values()) for (const { end } of [...all]) end();
      streams.clear();
    },
  };
}
