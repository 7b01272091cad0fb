import { useEffect, useState } from "react";
import { Button } from "../../../components/ui/button.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { formatCount } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import type { NetworkQuestion } from "../../../lib/network-summary-query.ts";
import {
  type CountedWindow,
  isReversed,
  type Population,
  type QuestionChange,
} from "../use-question.ts";

const firstDay = "1900-01-01";

export const populationOptions: readonly { value: Population; label: string }[] = [
  { value: "interviewed", label: "interviewed people" },
  { value: "all", label: "all on record" },
  { value: "cases", label: "cases" },
];

export type QuestionControlsProps = {
  question: NetworkQuestion;
  onChange: (change: QuestionChange) => void;
};

/** Which people, which exposures, as of when: what every figure of the page is about. */
export function QuestionControls({ question, onChange }: QuestionControlsProps) {
  const { infectiousBefore, infectiousAfter, today } = useInvestigation();
  const presetDays = infectiousBefore + infectiousAfter + 1;
  const windowOptions: readonly { value: CountedWindow; label: string }[] = [
    {
      value: "preset",
      label: `one infectious window (${formatCount(presetDays, "day", "days")})`,
    },
    { value: "all", label: "all, dated or not" },
    { value: "free", label: "from – to" },
  ];
  return (
    <form
      aria-label="What the figures are about"
      className="mb-6 border-y border-rule py-3"
      onSubmit={(event) => event.preventDefault()}
      data-print="hide"
    >
      <div className="flex flex-wrap items-center gap-x-6 gap-y-3">
        <MenuSelect
          label="people"
          options={populationOptions}
          value={question.population}
          onValueChange={(population) => onChange({ population })}
        />
        <MenuSelect
          label="exposures"
          options={windowOptions}
          value={question.window}
          onValueChange={(window) =>
            onChange(window === "free" ? { window } : { window, from: undefined, to: undefined })
          }
        />
        {question.window === "free" ? (
          <>
            <DayBox
              label="from"
              value={question.from}
              max={question.to}
              onChange={(from) => onChange({ from })}
            />
            <DayBox
              label="to"
              value={question.to}
              min={question.from}
              onChange={(to) => onChange({ to })}
            />
          </>
        ) : null}
        <div className="flex flex-wrap items-center gap-2">
          <DayBox
            label="as of the end of"
            value={question.asOf}
            max={today}
            onChange={(asOf) => onChange({ asOf })}
          />
          {question.asOf ? (
            <Button size="small" onClick={() => onChange({ asOf: undefined })}>
              As it stands now
            </Button>
          ) : null}
        </div>
      </div>
      {isReversed(question) ? (
        <p role="alert" className="mt-2 text-sm text-coral">
          The last day is before the first.
        </p>
      ) : null}
      {question.window === "free" && !question.from && !question.to ? (
        <p className="mt-2 text-sm text-ink-2">
          Give a first or a last exposure day. Until then the infectious window is shown. A freely
          chosen range gets numbers, but no verdict.
        </p>
      ) : null}
    </form>
  );
}

type DayBoxProps = {
  label: string;
  value: string | undefined;
  min?: string;
  max?: string;
  onChange: (day: string | undefined) => void;
};

/** A day that is passed on only when it is whole: while a year is typed, 0002 is no answer yet. */
function DayBox({ label, value, min, max, onChange }: DayBoxProps) {
  const [draft, setDraft] = useState(value ?? "");
  useEffect(() => setDraft(value ?? ""), [value]);
  return (
    <label className="inline-flex items-center gap-2 text-sm">
      <span className="shrink-0 text-ink-2">{label}</span>
      <input
        type="date"
        className="field-box w-auto text-sm"
        value={draft}
        min={min ?? firstDay}
        max={max}
        onChange={(event) => {
          const day = event.target.value;
          setDraft(day);
          if (day === "" || day >= firstDay) onChange(day || undefined);
        }}
      />
    </label>
  );
}
