import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { dayNumber } from "../../../lib/calendar-day.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { parsePartialDate } from "../../../lib/partial-date.ts";

type Windows = PersonPage["windows"];

/** Days of an exposure as they stand in two boxes; null when no full day is known. */
export function exposureDays(
  firstText: string,
  lastText: string,
): { from: string; to: string; partial: boolean } | null {
  const first = bounds(firstText);
  const last = bounds(lastText);
  const start = first ?? last;
  const end = last ?? first;
  if (!start || !end) return null;
  const from = start.from;
  const to = end.to < from ? start.to : end.to;
  return { from, to, partial: start.partial || end.partial };
}

/** First and last day that a box stands for: a month is all its days. */
function bounds(text: string): { from: string; to: string; partial: boolean } | null {
  const parsed = parsePartialDate(text);
  if (parsed.kind === "day") return { from: parsed.value, to: parsed.value, partial: false };
  if (parsed.kind !== "month") return null;
  const [year = 0, month = 0] = parsed.value.split("-").map(Number);
  const last = new Date(Date.UTC(year, month, 0)).getUTCDate();
  return {
    from: `${parsed.value}-01`,
    to: `${parsed.value}-${String(last).padStart(2, "0")}`,
    partial: true,
  };
}

/**
 * What deserves a second look in the days of an exposure, in words; null when nothing does. None of
 * it is an error: people remember wrongly, and windows rest on dates that may change.
 */
export function dayNotice(
  row: { firstExposure: string; lastExposure: string },
  windows: Windows,
  today: string,
): string | null {
  const { firstExposure: first, lastExposure: last } = row;
  if (first.trim() === "" && last.trim() === "") return "no day of exposure yet";
  const days = exposureDays(first, last);
  if (!days) return null;
  if (!days.partial && days.to > today) return "after today";
  if (last.trim() === "") return "last day not asked";
  const { infectious, source } = windows;
  if (!infectious && !source) return null;
  if (infectious && meets(days, infectious)) return null;
  if (source && meets(days, source)) {
    return infectious ? "in the source window only, not the infectious one" : null;
  }
  if (!infectious) return null;
  return `outside the infectious window, ${range(infectious)}`;
}

function meets(a: { from: string; to: string }, b: { from: string; to: string }): boolean {
  return a.from <= b.to && a.to >= b.from;
}

/** "19–31 May 2026" in the reader's own way of writing days. */
export function range({ from, to }: { from: string; to: string }): string {
  return dayNumber(from) === null || from === to
    ? formatDay(from)
    : `${formatDay(from, { style: "short" })} – ${formatDay(to)}`;
}
