import { createElement } from "react";
import { coloredGroups } from "./group-colors.ts";
import { type MarkPaint, markParts } from "./mark-parts.ts";
import type { PersonMarkInput } from "./person-mark-input.ts";

/** Paint by CSS variables: follows the theme without being drawn again. */
const pagePaint: MarkPaint = {
  ink: "var(--ink)",
  quiet: "var(--ink-2)",
  paper: "var(--paper)",
  groups: Array.from({ length: coloredGroups }, (_, place) => `var(--group-${place + 1})`),
};

/** The shapes of a mark for use inside an svg of one's own with a 24 × 24 view box. */
export function MarkShape({ input }: { input: PersonMarkInput }) {
  return (
    <>
      {markParts(input, pagePaint).map(({ tag, attributes }) =>
        createElement(tag, { key: `${tag}${JSON.stringify(attributes)}`, ...attributes }),
      )}
    </>
  );
}
