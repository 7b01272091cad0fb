import { useCallback, useState } from "react";

/** True from the moment an element comes near the visible part of the page; never false again. */
export function useNear(): [(element: HTMLElement | null) => void, boolean] {
  const [near, setNear] = useState(typeof IntersectionObserver === "undefined");
  const ref = useCallback((element: HTMLElement | null) => {
    if (!element || typeof IntersectionObserver === "undefined") return;
    const observer = new IntersectionObserver(
      (entries) => {
        if (!entries.some((entry) => entry.isIntersecting)) return;
        setNear(true);
        observer.disconnect();
      },
      { rootMargin: "200px" },
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, near];
}
