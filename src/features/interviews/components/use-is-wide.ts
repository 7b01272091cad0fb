import { useSyncExternalStore } from "react";

const query = "(min-width: 64rem)";
const media = () => window.matchMedia?.(query);

function subscribe(changed: () => void) {
  const list = media();
  list?.addEventListener("change", changed);
  return () => list?.removeEventListener("change", changed);
}

/** Whether there is room for the strip above the rows; taken as wide where it cannot be asked. */
export function useIsWide(): boolean {
  return useSyncExternalStore(subscribe, () => media()?.matches ?? true);
}
