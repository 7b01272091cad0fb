import { type Calendar, DAY_MINUTES, dayOf } from "./calendar.ts";
import { itemAt } from "./item-at.ts";
import { createRng } from "./rng.ts";
import type { CaseCourse } from "./spread.ts";
import type { Town } from "./town.ts";
import type { Traced } from "./tracing.ts";
import type { FollowUpCheck } from "./types.ts";

const ROW_LIMIT = 2 ** 24;

export interface FollowedUp {
  checks: FollowUpCheck[];
  /** Contacts whose last three due days or more were all missed. */
  lost: number[];
}

/**
 * Daily calls to contacts: due on days 1 to M after the latest exposure known by then, from the day
 * after they came on record until they become a case. On the last day part of the round is still
 * to be done; the quiet part of town has nobody lost, so that its cluster can be closed.
 */
export function followContacts(
  town: Town,
  seed: number,
  calendar: Calendar,
  monitoringDays: number,
  traced: Traced,
  cases: readonly CaseCourse[],
): FollowedUp {
  const { book, clinic } = traced;
  const onset = new Map(cases.map((course) => [course.person, course.onsetDay]));
  const knownFrom = new Map<number, { recorded: number; last: number }[]>();
  for (const row of traced.exposures) {
    const contact = row.namedBy === row.personA ? row.personB : row.personA;
    const list = knownFrom.get(contact) ?? [];
    if (list.length === 0) knownFrom.set(contact, list);
    list.push({ recorded: row.recorded, last: row.last ?? dayOf(row.recorded) });
  }
  const rows: FollowUpCheck[] = [];
  const minutes: number[] = [];
  const lost: number[] = [];
  const listed = new Set(
    clinic.classifications.filter((row) => row.classification === "contact").map((r) => r.personId),
  );
  for (const personId of listed) follow(personId, knownFrom.get(personId) ?? []);
  // One number per row (minute, then position): a million rows sort as plain numbers.
  const keys = Float64Array.from(minutes, (minute, index) => minute * ROW_LIMIT + index).sort();
  return {
    checks: Array.from(keys, (key) => itemAt(rows, key % ROW_LIMIT)),
    lost,
  };

  function follow(personId: number, known: readonly { recorded: number; last: number }[]): void {
    const rng = createRng(seed, 9, personId);
    const person = itemAt(book.townPerson, personId);
    const quiet = itemAt(town.zones, itemAt(town.zone, person)).role === "quiet";
    const start = dayOf(itemAt(book.recordedMinute, personId)) + 1;
    const caseDay = dayOf(clinic.caseSince.get(personId) ?? calendar.days * DAY_MINUTES);
    const ill = onset.get(person) ?? calendar.days;
    const goneFrom = !quiet && rng.chance(0.045) ? start + rng.between(1, 5) : calendar.days;
    let missedInARow = 0;
    for (let day = start; day < Math.min(calendar.days, caseDay); day += 1) {
      let dayZero = -1;
      for (const { recorded, last } of known) {
        if (recorded < day * DAY_MINUTES) dayZero = Math.max(dayZero, last);
      }
      if (day - dayZero < 1 || day - dayZero > monitoringDays) continue;
      const called = day * DAY_MINUTES + rng.between(8 * 60 + 40, 17 * 60 + 30);
      const gone = day >= goneFrom;
      const missed = gone || rng.chance(0.07);
      const symptoms = !missed && (day >= ill ? rng.chance(0.8) : rng.chance(0.006));
      // Some calls are never entered: those days stay open, which is not the same as missed.
      if (!gone && rng.chance(0.03)) continue;
      const minute = rng.chance(0.05) ? called + rng.between(700, 1500) : called;
      if (minute > calendar.end || (day === calendar.days - 1 && rng.chance(0.4))) continue;
      rows.push({
        personId,
        day: calendar.day(day),
        result: missed ? "missed" : "seen",
        symptoms,
        recordedAt: calendar.instant(minute),
      });
      minutes.push(minute);
      missedInARow = missed ? missedInARow + 1 : 0;
    }
    if (missedInARow >= 3) lost.push(personId);
  }
}
