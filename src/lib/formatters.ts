import { dayNumber, daysBetween } from "./calendar-day.ts";

/** What stands where a figure could not be worked out. It is not 0. */
export const noValue = "—";

type Locale = string | undefined;

const numberFormats = new Map<string, Intl.NumberFormat>();
const dateFormats = new Map<string, Intl.DateTimeFormat>();

function numberFormat(locale: Locale, options: Intl.NumberFormatOptions): Intl.NumberFormat {
  const key = `${locale ?? ""}${JSON.stringify(options)}`;
  const kept = numberFormats.get(key) ?? new Intl.NumberFormat(locale, options);
  numberFormats.set(key, kept);
  return kept;
}

function dateFormat(locale: Locale, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${locale ?? ""}${JSON.stringify(options)}`;
  const kept = dateFormats.get(key) ?? new Intl.DateTimeFormat(locale, options);
  dateFormats.set(key, kept);
  return kept;
}

/** A number by locale; whole numbers unless decimals are asked for; "—" for null and non-finite. */
export function formatNumber(
  value: number | null | undefined,
  { decimals = 0, locale }: { decimals?: number; locale?: string } = {},
): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return noValue;
  return numberFormat(locale, {
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
  }).format(value);
}

/** "1.28–1.78"; "—" when either end is missing. */
export function formatInterval(
  interval: readonly [number, number] | null | undefined,
  { decimals = 2, locale }: { decimals?: number; locale?: string } = {},
): string {
  if (!interval?.every(Number.isFinite)) return noValue;
  return interval.map((end) => formatNumber(end, { decimals, locale })).join("–");
}

/** "1.52 (1.28–1.78)"; the value alone when it has no interval. */
export function formatEstimate(
  value: number | null | undefined,
  interval: readonly [number, number] | null | undefined,
  { decimals = 2, locale }: { decimals?: number; locale?: string } = {},
): string {
  const shown = formatNumber(value, { decimals, locale });
  if (shown === noValue || !interval) return shown;
  return `${shown} (${formatInterval(interval, { decimals, locale })})`;
}

/** A share 0 … 1 as a percentage by locale, "31 %" or "31%"; "—" for null. */
export function formatShare(
  share: number | null | undefined,
  { decimals = 0, locale }: { decimals?: number; locale?: string } = {},
): string {
  if (share === null || share === undefined || !Number.isFinite(share)) return noValue;
  return numberFormat(locale, {
    style: "percent",
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
  }).format(share);
}

/** "19 of 31 (61 %)"; without the percentage when the whole is 0 or under `minimum` (default 10). */
export function formatPart(
  part: number,
  whole: number,
  { minimum = 10, locale }: { minimum?: number; locale?: string } = {},
): string {
  const counts = `${formatNumber(part, { locale })} of ${formatNumber(whole, { locale })}`;
  if (whole < minimum || whole === 0) return counts;
  return `${counts} (${formatShare(part / whole, { locale })})`;
}

const dayStyles = {
  /** 18 May */
  short: { day: "numeric", month: "short" },
  /** 18 May 2026 */
  medium: { day: "numeric", month: "short", year: "numeric" },
  /** Mon 18 May 2026 */
  long: { weekday: "short", day: "numeric", month: "short", year: "numeric" },
} as const satisfies Record<string, Intl.DateTimeFormatOptions>;

export type DayStyle = keyof typeof dayStyles;

/**
 * A day (`YYYY-MM-DD`) or a month (`YYYY-MM`) by locale. The words unknown and refused are passed
 * through; blank and null become "—"; anything else is shown as it stands, never repaired.
 */
export function formatDay(
  day: string | null | undefined,
  { style = "medium", locale }: { style?: DayStyle; locale?: string } = {},
): string {
  if (day === null || day === undefined || day === "") return noValue;
  const number = dayNumber(day);
  if (number !== null) {
    // Written in UTC from a UTC midnight: the reader's own zone cannot move it to another day.
    return dateFormat(locale, { ...dayStyles[style], timeZone: "UTC" }).format(number * 86_400_000);
  }
  const first = /^\d{4}-\d{2}$/.test(day) ? dayNumber(`${day}-01`) : null;
  if (first === null) return day;
  return dateFormat(locale, { month: "long", year: "numeric", timeZone: "UTC" }).format(
    first * 86_400_000,
  );
}

/** An instant (ISO text) in the given IANA zone: "27 May 2026, 18:00"; "—" for null or no instant. */
export function formatInstant(
  instant: string | null | undefined,
  zone: string,
  { withDay = true, locale }: { withDay?: boolean; locale?: string } = {},
): string {
  if (!instant) return noValue;
  const at = Date.parse(instant);
  if (Number.isNaN(at)) return noValue;
  return dateFormat(locale, {
    ...(withDay ? dayStyles.medium : {}),
    hour: "2-digit",
    minute: "2-digit",
    hourCycle: "h23",
    timeZone: zone,
  }).format(at);
}

/** "today", "yesterday", "3 days ago", "in 2 days", by locale; "—" when either is no real day. */
export function formatRelativeDay(
  day: string | null | undefined,
  today: string,
  { locale }: { locale?: string } = {},
): string {
  const days = day ? daysBetween(today, day) : null;
  if (days === null) return noValue;
  return new Intl.RelativeTimeFormat(locale, { numeric: "auto" }).format(days, "day");
}

/** "1 person", "12 people": a count with its noun. */
export function formatCount(
  count: number | null | undefined,
  one: string,
  many: string,
  { locale }: { locale?: string } = {},
): string {
  return `${formatNumber(count, { locale })} ${count === 1 ? one : many}`;
}
