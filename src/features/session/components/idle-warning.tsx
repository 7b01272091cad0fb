import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";

export type IdleWarningProps = { secondsLeft: number; onStay: () => void };

/** Two minutes before a session ends for want of activity. */
export function IdleWarning({ secondsLeft, onStay }: IdleWarningProps) {
  return (
    <Dialog
      open
      onOpenChange={(open) => {
        if (!open) onStay();
      }}
      role="alertdialog"
      title="Still there?"
      description={`Nothing was done here for a while. In ${wordsLeft(secondsLeft)} the page is locked; what is typed stays in this tab.`}
      closeLabel="Stay"
      actions={
        <Button variant="primary" onClick={onStay}>
          Stay signed in
        </Button>
      }
    />
  );
}

function wordsLeft(seconds: number): string {
  if (seconds > 90) return "two minutes";
  return seconds > 45 ? "one minute" : "less than a minute";
}
