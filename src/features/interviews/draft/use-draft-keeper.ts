import { useEffect, useState, useSyncExternalStore } from "react";
import type { Draft } from "../../../../shared/contracts/interviews.ts";
import { getDraft, putDraft } from "../api/interview-api.ts";
import { DraftKeeper, type DraftState } from "./draft-keeper.ts";

/** Keeps the draft of one interview for as long as its page is open. */
export function useDraftKeeper(
  investigationId: string,
  personId: string,
  stored: Draft,
): [DraftKeeper, DraftState] {
  const [keeper] = useState(
    () =>
      new DraftKeeper({
        version: stored.version,
        savedAt: stored.updatedAt,
        save: (version, body) => putDraft(investigationId, personId, version, body),
        load: () => getDraft(investigationId, personId),
      }),
  );
  useEffect(() => {
    // A phone that goes into the pocket may never come back to this page.
    const hidden = () => {
      if (document.visibilityState === "hidden") keeper.flush();
    };
    window.addEventListener("online", keeper.reconnect);
    document.addEventListener("visibilitychange", hidden);
    return () => {
      window.removeEventListener("online", keeper.reconnect);
      document.removeEventListener("visibilitychange", hidden);
      // A page left while saving fails was left knowingly: see the question that guards it.
      const { kind } = keeper.state();
      if (kind === "failed" || kind === "conflict") keeper.finish();
      else keeper.flush();
    };
  }, [keeper]);
  const state = useSyncExternalStore(keeper.subscribe, keeper.state);
  // Going elsewhere in the application sends what waits; closing the tab would cut that short.
  const underWay = state.kind === "waiting" || state.kind === "saving";
  useEffect(() => {
    if (!underWay) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [underWay]);
  return [keeper, state];
}
