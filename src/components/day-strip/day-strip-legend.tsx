import type { ReactNode } from "react";
import type { DayStripRow, DueState } from "./day-strip-row.ts";
import { dueWords } from "./day-strip-row.ts";
import { DueMark } from "./due-marks.tsx";

const dueStates: readonly DueState[] = ["seen", "message", "missed", "no_check", "due", "to_come"];

/** What the shapes mean; only those that the rows use. */
export function DayStripLegend({ rows }: { rows: readonly DayStripRow[] }) {
  const uses = (type: DayStripRow["type"]) => rows.some((row) => row.type === type);
  const windows = (kind: "source" | "infectious") =>
    rows.some((row) => row.type === "window" && row.window === kind);
  const due = dueStates.filter((state) =>
    rows.some((row) => row.type === "due" && row.days.some((day) => day.state === state)),
  );
  const incomplete = rows.some((row) => row.type === "onsets" && row.incompleteFrom);
  return (
    <ul className="flex flex-wrap gap-x-5 gap-y-1 text-sm text-ink-2" aria-label="What is drawn">
      {windows("source") ? (
        <Item words="source window">
          <rect
            x="1"
            y="3"
            width="18"
            height="10"
            fill="none"
            stroke="var(--ink-2)"
            strokeWidth="1.250"
            strokeDasharray="2 3"
          />
        </Item>
      ) : null}
      {windows("infectious") ? (
        <Item words="infectious window">
          <rect x="1" y="3" width="18" height="10" fill="var(--wash)" stroke="var(--ink-2)" />
        </Item>
      ) : null}
      {uses("exposure") ? (
        <>
          <Item words="household">
            <rect x="1" y="4" width="18" height="8" fill="var(--blue)" />
          </Item>
          <Item words="other setting">
            <rect
              x="1"
              y="4"
              width="18"
              height="8"
              fill="var(--blue)"
              fillOpacity="0.550"
              stroke="var(--blue)"
            />
          </Item>
        </>
      ) : null}
      {uses("group") ? (
        <Item words="people not named">
          <rect
            x="1"
            y="4"
            width="18"
            height="8"
            fill="none"
            stroke="var(--ochre)"
            strokeWidth="1.500"
            strokeDasharray="4 2.500"
          />
        </Item>
      ) : null}
      {due.map((state) => (
        <Item key={state} words={dueWords[state]}>
          <DueMark state={state} x={4} y={2} size={12} />
        </Item>
      ))}
      {uses("onsets") ? (
        <Item words="one onset">
          <rect x="3" y="5" width="14" height="7" fill="var(--ink)" />
        </Item>
      ) : null}
      {incomplete ? (
        <Item words="day not complete yet">
          <rect x="3.500" y="5" width="13" height="6.500" fill="var(--paper)" stroke="var(--ink)" />
        </Item>
      ) : null}
    </ul>
  );
}

function Item({ words, children }: { words: string; children: ReactNode }) {
  return (
    <li className="inline-flex items-center gap-1.5">
      <svg width="20" height="16" viewBox="0 0 20 16" aria-hidden="true">
        {children}
      </svg>
      {words}
    </li>
  );
}
