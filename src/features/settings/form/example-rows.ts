import type { DayStripRow } from "../../../components/day-strip/day-strip-row.ts";
import { addDays } from "../../../lib/calendar-day.ts";
import { typedNumber } from "../../../lib/typed-number.ts";

/** The five numbers that windows are made of, as typed. */
export type WindowNumbers = Record<
  "incubationMin" | "incubationMax" | "infectiousBefore" | "infectiousAfter" | "monitoringDays",
  string
>;

/** Beyond a year and a half nothing can be told apart on one scale. */
const mostDays = 365;

function days(text: string): number | null {
  const value = typedNumber(text);
  return typeof value === "number" && Number.isInteger(value) && value >= 0 && value <= mostDays
    ? value
    : null;
}

/**
 * The windows around one onset, drawn with the numbers as typed; null while a number cannot be
 * read. The contact was exposed for the last time on the day of onset.
 */
export function exampleRows(
  numbers: WindowNumbers,
  onset: string,
): { rows: DayStripRow[]; from: string; to: string } | null {
  const min = days(numbers.incubationMin);
  const max = days(numbers.incubationMax);
  const before = days(numbers.infectiousBefore);
  const after = days(numbers.infectiousAfter);
  const monitoring = days(numbers.monitoringDays);
  if (min === null || max === null || before === null || after === null || monitoring === null) {
    return null;
  }
  if (max < min || monitoring < 1) return null;
  const rows: DayStripRow[] = [
    {
      id: "source",
      type: "window",
      window: "source",
      label: "source window",
      from: addDays(onset, -max),
      to: addDays(onset, -min),
    },
    {
      id: "infectious",
      type: "window",
      window: "infectious",
      label: "infectious window",
      from: addDays(onset, -before),
      to: addDays(onset, after),
      reference: { day: onset, label: "onset" },
    },
    {
      id: "due",
      type: "due",
      label: "follow-up of a contact",
      days: Array.from({ length: monitoring }, (_, index) => ({
        day: addDays(onset, index + 1),
        state: "to_come" as const,
      })),
    },
  ];
  return {
    rows,
    from: addDays(onset, -Math.max(max, before) - 1),
    to: addDays(onset, Math.max(after, monitoring) + 1),
  };
}
