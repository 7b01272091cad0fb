import type { ReactNode } from "react";

export type CautionProps = { children: ReactNode; className?: string };

/** A safety note that stands next to the figure it is about, in words, never hidden behind a click. */
export function Caution({ children, className }: CautionProps) {
  return (
    <div role="note" className={`flex gap-2 text-sm text-ink-2 ${className ?? ""}`}>
      <svg viewBox="0 0 16 16" className="mt-[0.2em] size-3.5 shrink-0" aria-hidden="true">
        <path
          d="M8 1.500 15 14.500H1Z"
          fill="none"
          stroke="var(--ochre)"
          strokeWidth="1.500"
          strokeLinejoin="round"
        />
        <path d="M8 6v4.250M8 11.500v1.250" stroke="var(--ochre)" strokeWidth="1.500" />
      </svg>
      <p>{children}</p>
    </div>
  );
}
