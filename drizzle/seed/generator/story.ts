import { type Calendar, DAY_MINUTES, dayOf } from "./calendar.ts";
import type { FollowedUp } from "./follow-up.ts";
import { itemAt } from "./item-at.ts";
import { pairKey } from "./pair-ledger.ts";
import type { CaseCourse } from "./spread.ts";
import type { Town } from "./town.ts";
import type { Traced } from "./tracing.ts";
import type { Classification, GroupJoin, OutbreakOptions, Story, TrailPoint } from "./types.ts";
import { createGroups } from "./union-find.ts";

const TRAIL_DAYS = 14;

/** What happened, worked out again from the finished rows (never from what was planned). */
export function tellStory(
  town: Town,
  options: Pick<OutbreakOptions, "infectiousBefore" | "infectiousAfter">,
  calendar: Calendar,
  traced: Traced,
  cases: readonly CaseCourse[],
  followed: FollowedUp,
): Story {
  const { clinic, book } = traced;
  const latest = new Map<number, Classification>();
  const wasContact = new Set<number>();
  for (const row of clinic.classifications) {
    if (row.classification === "contact") wasContact.add(row.personId);
    latest.set(row.personId, row.classification);
  }
  const isCase = (id: number) =>
    ["confirmed", "probable", "suspected"].includes(latest.get(id) ?? "");
  const windowDays = options.infectiousBefore + options.infectiousAfter + 1;
  const trail = traceThreshold(town.population, calendar, traced, windowDays);
  const caseIds = [...latest.keys()].filter(isCase).sort((a, b) => a - b);
  return {
    place: "Sallow Bay",
    illness: "shore fever",
    firstDay: calendar.day(0),
    lastDay: calendar.day(calendar.days - 1),
    populationAtRisk: town.population,
    casesOnRecord: caseIds.length,
    join: describeJoin(town, calendar, traced),
    quiet: describeQuiet(town, calendar, traced, cases, isCase),
    windowDays,
    trail,
    crossingDay: findCrossing(trail),
    lostContacts: followed.lost,
    becameCases: caseIds.filter((id) => wasContact.has(id)),
    duplicates: traced.duplicates,
    lateInterviews: traced.lateInterviews,
    reclassified: clinic.discarded.filter((id) => id < book.people.length),
    forgotten: traced.forgotten,
  };
}

function traceThreshold(
  n: number,
  calendar: Calendar,
  traced: Traced,
  windowDays: number,
): TrailPoint[] {
  const trail: TrailPoint[] = [];
  for (let day = Math.max(0, calendar.days - TRAIL_DAYS); day < calendar.days; day += 1) {
    const cutOff = (day + 1) * DAY_MINUTES;
    const from = day - windowDays + 1;
    const interviewed = new Set<number>();
    for (const row of traced.interviews) {
      const told = row.outcome === "complete" || row.outcome === "partial";
      if (told && row.recorded < cutOff) interviewed.add(row.personId);
    }
    const pairs = new Set<number>();
    for (const row of traced.exposures) {
      if (row.recorded >= cutOff || (row.withdrawn !== null && row.withdrawn < cutOff)) continue;
      if (row.first === null || row.last === null || row.first > day || row.last < from) continue;
      if (!interviewed.has(row.personA) && !interviewed.has(row.personB)) continue;
      pairs.add(pairKey(row.personA, row.personB));
    }
    const i = interviewed.size;
    const eligible = (i * (i - 1)) / 2 + i * (n - i);
    trail.push({
      day: calendar.day(day),
      interviewed: i,
      pairs: pairs.size,
      pairsPerPerson: eligible > 0 ? ((n - 1) * pairs.size) / eligible : null,
    });
  }
  return trail;
}

function findCrossing(trail: readonly TrailPoint[]): string | null {
  let crossing: string | null = null;
  for (let i = Math.max(1, trail.length - 7); i < trail.length; i += 1) {
    const before = trail[i - 1]?.pairsPerPerson ?? null;
    const point = itemAt(trail, i);
    if (before !== null && before <= 1 && (point.pairsPerPerson ?? 0) > 1) crossing = point.day;
  }
  return crossing;
}

function describeJoin(town: Town, calendar: Calendar, traced: Traced): GroupJoin | null {
  const row = traced.joining < 0 ? undefined : traced.exposures[traced.joining];
  if (!row || row.interviewId === null) return null;
  const groups = createGroups(traced.book.people.length);
  for (const other of traced.exposures) {
    const standing = other.withdrawn === null || other.withdrawn > row.recorded;
    if (other !== row && other.recorded <= row.recorded && standing)
      groups.join(other.personA, other.personB);
  }
  const { personA, personB, interviewId } = row;
  if (groups.root(personA) === groups.root(personB)) return null;
  const area = (id: number) => {
    const person = itemAt(traced.book.townPerson, id);
    return itemAt(town.districts, itemAt(town.district, person));
  };
  return {
    day: calendar.day(dayOf(row.recorded)),
    recordedAt: calendar.instant(row.recorded),
    interviewId,
    personA,
    personB,
    sizes: [groups.size(personA), groups.size(personB)],
    areas: [area(personA), area(personB)],
  };
}

function describeQuiet(
  town: Town,
  calendar: Calendar,
  traced: Traced,
  cases: readonly CaseCourse[],
  isCase: (id: number) => boolean,
): Story["quiet"] {
  const { book } = traced;
  const name = town.sites[town.quietSite]?.name;
  const place = book.places.find((entry) => entry.name === name);
  const zone = town.zones.findIndex((entry) => entry.role === "quiet");
  const there = cases.filter((course) => itemAt(town.zone, course.person) === zone);
  const ids = there
    .map((course) => book.recordOf(course.person))
    .filter((id) => id >= 0 && isCase(id));
  if (!place || ids.length < 2) return null;
  const last = Math.max(...there.map((c) => (c.symptomatic ? c.onsetDay : c.specimenDay)));
  return { placeId: place.id, name: place.name, cases: ids, lastCaseDay: calendar.day(last) };
}
