import type { ReactNode } from "react";

/** How much of the box is filled stands for how much of a value is given; the word says it too. */
const fills: Readonly<Record<string, ReactNode>> = {
  full: <rect x="1" y="1" width="10" height="10" fill="var(--ink)" />,
  masked: <rect x="1" y="6" width="10" height="5" fill="var(--ink)" />,
  coarse: <path d="M1 11 11 1M1 6.500 6.500 1M5.500 11 11 5.500" stroke="var(--ink)" />,
  none: null,
};

export type AccessWordProps = {
  /** full, masked, coarse, none; `direct` and `absent` only where something is wrong. */
  access: string;
  /** The pair this word belongs to does not agree. */
  differs?: boolean;
};

/** A level of access: a small box and its word. */
export function AccessWord({ access, differs = false }: AccessWordProps) {
  const known = access in fills;
  return (
    <span
      className={`inline-flex items-baseline gap-1.5 whitespace-nowrap ${
        differs ? "font-bold text-coral" : access === "none" ? "text-ink-2" : ""
      }`}
    >
      <svg viewBox="0 0 12 12" className="size-2.5 shrink-0" aria-hidden="true">
        <rect x="0.5" y="0.5" width="11" height="11" fill="none" stroke="var(--ink-2)" />
        {known ? fills[access] : <path d="M2 2 10 10M10 2 2 10" stroke="var(--coral)" />}
      </svg>
      {access}
    </span>
  );
}
