const DAY_MS = 86_400_000;
export const DAY_MINUTES = 1440;

/**
 * The story's own calendar: day indices count from 0 (first day) and times are whole minutes from
 * the first local midnight, so that the model never meets a Date.
 */
export interface Calendar {
  readonly days: number;
  /** Last minute on which anything is recorded. */
  readonly end: number;
  /** YYYY-MM-DD of a day index; indices outside the story are allowed (birth dates). */
  day(index: number): string;
  /** UTC instant of a minute, ISO 8601 with milliseconds. */
  instant(minute: number): string;
}

/**
 * Calendar for a story of `days` days ending on `lastDay`.
 * @throws RangeError when lastDay is not a real YYYY-MM-DD day.
 */
export function createCalendar(
  lastDay: string,
  days: number,
  lastMinute: number,
  offsetMinutes: number,
): Calendar {
  const last = Date.parse(`${lastDay}T00:00:00.000Z`);
  // Some calendars' mistakes (30 February) parse as the day after: only a round trip shows them.
  if (Number.isNaN(last) || new Date(last).toISOString().slice(0, 10) !== lastDay) {
    throw new RangeError("lastDay must be YYYY-MM-DD");
  }
  const first = last - (days - 1) * DAY_MS;
  const dayNames = new Map<number, string>();
  const instants = new Map<number, string>();
  return {
    days,
    end: (days - 1) * DAY_MINUTES + lastMinute,
    day(index) {
      let name = dayNames.get(index);
      if (name === undefined) {
        name = new Date(first + index * DAY_MS).toISOString().slice(0, 10);
        dayNames.set(index, name);
      }
      return name;
    },
    instant(minute) {
      let text = instants.get(minute);
      if (text === undefined) {
        text = new Date(first + (minute - offsetMinutes) * 60_000).toISOString();
        instants.set(minute, text);
      }
      return text;
    },
  };
}

/** Day index a minute falls on. */
export function dayOf(minute: number): number {
  return Math.floor(minute / DAY_MINUTES);
}
