import type { SummaryQuery } from "../../shared/contracts/network.ts";
import { dayNumber } from "../../shared/core/index.ts";
import { dayIn, endOfDayIn, shiftDay } from "../clock.ts";

/** Settings of an investigation that its figures depend on. */
export type AnalysisSettings = {
  readonly timeZone: string;
  /** Declared population at risk, or null. */
  readonly populationAtRisk: number | null;
  /** Days before and after onset in which a case is taken to be infectious. */
  readonly infectiousBefore: number;
  readonly infectiousAfter: number;
};

/** Days of the trail that stands beside the threshold figure. */
export const TRAIL_DAYS = 14;

/** A cut-off of the record: a local day, and the last instant (ms) that counts for it. */
export type CutOff = { readonly day: string; readonly number: number; readonly at: number };

/** A query with every zone and clock resolved: numbers only, ready for a worker. */
export type ReportQuestion = {
  readonly population: SummaryQuery["population"];
  readonly window: "preset" | "all" | "free";
  /** Days of the free range; null = open on that side. */
  readonly from: number | null;
  readonly to: number | null;
  /** Length of the preset window in days. */
  readonly presetDays: number;
  readonly declaredPopulation: number | null;
  /** Null = the current record. */
  readonly asOf: number | null;
  /** Local day that the preset window ends on. */
  readonly lastDay: number;
  /** Earlier days of the trail, oldest first, as far as they are still to be worked out. */
  readonly trail: readonly CutOff[];
};

/** A question, and how its cut-off is told to people. */
export type AskedReport = {
  readonly question: ReportQuestion;
  /** Local day of the cut-off. */
  readonly day: string;
  readonly asOf: string;
  readonly cutOff: string;
  /** Same key, same answer at the same graph version. */
  readonly key: string;
};

const numberOf = (day: string) => dayNumber(day) ?? 0;

/**
 * Turns a query into a question: which days, up to which instant of the record.
 *
 * A day as cut-off means its end in the investigation's zone, an instant itself included; none
 * means the current record and the local day of `now`. The preset window is the last
 * `infectiousBefore + infectiousAfter + 1` days up to the cut-off's day; `from` or `to` make a free
 * range and win over `window`. The trail is the same question at the end of each of the 13 days
 * before.
 */
export function reportQuestion(
  query: SummaryQuery,
  settings: AnalysisSettings,
  now: Date,
): AskedReport {
  const zone = settings.timeZone;
  const isDay = query.asOf !== undefined && query.asOf.length === 10;
  const day = isDay ? (query.asOf as string) : dayIn(zone, query.asOf ?? now);
  const instant = isDay ? endOfDayIn(zone, day) : new Date(query.asOf ?? now);
  // The end of a day is the first instant that no longer belongs to it.
  const at = isDay ? instant.getTime() - 1 : instant.getTime();
  const isFree = query.from !== undefined || query.to !== undefined;
  const presetDays = settings.infectiousBefore + settings.infectiousAfter + 1;
  const trail: CutOff[] = [];
  for (let back = TRAIL_DAYS - 1; back > 0; back--) {
    const past = shiftDay(day, -back);
    trail.push({ day: past, number: numberOf(past), at: endOfDayIn(zone, past).getTime() - 1 });
  }
  const question: ReportQuestion = {
    population: query.population,
    window: isFree ? "free" : (query.window ?? "preset"),
    from: query.from === undefined ? null : numberOf(query.from),
    to: query.to === undefined ? null : numberOf(query.to),
    presetDays,
    declaredPopulation: settings.populationAtRisk,
    asOf: query.asOf === undefined ? null : at,
    lastDay: numberOf(day),
    trail,
  };
  return {
    question,
    day,
    asOf: query.asOf ?? day,
    cutOff: instant.toISOString(),
    key: JSON.stringify({ ...question, trail: zone }),
  };
}
