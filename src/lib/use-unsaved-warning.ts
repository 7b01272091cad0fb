import { useEffect } from "react";
import { useBlocker } from "react-router-dom";

/**
 * Holds the reader back from leaving a page with typed and unsaved text: by a link of ours (the
 * blocker is given back, to ask with a dialog) and by closing the tab (the browser asks).
 */
export function useUnsavedWarning(unsaved: boolean) {
  useEffect(() => {
    if (!unsaved) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [unsaved]);
  return useBlocker(
    ({ currentLocation, nextLocation }) =>
      unsaved && currentLocation.pathname !== nextLocation.pathname,
  );
}
