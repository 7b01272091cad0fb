import { useState } from "react";
import { TextField } from "../../../components/fields/text-field.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/field-words.ts";
import { useResetPractice } from "../api/reset-practice.ts";
import type { PracticeSectionProps } from "./practice-section.tsx";

/** Asks before everything is deleted; the name is typed, so that no wrong window is emptied. */
export function ResetPracticeDialog({
  investigationId,
  name,
  version,
  onClose,
}: PracticeSectionProps & { onClose: () => void }) {
  const [typed, setTyped] = useState("");
  const [differs, setDiffers] = useState(false);
  const toast = useToast();
  const reset = useResetPractice(investigationId);
  const { error } = reset;
  const beside =
    error instanceof ApiError ? error.errors.find(({ path }) => path === "name") : null;

  function confirm() {
    if (typed.trim() !== name) {
      setDiffers(true);
      return;
    }
    reset.mutate(
      { version, name: typed },
      {
        onSuccess() {
          toast({ tone: "done", text: "Emptied and filled anew." });
          onClose();
        },
      },
    );
  }

  return (
    <ConfirmDialog
      open
      onOpenChange={onClose}
      title={`Empty ${name} and fill it anew?`}
      description="All people, contact pairs, interviews, checks and files of this practice investigation are deleted, also what others are typing now. Invented people take their place. Members and settings stay. This cannot be undone."
      confirmLabel="Empty and fill anew"
      danger
      pending={reset.isPending}
      onConfirm={confirm}
    >
      {error && !beside ? (
        <Notice tone="error" title="Not emptied." className="mb-3">
          {errorWords(error)}.
        </Notice>
      ) : null}
      <TextField
        label="Name of the investigation, to confirm"
        hint={`Type ${name}.`}
        value={typed}
        error={fieldWords(differs ? "name_differs" : beside?.code)}
        onChange={(event) => {
          setTyped(event.target.value);
          setDiffers(false);
        }}
        onKeyDown={(event) => {
          if (event.key === "Enter") confirm();
        }}
      />
    </ConfirmDialog>
  );
}
