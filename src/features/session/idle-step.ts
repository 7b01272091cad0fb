import type { Session } from "../../../shared/contracts/session.ts";

export type IdleStep = {
  /** `stay`: input came that the server has not heard of; `check`: it should be over by now. */
  ask: "nothing" | "stay" | "check";
  /** Seconds left when the warning is due, null before. */
  warnSeconds: number | null;
  /** The end that no activity can move is near. */
  endsSoon: boolean;
};

const minute = 60_000;
const warnBefore = 2 * minute;
const endsSoonBefore = 10 * minute;

/** What to do at this moment about a session that ends when idle and, whatever happens, at its end. */
export function idleStep(
  idle: { idleMs: number; unheardInput: boolean },
  session: Pick<Session, "idleMinutes" | "endsAt">,
  now: number,
): IdleStep {
  const limit = session.idleMinutes * minute;
  const left = limit - idle.idleMs;
  const absoluteLeft = Date.parse(session.endsAt) - now;
  const endsSoon = absoluteLeft <= endsSoonBefore;
  if (left <= 0 || absoluteLeft <= 0) return { ask: "check", warnSeconds: null, endsSoon };
  // Typing counts as activity even when a form sends nothing for a long while.
  if (idle.unheardInput && idle.idleMs > limit / 4)
    return { ask: "stay", warnSeconds: null, endsSoon };
  const warnSeconds = left <= warnBefore ? Math.ceil(left / 1000) : null;
  return { ask: "nothing", warnSeconds, endsSoon };
}
