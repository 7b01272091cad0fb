import { useEffect, useState } from "react";
import { useUnsavedWarning } from "../../lib/use-unsaved-warning.ts";
import type { ConfirmDialog } from "./confirm-dialog.tsx";

export type UnsavedGuardProps = {
  /** There is typed text that is not saved anywhere yet. */
  unsaved: boolean;
  /** What would be lost. */
  description?: string;
};

const title = "Leave without saving?";

/**
 * Asks before a page with unsaved text is left. The dialog is fetched once somebody types, so that
 * it is no part of a page's first load; should that fail, the browser's own question stands in.
 */
export function UnsavedGuard({
  unsaved,
  description = "What you typed on this page is not saved yet. Leaving drops it.",
}: UnsavedGuardProps) {
  const blocker = useUnsavedWarning(unsaved);
  const [Ask, setAsk] = useState<{ dialog: typeof ConfirmDialog } | null>(null);

  useEffect(() => {
    if (!unsaved || Ask) return;
    import("./confirm-dialog.tsx").then(
      (file) => setAsk({ dialog: file.ConfirmDialog }),
      () => {},
    );
  }, [unsaved, Ask]);

  useEffect(() => {
    if (blocker.state !== "blocked" || Ask) return;
    if (window.confirm(`${title} ${description}`)) blocker.proceed();
    else blocker.reset();
  }, [blocker, Ask, description]);

  if (!Ask) return null;
  return (
    <Ask.dialog
      open={blocker.state === "blocked"}
      onOpenChange={(open) => {
        if (!open) blocker.reset?.();
      }}
      title={title}
      description={description}
      confirmLabel="Leave and drop it"
      cancelLabel="Stay here"
      danger
      onConfirm={() => blocker.proceed?.()}
    />
  );
}
