import { addDays, dayNumber } from "./calendar-day.ts";

/** What somebody typed where a date is asked; `value` is what is stored. */
export type PartialDate =
  | { kind: "blank" | "day" | "month" | "unknown" | "refused"; value: string }
  | { kind: "invalid"; value: string; reason: string };

export type PartialDateOptions = {
  /** The day that "today", "yesterday" and "-3" count from; without it they are not understood. */
  today?: string;
  allowMonth?: boolean;
  answers?: boolean;
};

/**
 * Reads a typed date without guessing: ISO days and months, eight digits, `u`/`r` and the words
 * unknown and refused, and days counted back from today. Day/month orders that differ between
 * countries (5/6) are refused rather than read one way.
 */
export function parsePartialDate(
  text: string,
  { today, allowMonth = true, answers = true }: PartialDateOptions = {},
): PartialDate {
  const typed = text.trim().toLowerCase();
  if (typed === "") return { kind: "blank", value: "" };
  if (answers && (typed === "u" || typed === "?" || typed === "unknown")) {
    return { kind: "unknown", value: "unknown" };
  }
  if (answers && (typed === "r" || typed === "refused")) {
    return { kind: "refused", value: "refused" };
  }
  const back = daysBack(typed);
  if (today && back !== null) return { kind: "day", value: addDays(today, -back) };

  const day = typed.replace(/^(\d{4})(\d{2})(\d{2})$/, "$1-$2-$3");
  if (dayNumber(day) !== null) return { kind: "day", value: day };
  if (/^\d{4}-\d{2}$/.test(typed) && dayNumber(`${typed}-01`) !== null) {
    if (allowMonth) return { kind: "month", value: typed };
    return { kind: "invalid", value: text, reason: "A full day is needed here: YYYY-MM-DD." };
  }
  return { kind: "invalid", value: text, reason: expected(allowMonth, answers) };
}

function daysBack(typed: string): number | null {
  if (typed === "today" || typed === "t") return 0;
  if (typed === "yesterday" || typed === "y") return 1;
  const match = /^-(\d{1,3})$/.exec(typed);
  return match ? Number(match[1]) : null;
}

function expected(allowMonth: boolean, answers: boolean): string {
  const forms = [
    "YYYY-MM-DD",
    ...(allowMonth ? ["YYYY-MM"] : []),
    ...(answers ? ["unknown", "refused"] : []),
  ];
  const last = forms.pop() ?? "";
  return forms.length === 0 ? `Write ${last}.` : `Write ${forms.join(", ")} or ${last}.`;
}
