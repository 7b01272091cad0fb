import { useState } from "react";
import type { StandingEnd } from "../../../../shared/contracts/follow-up.ts";
import { Button } from "../../../components/ui/button.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { endWords } from "../../../lib/words.ts";
import { useReopenFollowUp } from "../api/end-follow-up.ts";

export type ReopenFollowUpProps = {
  investigationId: string;
  person: { id: string; called: string };
  end: Pick<StandingEnd, "id" | "reason" | "day">;
};

/** Takes the end of a follow-up back, after a question. */
export function ReopenFollowUp({ investigationId, person, end }: ReopenFollowUpProps) {
  const [open, setOpen] = useState(false);
  const reopen = useReopenFollowUp(investigationId, person.id);
  const toast = useToast();
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>
        reopen
      </Button>
      <ConfirmDialog
        open={open}
        onOpenChange={setOpen}
        title={`Reopen the follow-up of ${person.called}`}
        description={`It was ended on ${formatDay(end.day)}: ${endWords[end.reason]}. That stays on record as taken back, and checks are due again.`}
        confirmLabel="Reopen"
        pending={reopen.isPending}
        onConfirm={() =>
          reopen.mutate(end.id, {
            onSuccess() {
              setOpen(false);
              toast({ text: `${person.called}: follow-up is open again`, tone: "done" });
            },
          })
        }
      >
        {reopen.isError ? (
          <Notice tone="error" title="Not reopened." className="mt-3">
            {errorWords(reopen.error)}.
          </Notice>
        ) : null}
      </ConfirmDialog>
    </>
  );
}
