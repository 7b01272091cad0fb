import { useSyncExternalStore } from "react";

const query = "(max-width: 39.99rem)";

function media(): MediaQueryList | null {
  return typeof window.matchMedia === "function" ? window.matchMedia(query) : null;
}

function subscribe(changed: () => void): () => void {
  const list = media();
  list?.addEventListener("change", changed);
  return () => list?.removeEventListener("change", changed);
}

/** Whether the page is as narrow as a telephone, followed as it changes. */
export function useNarrow(): boolean {
  return useSyncExternalStore(subscribe, () => media()?.matches ?? false);
}
