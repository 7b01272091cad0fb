import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";

export type ActsElsewhereProps = { onLater: () => void };

/** Another tab of this browser changed the acting role; this page still shows the one before. */
export function ActsElsewhere({ onLater }: ActsElsewhereProps) {
  return (
    <ConfirmDialog
      open
      onOpenChange={onLater}
      title="You act differently in another tab"
      description="All tabs of a browser share one session. This page still shows what was open to the role before; it cannot save until it is opened anew."
      confirmLabel="Open anew"
      cancelLabel="Copy something first"
      onConfirm={() => window.location.assign("/")}
    />
  );
}
