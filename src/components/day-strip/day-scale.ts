import { dayFromNumber, dayNumber } from "../../lib/calendar-day.ts";

/** The one horizontal scale of all day strips: equal days, left to right. */
export type DayScale = {
  from: string;
  to: string;
  /** Width of one day in pixels. */
  dayWidth: number;
  /** Left and right edge of the plot in pixels. */
  left: number;
  right: number;
  /** Left edge of a day, held inside the plot; null when it is no real day. */
  start: (day: string) => number | null;
  /** Right edge of a day, held inside the plot. */
  end: (day: string) => number | null;
  /** Middle of a day; null when the day is off the scale. */
  middle: (day: string) => number | null;
  /** Days that get a label: Mondays, thinned out until the labels have room. */
  ticks: readonly { day: string; x: number }[];
  /** Left edges of all days, empty where they would run together. */
  dayEdges: readonly number[];
};

const roomForLabel = 58;
const roomForDayTick = 5;
const daysPerWeek = 7;

/** Lays days `from` … `to` (both shown) over `left` … `right` pixels. */
export function createDayScale(from: string, to: string, left: number, right: number): DayScale {
  const first = dayNumber(from) ?? 0;
  const last = Math.max(first, dayNumber(to) ?? first);
  const dayWidth = (right - left) / (last - first + 1);
  const edge = (n: number) => left + (n - first) * dayWidth;
  const held = (x: number) => Math.min(right, Math.max(left, x));

  const at = (day: string, offset: number) => {
    const n = dayNumber(day);
    return n === null ? null : edge(n) + offset * dayWidth;
  };

  // 1970-01-01 was a Thursday, so number 4 is a Monday.
  const firstMonday = first + ((((4 - first) % daysPerWeek) + daysPerWeek) % daysPerWeek);
  const weeks = Math.max(1, Math.ceil(roomForLabel / (dayWidth * daysPerWeek)));
  const ticks: { day: string; x: number }[] = [];
  for (let n = firstMonday; n <= last; n += weeks * daysPerWeek) {
    ticks.push({ day: dayFromNumber(n), x: edge(n) });
  }
  const dayEdges: number[] = [];
  if (dayWidth >= roomForDayTick) {
    for (let n = first; n <= last + 1; n++) dayEdges.push(edge(n));
  }

  return {
    from,
    to,
    dayWidth,
    left,
    right,
    start: (day) => {
      const x = at(day, 0);
      return x === null ? null : held(x);
    },
    end: (day) => {
      const x = at(day, 1);
      return x === null ? null : held(x);
    },
    middle: (day) => {
      const x = at(day, 0.5);
      return x === null || x < left || x > right ? null : x;
    },
    ticks,
    dayEdges,
  };
}
