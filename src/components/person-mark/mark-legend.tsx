import { markText } from "./mark-text.ts";
import { PersonMark } from "./person-mark.tsx";
import type { PersonMarkInput } from "./person-mark-input.ts";

const followUp = (share: number, state: "active" | "completed" | "lost" | "ended") => ({
  share,
  state,
});

const shown: readonly PersonMarkInput[] = [
  { classification: "confirmed" },
  { classification: "probable" },
  { classification: "suspected" },
  { classification: "confirmed", wasContact: true },
  { classification: "contact", followUp: followUp(0.6, "active") },
  { classification: "contact", followUp: followUp(1, "completed") },
  { classification: "contact", followUp: followUp(0.3, "lost") },
  { classification: "contact", followUp: followUp(0.3, "ended") },
  { classification: "not_a_case" },
];

export type MarkLegendProps = {
  /** Groups in the order of their colours, where colour is used; the rest are grey. */
  groups?: readonly string[];
  /** Only these marks, where a picture does not draw them all. */
  marks?: readonly PersonMarkInput[];
  layout?: "column" | "row";
};

/** What the marks mean, and whose colour is whose. */
export function MarkLegend({ groups = [], marks = shown, layout = "column" }: MarkLegendProps) {
  const list = layout === "column" ? "flex flex-col gap-y-1.5" : "flex flex-wrap gap-x-5 gap-y-1.5";
  return (
    <div className="space-y-3 text-sm">
      <ul className={list} aria-label="Person marks">
        {marks.map((input) => (
          <li key={markText(input)} className="flex items-center gap-2">
            <PersonMark {...input} decorative />
            {markText(input)}
          </li>
        ))}
      </ul>
      {groups.length > 0 ? (
        <ul className={list} aria-label="Colours of groups">
          {groups.map((name, place) => (
            <li key={name} className="flex items-center gap-2">
              <PersonMark classification="confirmed" group={place} decorative />
              {name}
            </li>
          ))}
          <li className="flex items-center gap-2">
            <PersonMark classification="confirmed" group="rest" decorative />
            other groups
          </li>
        </ul>
      ) : null}
    </div>
  );
}
