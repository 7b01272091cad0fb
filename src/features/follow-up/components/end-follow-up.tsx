import { useState } from "react";
import { FOLLOW_ENDS, type FollowEnd } from "../../../../shared/vocabulary.ts";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/form-errors.ts";
import { endWords } from "../../../lib/words.ts";
import { useEndFollowUp } from "../api/end-follow-up.ts";

const options = FOLLOW_ENDS.map((value) => ({ value, label: endWords[value] }));

const explained: Readonly<Record<FollowEnd, string>> = {
  refused: "They are not called again. The checks made so far stay on record.",
  moved: "Somebody else follows them now. The checks made so far stay on record.",
  died: "This fills no other date: the day of death is recorded on the person's page.",
  not_a_contact:
    "They were listed by mistake. Their exposures stay on record until these are taken back.",
};

export type EndFollowUpProps = {
  investigationId: string;
  person: { id: string; called: string };
  today: string;
};

/** What no check can tell, asked in two steps so that no slip of a thumb ends a follow-up. */
export function EndFollowUp({ investigationId, person, today }: EndFollowUpProps) {
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState<FollowEnd | null>(null);
  const [day, setDay] = useState(today);
  const [missing, setMissing] = useState(false);
  const end = useEndFollowUp(investigationId, person.id);
  const toast = useToast();

  function change(next: boolean) {
    setOpen(next);
    if (!next) return;
    setReason(null);
    setDay(today);
    setMissing(false);
    end.reset();
  }

  function confirm() {
    if (reason === null) {
      setMissing(true);
      return;
    }
    end.mutate(
      { reason, ...(day !== "" && day !== today ? { day } : {}) },
      {
        onSuccess() {
          setOpen(false);
          toast({ text: `${person.called}: follow-up ended, ${endWords[reason]}`, tone: "done" });
        },
      },
    );
  }

  const errors = end.error instanceof ApiError ? end.error.errors : [];
  const dayError = errors.find(({ path }) => path === "day");
  const other = errors.find(({ path }) => path !== "day");
  return (
    <>
      <Button size="small" variant="plain" onClick={() => change(true)}>
        end follow-up
      </Button>
      <ConfirmDialog
        open={open}
        onOpenChange={change}
        title={`End the follow-up of ${person.called}`}
        description="For what no check can tell. It leaves those due and can be reopened; the history is kept."
        confirmLabel="End follow-up"
        pending={end.isPending}
        onConfirm={confirm}
      >
        <RadioRow
          label="Why"
          name={`end-${person.id}`}
          options={options}
          value={reason ?? ""}
          error={missing && reason === null ? "Needed" : undefined}
          onChange={(event) =>
            setReason(FOLLOW_ENDS.find((one) => one === event.target.value) ?? null)
          }
        />
        {reason ? <p className="mt-1 text-sm text-ink-2">{explained[reason]}</p> : null}
        <TextField
          label="Day it ended"
          type="date"
          max={today}
          className="mt-3"
          value={day}
          error={dayError ? (fieldWords(dayError.code) ?? "Not a day") : undefined}
          onChange={(event) => setDay(event.target.value)}
        />
        {end.isError && !dayError ? (
          <Notice tone="error" title="Not ended." className="mt-3">
            {(other ? fieldWords(other.code) : undefined) ?? errorWords(end.error)}.
          </Notice>
        ) : null}
      </ConfirmDialog>
    </>
  );
}
