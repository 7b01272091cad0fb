import { isCalendarDay } from "./contracts/common.ts";

/** A run of days, both ends included. */
export interface DayWindow {
  from: string;
  to: string;
}

/** Moves a day by whole days (UTC arithmetic on the calendar, no zone). */
export function addDays(day: string, days: number): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
}

/** Settings that windows are computed from, in days. */
export interface WindowSettings {
  infectiousBefore: number;
  infectiousAfter: number;
  incubationMin: number;
  incubationMax: number;
}

/** Dates of a case that windows need. Anything but a full day counts as not known. */
export interface CaseDates {
  onsetDate: string | null;
  /** Specimen day of the first positive test. */
  firstPositiveSpecimen: string | null;
  isolationDate: string | null;
}

const full = (value: string | null): string | null =>
  value !== null && isCalendarDay(value) ? value : null;

/**
 * Infectious window of a case (forward tracing): from `infectiousBefore` days before the reference
 * day to the earlier of isolation and reference + `infectiousAfter`. The reference is the onset
 * day, else the specimen day of the first positive test; `basis` says which. Without one the
 * window is unknown (null), not "all time".
 */
export function infectiousWindow(
  dates: CaseDates,
  settings: WindowSettings,
): (DayWindow & { basis: "onset" | "specimen" }) | null {
  const onset = full(dates.onsetDate);
  const reference = onset ?? full(dates.firstPositiveSpecimen);
  if (!reference) return null;
  const from = addDays(reference, -settings.infectiousBefore);
  const last = addDays(reference, settings.infectiousAfter);
  const isolation = full(dates.isolationDate);
  const to = isolation && isolation < last ? isolation : last;
  return { from, to: to < from ? from : to, basis: onset ? "onset" : "specimen" };
}

/** Source window (backward tracing): the days on which infection can have happened, from onset. */
export function sourceWindow(dates: CaseDates, settings: WindowSettings): DayWindow | null {
  const onset = full(dates.onsetDate);
  if (!onset) return null;
  return {
    from: addDays(onset, -settings.incubationMax),
    to: addDays(onset, -settings.incubationMin),
  };
}

/** Follow-up of a contact: day 0 is the last exposure day, due days are day 1 to day M. */
export function monitoringPeriod(
  lastExposures: readonly (string | null)[],
  monitoringDays: number,
): { dayZero: string; lastDueDay: string; dueDays: string[] } | null {
  const days = lastExposures.flatMap((day) => full(day) ?? []).sort();
  const dayZero = days.at(-1);
  if (!dayZero) return null;
  const dueDays = Array.from({ length: monitoringDays }, (_, index) => addDays(dayZero, index + 1));
  return { dayZero, lastDueDay: dueDays.at(-1) ?? dayZero, dueDays };
}
