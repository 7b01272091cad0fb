import { TZDate } from "@date-fns/tz";

/** The current instant. The one place that reads the clock for what is stored or shown. */
export function now(): Date {
  return new Date();
}

const dayFormats = new Map<string, Intl.DateTimeFormat>();

/** Writes the local day of an instant; kept for each zone, because making one costs a thousand days. */
function dayFormat(zone: string): Intl.DateTimeFormat {
  let made = dayFormats.get(zone);
  if (!made) {
    made = new Intl.DateTimeFormat("en", {
      timeZone: zone,
      calendar: "gregory",
      year: "numeric",
      month: "2-digit",
      day: "2-digit",
    });
    dayFormats.set(zone, made);
  }
  return made;
}

/** The local calendar day (`YYYY-MM-DD`) of an instant in an investigation's zone. */
export function dayIn(zone: string, instant: Date | string): string {
  const [month, day, year] = dayFormat(zone).format(new Date(instant)).split("/");
  return `${year}-${month}-${day}`;
}

/** The instant at which a local day ends (start of the next day) in a zone. */
export function endOfDayIn(zone: string, day: string): Date {
  const [year, month, date] = day.split("-").map(Number) as [number, number, number];
  return new Date(new TZDate(year, month - 1, date + 1, zone).getTime());
}

/** The instant at which a local day starts in a zone. */
export function startOfDayIn(zone: string, day: string): Date {
  return endOfDayIn(zone, shiftDay(day, -1));
}

/** A day moved by whole days; no zone is involved. */
export function shiftDay(day: string, days: number): string {
  const [year, month, date] = day.split("-").map(Number) as [number, number, number];
  return new Date(Date.UTC(year, month - 1, date + days)).toISOString().slice(0, 10);
}
