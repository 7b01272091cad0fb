import { useUnsavedWarning } from "../../lib/use-unsaved-warning.ts";
import { ConfirmDialog } from "./confirm-dialog.tsx";

export type UnsavedGuardProps = {
  /** There is typed text that is not saved anywhere yet. */
  unsaved: boolean;
  /** What would be lost. */
  description?: string;
};

/** Asks before a page with unsaved text is left. */
export function UnsavedGuard({
  unsaved,
  description = "What you typed on this page is not saved yet. Leaving drops it.",
}: UnsavedGuardProps) {
  const blocker = useUnsavedWarning(unsaved);
  return (
    <ConfirmDialog
      open={blocker.state === "blocked"}
      onOpenChange={(open) => {
        if (!open) blocker.reset?.();
      }}
      title="Leave without saving?"
      description={description}
      confirmLabel="Leave and drop it"
      cancelLabel="Stay here"
      danger
      onConfirm={() => blocker.proceed?.()}
    />
  );
}
