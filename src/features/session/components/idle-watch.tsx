import { Suspense, useEffect, useState } from "react";
import type { Session } from "../../../../shared/contracts/session.ts";
import { Notice } from "../../../components/ui/notice.tsx";
import { idleState } from "../../../lib/activity.ts";
import { staySignedIn } from "../api/get-session.ts";
import { readWelcome } from "../api/get-welcome.ts";
import { idleStep } from "../idle-step.ts";
import { IdleWarning } from "./session-dialogs.ts";

export type IdleWatchProps = {
  session: Session;
  /** The server says that the session is over. */
  onEnded: () => void;
};

const tickMs = 5_000;
/** When another tab keeps the session alive, it is enough to ask now and then. */
const askAgainMs = 60_000;

/**
 * Keeps the session alive while someone types, warns two minutes before it would end, and notices
 * when it has ended. The server decides; another tab may have kept it alive.
 */
export function IdleWatch({ session, onEnded }: IdleWatchProps) {
  const [secondsLeft, setSecondsLeft] = useState<number | null>(null);
  const [endsSoon, setEndsSoon] = useState(false);

  async function stay() {
    setSecondsLeft(null);
    // Without an answer the warning comes back at the next tick.
    await staySignedIn().catch(() => {});
  }

  useEffect(() => {
    let asking = false;
    let askAfter = 0;
    async function tick() {
      const step = idleStep(idleState(), session, Date.now());
      setEndsSoon(step.endsSoon);
      setSecondsLeft(step.warnSeconds);
      if (asking || step.ask === "nothing" || !navigator.onLine || Date.now() < askAfter) return;
      asking = true;
      try {
        if (step.ask === "stay") await staySignedIn();
        else {
          const { signedIn } = await readWelcome();
          if (signedIn) askAfter = Date.now() + askAgainMs;
          else onEnded();
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
        <Notice
          tone="warn"
          title="This session ends soon."
          className="fixed inset-x-0 bottom-0 z-40"
        >
          It ends at {new Date(session.endsAt).toLocaleTimeString([], timeStyle)} whatever you do;
          you then sign in again. What is typed and not saved stays in this tab.
        </Notice>
      ) : null}
      {secondsLeft === null ? null : (
        <Suspense fallback={null}>
          <IdleWarning secondsLeft={secondsLeft} onStay={() => void stay()} />
        </Suspense>
      )}
    </>
  );
}

const timeStyle = { hour: "2-digit", minute: "2-digit" } as const;
