import { errorWords } from "../../../lib/api-error.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import type { DraftState } from "../draft/draft-keeper.ts";

export type DraftLineProps = { state: DraftState; zone: string };

/** Where the typed text stands, in one line; only what needs attention is read out. */
export function DraftLine({ state, zone }: DraftLineProps) {
  const failed = state.kind === "failed" || state.kind === "conflict";
  return (
    <p className={`text-sm ${failed ? "font-bold text-coral" : "text-ink-2"}`}>
      <span data-draft-state={state.kind}>{draftWords(state, zone)}</span>
      <span className="sr-only" role="status">
        {failed ? draftWords(state, zone) : ""}
      </span>
    </p>
  );
}

/** The words of the line. */
export function draftWords(state: DraftState, zone: string): string {
  const at = state.savedAt ? formatInstant(state.savedAt, zone, { withDay: false }) : null;
  switch (state.kind) {
    case "saved":
      return at ? `Draft saved ${at}` : "Nothing to save yet";
    case "waiting":
      return at ? `Saved ${at}, then changed` : "Not saved yet";
    case "saving":
      return "Saving the draft…";
    case "conflict":
      return "Not saved: another window saved first";
    case "failed":
      return state.reason === "offline"
        ? `Not saved: ${state.error.code === "offline" ? "offline" : "no answer"}, kept here and tried again`
        : `Not saved, kept here: ${errorWords(state.error)}`;
  }
}
