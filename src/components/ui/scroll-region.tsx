import { clsx } from "clsx";
import type { ReactNode } from "react";

export type ScrollRegionProps = {
  /** What is in it, for readers: it is a stop of the tab key. */
  label: string;
  className?: string;
  children: ReactNode;
};

/** A part that scrolls by itself, such as a wide table on a phone; arrow keys move it too. */
export function ScrollRegion({ label, className, children }: ScrollRegionProps) {
  return (
    <section
      aria-label={label}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: without a stop there, keys could not scroll it.
      tabIndex={0}
      // Positioned, or words for readers only would widen the page past the scrolled part.
      className={clsx("relative overflow-auto focus-visible:-outline-offset-2", className)}
    >
      {children}
    </section>
  );
}
