/**
 * When the person last did something, and when the server last heard of it. The session's idle
 * clock runs on the server and starts anew with each request that is not marked as background.
 */
let lastInput = Date.now();
let lastHeard = Date.now();

/** A request within this time after a key or a touch counts as the person's own. */
const ownForMs = 5_000;

const events = ["keydown", "pointerdown", "touchstart", "wheel"] as const;

/** Follows keys and touches of the whole page; returns the way to stop. */
export function followActivity(target: EventTarget = window): () => void {
  const note = () => {
    lastInput = Date.now();
  };
  for (const name of events) target.addEventListener(name, note, { capture: true, passive: true });
  return () => {
    for (const name of events) target.removeEventListener(name, note, { capture: true });
  };
}

/** True when nobody asked for what is about to be sent: live updates, polling, refocus. */
export function isBackground(now = Date.now()): boolean {
  return now - lastInput > ownForMs;
}

/** To be called with every answer to a request that counted as activity. */
export function heardByServer(now = Date.now()): void {
  lastHeard = now;
}

/** Milliseconds since the server's idle clock started anew, and whether input came after that. */
export function idleState(now = Date.now()): { idleMs: number; unheardInput: boolean } {
  return { idleMs: now - lastHeard, unheardInput: lastInput > lastHeard };
}
