import { type Calendar, DAY_MINUTES, dayOf } from "./calendar.ts";
import type { Suspect } from "./clinical.ts";
import { itemAt } from "./item-at.ts";
import type { Rng } from "./rng.ts";
import type { CaseCourse } from "./spread.ts";
import type { Town } from "./town.ts";

/** People of the town tested on suspicion over the same weeks who were not cases. */
export function planSuspects(
  town: Town,
  rng: Rng,
  calendar: Calendar,
  cases: readonly CaseCourse[],
  count: number,
): Suspect[] {
  const ill = new Set(cases.map((course) => course.person));
  const suspects: Suspect[] = [];
  for (let attempt = 0; suspects.length < count && attempt < count * 20; attempt += 1) {
    const person = rng.below(town.population);
    const zone = itemAt(town.zones, itemAt(town.zone, person));
    if (ill.has(person) || zone.role === "quiet") continue;
    const day = dayOf(rng.pick(cases).reportMinute) + rng.between(-2, 2);
    const reportMinute = day * DAY_MINUTES + rng.between(9 * 60, 15 * 60);
    if (day < 2 || reportMinute + 30 > calendar.end) continue;
    ill.add(person);
    suspects.push({
      person,
      onsetDay: day - rng.between(0, 2),
      reportMinute,
      resultMinute: (day + rng.between(1, 2)) * DAY_MINUTES + rng.between(9 * 60, 17 * 60),
      falseAlarm: rng.chance(0.15),
    });
  }
  return suspects;
}
