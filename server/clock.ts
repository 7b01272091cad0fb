import { TZDate } from "@date-fns/tz";
import { addDays, format } from "date-fns";

/** The current instant. The one place that reads the clock for what is stored or shown. */
export function now(): Date {
  return new Date();
}

/** The local calendar day (`YYYY-MM-DD`) of an instant in an investigation's zone. */
export function dayIn(zone: string, instant: Date | string): string {
  return format(new TZDate(new Date(instant).getTime(), zone), "yyyy-MM-dd");
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
  return format(addDays(new TZDate(year, month - 1, date, "UTC"), days), "yyyy-MM-dd");
}
