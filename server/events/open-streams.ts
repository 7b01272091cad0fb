/** An open live stream: how to end it, and how to ask whether it may stay. */
export type OpenStream = {
  readonly end: () => void;
  readonly check: () => Promise<void>;
};

/** Streams of one account; opening one more ends the oldest. */
const MOST_STREAMS = 12;

const byAccount = new Map<string, Set<OpenStream>>();

/** Enters a stream of an account; returns what takes it out again. */
export function enterStream(accountId: string, stream: OpenStream): () => void {
  const streams = byAccount.get(accountId) ?? new Set<OpenStream>();
  byAccount.set(accountId, streams.add(stream));
  const [oldest] = streams;
  if (streams.size > MOST_STREAMS) oldest?.end();
  return () => {
    streams.delete(stream);
    if (streams.size === 0 && byAccount.get(accountId) === streams) byAccount.delete(accountId);
  };
}

/**
 * Asks of each stream of an account whether its session still holds; called when a session ended or
 * acts as something else, so that nothing more is heard by a session that is over.
 */
export async function checkStreamsOf(accountId: string): Promise<void> {
  await Promise.all([...(byAccount.get(accountId) ?? [])].map((stream) => stream.check()));
}
