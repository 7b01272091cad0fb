import { type Calendar, DAY_MINUTES } from "./calendar.ts";
import { SLOT, someoneIn } from "./circles.ts";
import { itemAt } from "./item-at.ts";
import { createRng, type Rng } from "./rng.ts";
import type { Town } from "./town.ts";
import type { OutbreakOptions } from "./types.ts";

/** One infection that came to notice; days are indices, minutes count from the first midnight. */
export interface CaseCourse {
  person: number;
  /** Index of the source in the list of cases, -1 when it came from outside. */
  source: number;
  infectionDay: number;
  onsetDay: number;
  symptomatic: boolean;
  specimenDay: number;
  resultDay: number;
  reportMinute: number;
  /** Reported before the result was known. */
  reportedAsSuspected: boolean;
  isolationDay: number;
  verdict: "confirmed" | "probable" | "open";
}

type SpreadOptions = Pick<
  OutbreakOptions,
  "seed" | "infectiousBefore" | "infectiousAfter" | "incubationMin" | "incubationMax"
>;

/**
 * Share of cases per part of town in the three acts (first wave, lull, second wave) by role. The
 * lull is what lets the pairs per person fall below the threshold before they rise again.
 */
const ACTS = {
  main: [0.34, 0.02, 0.12],
  far: [0.23, 0.015, 0.1],
  quiet: [0.08, 0, 0],
  edge: [0.025, 0.003, 0.004],
} as const;
const ORDINARY_ACTS = [0.73, 0.04, 0.23] as const;

/** How many people fall ill for a number of people on record. */
export function plannedCases(people: number): number {
  return Math.round(people * 0.145);
}

function onsetIn(rng: Rng, act: number, days: number): number {
  const stretch = days / 35;
  if (act === 0)
    return Math.round(stretch * Math.min(12.5, Math.max(2.6, 8.5 + 2.4 * rng.normal())));
  if (act === 1) return rng.between(Math.round(13 * stretch), Math.round(23 * stretch));
  return days - 2 - Math.round(Math.min(8, rng.exponential(2.6)) * stretch);
}

/**
 * Runs the infection along the town's contacts. How many fall ill on which day is given by the
 * story (so that any seed tells it); who infects whom follows the contacts: each case gets a source
 * infectious on the day of infection and is one of that person's own circle.
 */
export function spreadInfection(
  town: Town,
  options: SpreadOptions,
  calendar: Calendar,
  people: number,
): CaseCourse[] {
  const rng = createRng(options.seed, 2);
  const { days } = calendar;
  const quietEnd = days - 1 - 2 * options.incubationMax - 3;
  const total = plannedCases(people);
  const ordinary = town.zones.filter((zone) => zone.role === "ordinary");
  const coreTotal =
    ordinary.length > 0
      ? total * (itemAt(town.zones, 0).population / 0.4 / town.population)
      : total;
  const cases: CaseCourse[] = [];
  const ill = new Uint8Array(town.population);

  for (const zone of town.zones) {
    const acts = zone.role === "ordinary" ? ORDINARY_ACTS : ACTS[zone.role];
    const size = zone.role === "ordinary" ? (total - coreTotal) / ordinary.length : coreTotal;
    const quiet = zone.role === "quiet";
    if (quiet && quietEnd < 5) continue;
    const plans: Plan[] = [];
    for (const [act, share] of acts.entries()) {
      const count = Math.round(size * share);
      for (let i = 0; i < count; i += 1) plans.push(planCourse(act, quiet));
    }
    plans.sort((a, b) => a.onsetDay - b.onsetDay);
    const first = cases.length;
    const sources = new Sources(options, days);
    for (const plan of plans) {
      const course = infect(plan, zone.start, zone.end, sources, quiet, cases.length === first);
      cases.push(course);
      sources.add(cases.length - 1, course, rng.gamma(1) ** 1.5);
    }
  }
  return cases;

  type Plan = Omit<CaseCourse, "person" | "source" | "infectionDay">;

  function planCourse(act: number, quiet: boolean): Plan {
    // A later act has a shorter way to the test: the team is known by then. Bounded retries keep
    // every report inside the story; the last resort is a report on the eve of the last day.
    for (let attempt = 0; ; attempt += 1) {
      const onsetDay = quiet ? rng.between(2, quietEnd - 2) : onsetIn(rng, act, days);
      const delay = quiet
        ? rng.between(1, 2)
        : 1 + Math.min(5, Math.round(rng.exponential(act === 2 ? 0.7 : 1.2)));
      const specimenDay = attempt > 30 ? Math.min(days - 2, onsetDay + 1) : onsetDay + delay;
      const resultDay = specimenDay + rng.between(0, quiet ? 1 : 2);
      const roll = rng.next();
      const reportedAsSuspected = rng.chance(0.6);
      const reportDay = reportedAsSuspected ? specimenDay : resultDay;
      const reportMinute = reportDay * DAY_MINUTES + rng.between(8 * 60 + 20, 16 * 60);
      if (reportMinute > calendar.end - 120 && attempt < 60) continue;
      const isolationDay = specimenDay + (rng.chance(0.75) ? 0 : 1);
      const verdict = roll < 0.86 || quiet ? "confirmed" : roll < 0.96 ? "probable" : "open";
      return {
        onsetDay,
        symptomatic: !rng.chance(0.07),
        specimenDay,
        resultDay,
        reportMinute: Math.min(reportMinute, calendar.end - 60),
        reportedAsSuspected: verdict === "confirmed" ? reportedAsSuspected : true,
        isolationDay,
        verdict,
      };
    }
  }

  function infect(
    plan: Plan,
    start: number,
    end: number,
    sources: Sources,
    quiet: boolean,
    isFirst: boolean,
  ): CaseCourse {
    for (let attempt = 0; attempt < 24; attempt += 1) {
      const infectionDay = plan.onsetDay - incubation();
      const source = infectionDay < 0 ? -1 : sources.pick(rng, infectionDay);
      if (source < 0) continue;
      const person = victim(itemAt(cases, source).person, start, end, quiet);
      if (person >= 0) return settle(person, source, infectionDay);
    }
    // From outside: a stranger to the chain; the first of the quiet place works there.
    for (let attempt = 0; attempt < 400; attempt += 1) {
      const person = start + rng.below(end - start);
      const atSite = siteOf(person);
      if (ill[person] === 1 || itemAt(town.age, person) < 5) continue;
      if (quiet && atSite !== town.quietSite) continue;
      if (isFirst && town.careHome >= 0 && atSite !== town.careHome && attempt < 200) {
        if (town.zones[itemAt(town.zone, person)]?.role === "far") continue;
      }
      return settle(person, -1, Math.max(0, plan.onsetDay - incubation()));
    }
    throw new RangeError("the town is too small for so many cases");

    function settle(person: number, source: number, infectionDay: number): CaseCourse {
      ill[person] = 1;
      return { person, source, infectionDay, ...plan };
    }
  }

  function siteOf(person: number): number {
    const group = itemAt(town.member, person * 4 + SLOT.day);
    return group < 0 ? -1 : itemAt(town.groupSite, group);
  }

  function incubation(): number {
    const span = options.incubationMax - options.incubationMin;
    return options.incubationMin + Math.min(span, Math.floor(rng.gamma(2) * span * 0.36));
  }

  function victim(source: number, start: number, end: number, quiet: boolean): number {
    for (let attempt = 0; attempt < 12; attempt += 1) {
      const roll = rng.next();
      let person: number;
      if (roll < 0.32) person = someoneIn(town, rng, source, SLOT.household);
      else if (roll < 0.66 || quiet) person = someoneIn(town, rng, source, SLOT.day);
      else if (roll < 0.92)
        person = someoneIn(town, rng, source, roll < 0.8 ? SLOT.friends : SLOT.relatives);
      else person = start + rng.below(end - start);
      if (person >= 0 && ill[person] === 0) return person;
    }
    return -1;
  }
}

/** Who is infectious on which day, weighted by how much each one spreads. */
class Sources {
  private readonly byDay: { index: number; weight: number }[][];
  private readonly totals: Float64Array;
  private readonly options: SpreadOptions;

  constructor(options: SpreadOptions, days: number) {
    this.options = options;
    this.byDay = Array.from({ length: days }, () => []);
    this.totals = new Float64Array(days);
  }

  add(index: number, course: CaseCourse, weight: number): void {
    const from = Math.max(
      0,
      course.infectionDay + 1,
      course.onsetDay - this.options.infectiousBefore,
    );
    const until = Math.min(course.isolationDay, course.onsetDay + this.options.infectiousAfter);
    for (let day = from; day <= until && day < this.byDay.length; day += 1) {
      this.byDay[day]?.push({ index, weight });
      this.totals[day] = itemAt(this.totals, day) + weight;
    }
  }

  pick(rng: Rng, day: number): number {
    const list = this.byDay[day];
    if (!list || list.length === 0) return -1;
    let rest = rng.next() * itemAt(this.totals, day);
    for (const entry of list) {
      rest -= entry.weight;
      if (rest <= 0) return entry.index;
    }
    return list[list.length - 1]?.index ?? -1;
  }
}
