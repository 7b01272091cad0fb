import type { ReactNode } from "react";

export type KeyboardHintProps = { keys: readonly string[]; children?: ReactNode };

/** Which keys do what, said beside the thing they work on. */
export function KeyboardHint({ keys, children }: KeyboardHintProps) {
  return (
    <span className="inline-flex flex-wrap items-center gap-1 text-sm text-ink-2">
      {keys.map((key) => (
        <kbd
          key={key}
          className="rounded-[2px] border border-rule bg-paper-2 px-1.5 font-sans text-xs leading-5"
        >
          {key}
        </kbd>
      ))}
      {children ? <span className="ms-0.5">{children}</span> : null}
    </span>
  );
}
