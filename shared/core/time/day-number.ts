/** Stands for "no day" in Int32 day columns; no calendar day has this number. */
export const MISSING_DAY = -2147483648;

const DAY = /^(\d{4})-(\d{2})-(\d{2})$/;
const DAYS_BEFORE_MONTH = [0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334, 365];

function isLeap(year: number): boolean {
  return (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
}

/** Days from 0000-01-01 to 1 January of `year` (year 0 is a leap year). */
function daysBeforeYear(year: number): number {
  if (year === 0) return 0;
  const past = year - 1;
  return 365 * year + 1 + Math.floor(past / 4) - Math.floor(past / 100) + Math.floor(past / 400);
}

const EPOCH = daysBeforeYear(1970);
const LAST = daysBeforeYear(9999) + 364 - EPOCH;

/** Days of the year before `month` (1 … 13). */
function daysBefore(month: number, leap: boolean): number {
  return (DAYS_BEFORE_MONTH[month - 1] ?? 0) + (leap && month > 2 ? 1 : 0);
}

/**
 * Number of a civil day: days since 1970-01-01, in the proleptic Gregorian calendar. A day is a
 * label in the investigation's own calendar, so no zone is involved.
 *
 * @param day `YYYY-MM-DD`, years 0000 … 9999
 * @returns the number, or null for a partial day (`YYYY-MM`), a day the calendar does not have, or
 *   any other text: a partial day is never completed silently
 *
 * Cost: O(1). Source: Gregorian leap-year rule.
 */
export function dayNumber(day: string): number | null {
  const parts = DAY.exec(day);
  if (!parts) return null;
  const [year, month, date] = [Number(parts[1]), Number(parts[2]), Number(parts[3])];
  if (month < 1 || month > 12) return null;
  const leap = isLeap(year);
  const before = daysBefore(month, leap);
  if (date < 1 || date > daysBefore(month + 1, leap) - before) return null;
  return daysBeforeYear(year) + before + date - 1 - EPOCH;
}

/**
 * The civil day of a day number, as `YYYY-MM-DD`; the inverse of `dayNumber`.
 *
 * @throws RangeError for a number that is not whole or lies outside the years 0000 … 9999
 */
export function dayString(number: number): string {
  if (!Number.isInteger(number) || number < -EPOCH || number > LAST) {
    throw new RangeError("day number outside the years 0000 … 9999");
  }
  const days = number + EPOCH;
  // 146,097 days make 400 years: the guess is off by at most one.
  let year = Math.floor((days * 400) / 146097);
  if (daysBeforeYear(year) > days) year--;
  else if (daysBeforeYear(year + 1) <= days) year++;
  const leap = isLeap(year);
  const ordinal = days - daysBeforeYear(year);
  let month = 1;
  while (daysBefore(month + 1, leap) <= ordinal) month++;
  const date = ordinal - daysBefore(month, leap) + 1;
  const two = (value: number) => String(value).padStart(2, "0");
  return `${String(year).padStart(4, "0")}-${two(month)}-${two(date)}`;
}
