/** Longest stretch of work between two turns of the event loop, in ms. */
const STRETCH_MS = 15;

/** Lets other requests be served when the current stretch of work has lasted long enough. */
export type Pause = () => Promise<void> | undefined;

/** Makes a pause for one long piece of work; awaiting it costs nothing until a stretch is over. */
export function createPause(): Pause {
  let started = performance.now();
  return () => {
    if (performance.now() - started < STRETCH_MS) return undefined;
    return new Promise((resolve) => {
      setImmediate(() => {
        started = performance.now();
        resolve();
      });
    });
  };
}
