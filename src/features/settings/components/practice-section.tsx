import { useState } from "react";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { useSession } from "../../../lib/session-context.ts";
import { useResetPractice } from "../api/reset-practice.ts";

export type PracticeSectionProps = { investigationId: string; name: string };

/** What practising means, and the way to start over. */
export function PracticeSection({ investigationId, name }: PracticeSectionProps) {
  const { actingRole } = useSession();
  const [asking, setAsking] = useState(false);
  const toast = useToast();
  const reset = useResetPractice(investigationId);
  return (
    <Section title="To practise with">
      <p>
        Everything here is invented. It may be emptied at any time, sends nothing, and counts
        nowhere.
      </p>
      {actingRole === "supervisor" ? (
        <p className="mt-3">
          <Button variant="danger" onClick={() => setAsking(true)}>
            Empty and fill anew
          </Button>
        </p>
      ) : (
        <p className="mt-1 text-sm text-ink-2">A supervisor can empty it and fill it anew.</p>
      )}
      <ConfirmDialog
        open={asking}
        onOpenChange={(open) => {
          setAsking(open);
          if (!open) reset.reset();
        }}
        title={`Empty ${name} and fill it anew?`}
        description="All people, contact pairs, interviews, checks and files of this practice investigation are deleted, also what others are typing now. Invented people take their place. Members and settings stay. This cannot be undone."
        confirmLabel="Empty and fill anew"
        danger
        pending={reset.isPending}
        onConfirm={() =>
          reset.mutate(undefined, {
            onSuccess() {
              setAsking(false);
              toast({ tone: "done", text: "Emptied and filled anew." });
            },
          })
        }
      >
        {reset.isError ? (
          <Notice tone="error" title="Not emptied.">
            {errorWords(reset.error)}.
          </Notice>
        ) : null}
      </ConfirmDialog>
    </Section>
  );
}
