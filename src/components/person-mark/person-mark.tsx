import { MarkShape } from "./mark-shape.tsx";
import { markText } from "./mark-text.ts";
import type { PersonMarkInput } from "./person-mark-input.ts";

export type PersonMarkProps = PersonMarkInput & {
  /** Side of the mark in pixels (default 18). */
  size?: number;
  /** The words stand right beside it: the mark itself is then left out of what is read. */
  decorative?: boolean;
  className?: string;
};

/** The mark of a person, the same in lists, strips and the network. */
export function PersonMark({
  size = 18,
  decorative = false,
  className,
  ...input
}: PersonMarkProps) {
  const shared = {
    width: size,
    height: size,
    viewBox: "0 0 24 24",
    className: `inline-block shrink-0 align-[-0.2em] ${className ?? ""}`,
  };
  if (decorative) {
    return (
      <svg {...shared} aria-hidden="true">
        <MarkShape input={input} />
      </svg>
    );
  }
  const text = markText(input);
  return (
    <svg {...shared} role="img" aria-label={text}>
      <title>{text}</title>
      <MarkShape input={input} />
    </svg>
  );
}
