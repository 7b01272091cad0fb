import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { formatInstant } from "../../../lib/formatters.ts";
import type { DraftState } from "../draft/draft-keeper.ts";
import { type DraftBody, draftSize, readDraft } from "../form/draft-body.ts";
import { counted } from "../form/words.ts";

export type DraftConflictProps = {
  state: Extract<DraftState, { kind: "conflict" }>;
  zone: string;
  /** What this window holds. */
  mine: DraftBody;
  onKeepMine: () => void;
  onTakeTheirs: (theirs: DraftBody) => void;
};

function size(draft: DraftBody): string {
  const { contacts, groups } = draftSize(draft);
  return groups > 0
    ? `${counted(contacts, "contact")} and ${counted(groups, "group")}`
    : counted(contacts, "contact");
}

/** Two windows typed into the same interview: both versions with their times, and the choice. */
export function DraftConflict({ state, zone, mine, onKeepMine, onTakeTheirs }: DraftConflictProps) {
  const theirs = readDraft(state.theirs.body);
  return (
    <Notice
      tone="error"
      title="This interview is open in another window of yours."
      actions={
        <>
          {theirs ? (
            <Button size="small" onClick={() => onTakeTheirs(theirs)}>
              Take the other version
            </Button>
          ) : null}
          <Button size="small" onClick={onKeepMine}>
            Keep what is typed here
          </Button>
        </>
      }
    >
      {theirs
        ? `The other version was saved ${formatInstant(state.theirs.updatedAt, zone)} and has ${size(theirs)}. `
        : "There the interview was recorded, or its draft dropped: look at the person's page before it is recorded twice. "}
      This one was last changed {formatInstant(new Date(state.mineAt).toISOString(), zone)} and has{" "}
      {size(mine)}. Nothing is lost until you choose.
    </Notice>
  );
}
