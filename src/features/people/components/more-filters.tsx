import { useId } from "react";
import { Button } from "../../../components/ui/button.tsx";
import { DropPanel } from "../../../components/ui/drop-panel.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { interviewWords } from "../../../lib/words.ts";
import type { CodedFilter, ListState } from "../use-list-state.ts";

const interviewStates = [
  { value: "", label: "all" },
  { value: "none", label: "not begun" },
  ...Object.entries(interviewWords).map(([value, label]) => ({ value, label })),
];
const followUp = [
  { value: "", label: "all" },
  { value: "yes", label: "yes" },
  { value: "no", label: "no" },
];
const inPanel: readonly CodedFilter[] = [
  "interviewState",
  "followUp",
  "onsetFrom",
  "onsetTo",
  "reportFrom",
  "reportTo",
];

/** Filters that are asked for less often, behind one button that says how many are set. */
export function MoreFilters({ state }: { state: ListState }) {
  const set = inPanel.filter((name) => state.filters[name]).length;
  return (
    <DropPanel
      label={set > 0 ? `More filters (${set})` : "More filters"}
      panelLabel="More filters"
      size="normal"
      className="w-max max-sm:fixed max-sm:inset-x-3 max-sm:top-14 max-sm:w-auto"
    >
      {(close) => (
        <div className="grid gap-3 py-1">
          <MenuSelect
            label="State of the interview"
            options={interviewStates}
            value={state.filters.interviewState ?? ""}
            onValueChange={(value) => state.setFilter("interviewState", value)}
          />
          <MenuSelect
            label="Any check of follow-up"
            options={followUp}
            value={state.filters.followUp ?? ""}
            onValueChange={(value) => state.setFilter("followUp", value)}
          />
          <DayRange state={state} words="Onset" from="onsetFrom" to="onsetTo" />
          <DayRange state={state} words="Reported" from="reportFrom" to="reportTo" />
          <p className="max-w-[34ch] text-sm text-ink-2">
            Both days are included, and a month without its day where any of its days is. Unknown
            days are in no range.
          </p>
          <div>
            <Button size="small" onClick={close}>
              Close
            </Button>
          </div>
        </div>
      )}
    </DropPanel>
  );
}

type DayRangeProps = { state: ListState; words: string; from: CodedFilter; to: CodedFilter };

function DayRange({ state, words, from, to }: DayRangeProps) {
  const id = useId();
  const [first, last] = [state.filters[from] ?? "", state.filters[to] ?? ""];
  const turned = first !== "" && last !== "" && last < first;
  const box = (name: CodedFilter, label: string, value: string, note?: string) => (
    <label className="flex items-center gap-2 text-sm">
      <span className="text-ink-2">{label}</span>
      <input
        type="date"
        min="1900-01-01"
        max="2100-12-31"
        className="field-box w-40"
        value={value}
        aria-invalid={note !== undefined || undefined}
        aria-describedby={note}
        onChange={(event) => state.setFilter(name, event.target.value)}
      />
    </label>
  );
  return (
    <fieldset>
      <legend className="text-sm">{words}</legend>
      <div className="flex flex-wrap gap-x-4 gap-y-2">
        {box(from, "from", first)}
        {box(to, "to", last, turned ? `${id}-turned` : undefined)}
      </div>
      {turned ? (
        <p id={`${id}-turned`} className="mt-1 text-sm text-coral">
          The last day is before the first.
        </p>
      ) : null}
    </fieldset>
  );
}
