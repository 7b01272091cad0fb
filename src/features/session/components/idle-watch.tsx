import { useEffect, useState } from "react";
import type { Session } from "../../../../shared/contracts/session.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { idleState } from "../../../lib/activity.ts";
import { api } from "../../../lib/api-client.ts";
import { staySignedIn } from "../api/get-session.ts";
import { idleStep } from "../idle-step.ts";

export type IdleWatchProps = {
  session: Session;
  /** The server says that the session is over. */
  onEnded: () => void;
};

const tickMs = 5_000;

/**
 * Keeps the session alive while someone types, warns two minutes before it would end, and notices
 * when it has ended. The server decides; another tab may have kept it alive.
 */
export function IdleWatch({ session, onEnded }: IdleWatchProps) {
  const [secondsLeft, setSecondsLeft] = useState<number | null>(null);
  const [endsSoon, setEndsSoon] = useState(false);

  useEffect(() => {
    let asking = false;
    async function tick() {
      const step = idleStep(idleState(), session, Date.now());
      setEndsSoon(step.endsSoon);
      setSecondsLeft(step.warnSeconds);
      if (asking || step.ask === "nothing" || !navigator.onLine) return;
      asking = true;
      try {
        if (step.ask === "stay") await staySignedIn();
        else {
          const { signedIn } = await api.get<{ signedIn: boolean }>("/api/welcome", {
            background: true,
          });
          if (!signedIn) onEnded();
        }
      } catch {
        // No answer is no news: the next tick asks again.
      } finally {
        asking = false;
      }
    }
    const timer = setInterval(() => void tick(), tickMs);
    return () => clearInterval(timer);
  }, [session, onEnded]);

  return (
    <>
      {endsSoon ? (
        <Notice tone="warn" title="This session ends soon." className="mb-2">
          It ends at {new Date(session.endsAt).toLocaleTimeString([], timeStyle)} whatever you do;
          you then sign in again. What is typed and not saved stays in this tab.
        </Notice>
      ) : null}
      <Dialog
        open={secondsLeft !== null}
        onOpenChange={(open) => {
          if (!open) void staySignedIn().then(() => setSecondsLeft(null));
        }}
        role="alertdialog"
        title="Still there?"
        description={`Nothing was done here for a while. In ${wordsLeft(secondsLeft ?? 0)} the page is locked; what is typed stays in this tab.`}
        closeLabel="Stay"
        actions={
          <Button
            variant="primary"
            onClick={() => void staySignedIn().then(() => setSecondsLeft(null))}
          >
            Stay signed in
          </Button>
        }
      />
    </>
  );
}

const timeStyle = { hour: "2-digit", minute: "2-digit" } as const;

function wordsLeft(seconds: number): string {
  return seconds > 90 ? "two minutes" : seconds > 45 ? "one minute" : "a few seconds";
}
