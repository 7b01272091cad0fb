import { useCallback, useState } from "react";

/**
 * Width of an element in CSS pixels, followed as it changes, so that drawings are laid out in real
 * pixels and their text never scales. `initial` stands until the first measurement.
 */
export function useWidth(initial: number): [(element: HTMLElement | null) => void, number] {
  const [width, setWidth] = useState(initial);
  const ref = useCallback((element: HTMLElement | null) => {
    if (!element || typeof ResizeObserver === "undefined") return;
    const observer = new ResizeObserver((entries) => {
      const measured = entries[0]?.contentRect.width;
      // Whole pixels: a fraction more or less must not lay the drawing out again.
      if (measured) setWidth(Math.floor(measured));
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
