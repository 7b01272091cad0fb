import { type QueryClient, useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import type { Topic } from "../../shared/events.ts";
import { readWelcome } from "../features/session/api/get-welcome.ts";
import { inInvestigation } from "../lib/api-client.ts";
import { investigationKey, type QueryWord } from "../lib/query-keys.ts";

/** What a live message makes stale. A message holds ids only; the pages ask again by themselves. */
export const STALE_BY_TOPIC: Readonly<Record<Topic, readonly QueryWord[]>> = {
  graph: ["groups", "network", "clusters", "investigation"],
  people: ["people", "tests", "follow-up", "match-reviews", "places", "clusters"],
  interviews: ["interviews", "people", "follow-up", "match-reviews"],
  imports: ["imports", "people", "groups", "network", "clusters"],
  members: ["members", "invitations", "teams", "people"],
  clusters: ["clusters"],
  settings: ["settings", "investigation", "network", "groups", "clusters", "people", "follow-up"],
  exports: ["exports"],
  compare: ["compare"],
};

const allTopics = Object.keys(STALE_BY_TOPIC) as Topic[];

/** Messages that come together are answered together, so that an import does not refetch in a row. */
const gatherMs = 250;
const firstPauseMs = 2_000;
const longestPauseMs = 60_000;

/** Marks what a topic touches as stale. */
export function invalidateTopic(
  queryClient: QueryClient,
  investigationId: string,
  topics: Iterable<Topic>,
): void {
  const words = new Set<QueryWord>();
  for (const topic of topics) for (const word of STALE_BY_TOPIC[topic] ?? []) words.add(word);
  for (const word of words) {
    void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
  }
}

function topicOf(text: string): Topic | null {
  try {
    const { topic } = JSON.parse(text) as { topic?: unknown };
    return typeof topic === "string" && topic in STALE_BY_TOPIC ? (topic as Topic) : null;
  } catch {
    return null;
  }
}

/** Follows the investigation's live stream for as long as the page is open. */
export function useLive(investigationId: string): void {
  const queryClient = useQueryClient();
  useEffect(() => {
    if (typeof EventSource === "undefined") return;
    let source: EventSource | null = null;
    let reopen: ReturnType<typeof setTimeout> | undefined;
    let gather: ReturnType<typeof setTimeout> | undefined;
    let pause = firstPauseMs;
    let failures = 0;
    let over = false;
    const gathered = new Set<Topic>();

    function flush() {
      gather = undefined;
      invalidateTopic(queryClient, investigationId, gathered);
      gathered.clear();
    }
    function note(topics: Iterable<Topic>) {
      for (const topic of topics) gathered.add(topic);
      gather ??= setTimeout(flush, gatherMs);
    }
    function later() {
      reopen = setTimeout(() => void tryAgain(), pause);
      pause = Math.min(longestPauseMs, pause * 2);
    }
    async function tryAgain() {
      // Asked first, because a refused stream is an error in the console and says no reason.
      const signedIn = await readWelcome().then(
        (welcome) => welcome.signedIn,
        () => false,
      );
      if (over) return;
      if (!signedIn) {
        later();
        return;
      }
      // The net under the stream: where none gets through, the pages ask every minute.
      if (failures > 1) note(allTopics);
      open();
    }
    function open() {
      const opened = new EventSource(inInvestigation(investigationId, "live"));
      source = opened;
      opened.onopen = () => {
        pause = firstPauseMs;
        // Messages may have been missed while there was no stream.
        if (failures > 0) note(allTopics);
        failures = 0;
      };
      opened.onmessage = (message: MessageEvent<string>) => {
        const topic = topicOf(message.data);
        if (topic) note([topic]);
      };
      opened.onerror = () => {
        // Reopened by ourselves: the browser would go on after a sign-out, and not after a refusal.
        opened.close();
        failures += 1;
        later();
      };
    }
    open();
    return () => {
      over = true;
      source?.close();
      clearTimeout(reopen);
      clearTimeout(gather);
    };
  }, [queryClient, investigationId]);
}
