/** A calendar day, `YYYY-MM-DD`. Never an instant: no time zone can shift it. */
export type Day = string;

const dayPattern = /^(\d{4})-(\d{2})-(\d{2})$/;
const msPerDay = 86_400_000;

/** Days since 1970-01-01; null when the text is no real calendar day (2026-02-30 is none). */
export function dayNumber(day: string): number | null {
  const match = dayPattern.exec(day);
  if (!match) return null;
  const year = Number(match[1]);
  const month = Number(match[2]);
  const date = Number(match[3]);
  const at = new Date(Date.UTC(year, month - 1, date));
  if (at.getUTCFullYear() !== year || at.getUTCMonth() !== month - 1) return null;
  if (at.getUTCDate() !== date) return null;
  return at.getTime() / msPerDay;
}

/** The day with this number, the inverse of `dayNumber`. */
export function dayFromNumber(n: number): Day {
  return new Date(n * msPerDay).toISOString().slice(0, 10);
}

/** The day some days later (or earlier, when negative); the day itself when it is not a real one. */
export function addDays(day: Day, days: number): Day {
  const n = dayNumber(day);
  return n === null ? day : dayFromNumber(n + days);
}

/** Whole days from one day to another; null when either is not a real day. */
export function daysBetween(from: Day, to: Day): number | null {
  const a = dayNumber(from);
  const b = dayNumber(to);
  return a === null || b === null ? null : b - a;
}
