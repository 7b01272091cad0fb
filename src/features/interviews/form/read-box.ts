import { addDays } from "../../../lib/calendar-day.ts";
import { parsePartialDate } from "../../../lib/partial-date.ts";

/** `u`, `?` and `r` stand for the two answers that are no value. */
function answerWord(typed: string): string | null {
  if (typed === "u" || typed === "?" || typed === "unknown") return "unknown";
  if (typed === "r" || typed === "refused") return "refused";
  return null;
}

/**
 * What a day box means when it is left: the forms of a partial date, a day of the month alone
 * ("18": the latest 18th that is not after today) and "=" (the day of the box before). What cannot
 * be read stays as typed, so that nothing is lost and the error shows.
 */
export function readDay(text: string, today: string, before?: string): string {
  const typed = text.trim().toLowerCase();
  if (typed === "=" && before) return before;
  if (/^\d{1,2}$/.test(typed)) return latestDayOfMonth(Number(typed), today) ?? text;
  const parsed = parsePartialDate(text, { today });
  return parsed.kind === "invalid" ? text : parsed.value;
}

function latestDayOfMonth(dayOfMonth: number, today: string): string | null {
  // Two months back is enough to meet every day from 1 to 31 at least once.
  for (let back = 0; back < 62; back++) {
    const day = addDays(today, -back);
    if (Number(day.slice(8)) === dayOfMonth) return day;
  }
  return null;
}

/** What a figure box means when it is left; a decimal comma becomes a point. */
export function readFigure(text: string): string {
  const typed = text.trim().toLowerCase();
  return answerWord(typed) ?? typed.replace(/^(\d+),(\d+)$/, "$1.$2");
}

/** The value sent for a figure box: a number, an answer word, null for blank, else as typed. */
export function figureValue(text: string): number | string | null {
  const read = readFigure(text);
  if (read === "") return null;
  return /^-?\d+(\.\d+)?$/.test(read) ? Number(read) : read;
}

/** How many people a group box tells of; null ends = not known. */
export type Count =
  | { kind: "exact" | "between" | "unknown"; min: number | null; max: number | null }
  | { kind: "invalid" };

/** Reads "12", "10-15", "10 to 15", "12 ±3" (also "12+-3"), "u", and blank. */
export function readCount(text: string): Count {
  const typed = text.trim().toLowerCase();
  if (typed === "" || answerWord(typed)) return { kind: "unknown", min: null, max: null };
  const exact = /^\d{1,6}$/.exec(typed);
  if (exact) return { kind: "exact", min: Number(typed), max: Number(typed) };
  const range = /^(\d{1,6})\s*(?:-|–|to)\s*(\d{1,6})$/.exec(typed);
  if (range) return { kind: "between", min: Number(range[1]), max: Number(range[2]) };
  const spread = /^(\d{1,6})\s*(?:±|\+\/?-)\s*(\d{1,6})$/.exec(typed);
  if (spread) {
    const middle = Number(spread[1]);
    const reach = Number(spread[2]);
    return { kind: "between", min: Math.max(0, middle - reach), max: middle + reach };
  }
  return { kind: "invalid" };
}

/** "12", "10–15", "number not known". */
export function countWords(count: Count): string {
  if (count.kind === "exact") return String(count.min);
  if (count.kind === "between") return `${count.min}–${count.max}`;
  return count.kind === "unknown" ? "number not known" : "?";
}
