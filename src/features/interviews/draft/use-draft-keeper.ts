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
      keeper.flush();
    };
  }, [keeper]);
  return [keeper, useSyncExternalStore(keeper.subscribe, keeper.state)];
}
