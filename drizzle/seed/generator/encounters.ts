import { groupOf, othersIn, SLOT, sharedSlot, someoneIn } from "./circles.ts";
import { itemAt } from "./item-at.ts";
import type { Rng } from "./rng.ts";
import type { CaseCourse } from "./spread.ts";
import type { Town } from "./town.ts";
import type { Exposure, Setting } from "./types.ts";

/** How close a kind of meeting is; `blank` is the share of each answer that nobody remembers. */
interface Closeness {
  blank: number;
  minutes: readonly number[];
  distances: readonly number[];
  physical: number;
  indoors: number;
}

const PASSING = [0.5, 1, 1, 1.5, 2, 3];
const CLOSENESS = {
  household: { blank: 0.12, minutes: [240, 480, 600], distances: [0.5], physical: 0.9, indoors: 1 },
  day: {
    blank: 0.08,
    minutes: [15, 20, 30, 45, 60, 120, 240, 420],
    distances: PASSING,
    physical: 0.2,
    indoors: 0.85,
  },
  care: {
    blank: 0.06,
    minutes: [15, 20, 30, 45, 60],
    distances: [0.5, 1],
    physical: 0.7,
    indoors: 1,
  },
  social: {
    blank: 0.08,
    minutes: [15, 30, 60, 90, 120, 180],
    distances: PASSING,
    physical: 0.4,
    indoors: 0.65,
  },
  passing: {
    blank: 0.14,
    minutes: [10, 15, 15, 20, 30, 45],
    distances: PASSING,
    physical: 0.06,
    indoors: 0.5,
  },
} as const satisfies Record<string, Closeness>;
const FRIENDS = ["friend", "neighbour"] as const;
const STRANGERS = ["customer", "acquaintance"] as const;
const ADULT_KIN = ["partner", "partner", "housemate"] as const;

/** A contact as told in an interview, still in terms of the town; days are indices. */
export interface Encounter
  extends Pick<
    Exposure,
    "setting" | "minutes" | "distanceM" | "physical" | "indoors" | "relation"
  > {
  person: number;
  /** Site of the town, or -1. */
  site: number;
  /** Household group whose home it was, or -1. */
  home: number;
  first: number | null;
  last: number | null;
}

export interface Telling {
  course: CaseCourse;
  /** Days (indices) the case is asked about, both included. */
  from: number;
  until: number;
  interviewDay: number;
  /** How many names to aim for. */
  names: number;
  /** Probability that a name is of somebody not yet on record. */
  newShare: number;
  onRecord(person: number): boolean;
  /** Cases tied to this one by infection: the source and those infected before the interview. */
  ties: readonly { person: number; day: number; recall: number }[];
  /** People told before in an earlier interview of the same case. */
  told: ReadonlySet<number>;
}

/** The people a case names, and how many they forgot. */
export function tellContacts(
  town: Town,
  rng: Rng,
  telling: Telling,
): { encounters: Encounter[]; forgotten: number } {
  const { course, names } = telling;
  const encounters: Encounter[] = [];
  const used = new Set(telling.told).add(course.person);
  let forgotten = 0;
  if (names <= 0) return { encounters, forgotten };
  for (const tie of telling.ties) {
    if (used.has(tie.person)) continue;
    used.add(tie.person);
    if (!rng.chance(tie.recall)) forgotten += 1;
    else encounters.push(describeEncounter(town, rng, telling, tie.person, tie.day));
  }
  for (const other of othersIn(town, course.person, SLOT.household)) {
    if (used.has(other)) continue;
    used.add(other);
    if (!rng.chance(0.96)) forgotten += 1;
    else encounters.push(describeEncounter(town, rng, telling, other, null));
  }
  for (let turn = 0; encounters.length < names && turn < names * 3 + 10; turn += 1) {
    const person = choose(town, rng, telling, used);
    if (person < 0) continue;
    used.add(person);
    const recall = sharedSlot(town, course.person, person) < 0 ? 0.62 : 0.84;
    if (!rng.chance(recall)) forgotten += 1;
    else encounters.push(describeEncounter(town, rng, telling, person, null));
  }
  return { encounters, forgotten };
}

function choose(town: Town, rng: Rng, telling: Telling, used: ReadonlySet<number>): number {
  const wantNew = rng.chance(telling.newShare);
  const self = telling.course.person;
  const zone = itemAt(town.zones, itemAt(town.zone, self));
  let spare = -1;
  for (let attempt = 0; attempt < 16; attempt += 1) {
    const roll = rng.next();
    let person: number;
    if (attempt >= 8 || roll < 0.25) {
      // Only ordinary parts of town mix with each other; the story's own parts keep to themselves.
      const elsewhere = zone.role === "ordinary" && rng.chance(0.04);
      const from = elsewhere ? town.zones.find((z) => z.role === "ordinary")?.start : zone.start;
      const until = elsewhere ? town.population : zone.end;
      person = (from ?? zone.start) + rng.below(until - (from ?? zone.start));
    } else if (roll < 0.64) person = someoneIn(town, rng, self, SLOT.day);
    else person = someoneIn(town, rng, self, roll < 0.85 ? SLOT.friends : SLOT.relatives);
    if (person < 0 || used.has(person)) continue;
    if (telling.onRecord(person) !== wantNew) return person;
    spare = person;
  }
  return spare;
}

/** Fills in day, setting, place and closeness of one meeting; `day` fixes it when it is known. */
export function describeEncounter(
  town: Town,
  rng: Rng,
  telling: Pick<Telling, "course" | "from" | "until">,
  person: number,
  day: number | null,
): Encounter {
  const self = telling.course.person;
  const slot = sharedSlot(town, self, person);
  const { from, until } = telling;
  let first: number | null = day ?? rng.between(from, until);
  let last: number | null =
    day ?? Math.min(until, first + (rng.chance(0.35) ? rng.between(1, 3) : 0));
  if (slot === SLOT.household) {
    first = Math.min(from, day ?? from);
    last = until;
  } else if (rng.chance(0.015)) {
    first = null;
    last = null;
  }
  // One literal at the end, no spreading: there are hundreds of thousands of these at load size.
  let setting: Setting;
  let closeness: Closeness;
  let relation: string | null;
  let site = -1;
  let home = -1;
  if (slot === SLOT.household) {
    setting = "household";
    closeness = CLOSENESS.household;
    home = groupOf(town, self, SLOT.household);
    relation = kinship(town, rng, self, person);
  } else if (slot === SLOT.day) {
    site = itemAt(town.groupSite, groupOf(town, self, SLOT.day));
    setting = itemAt(town.sites, site).setting;
    closeness = setting === "health_care" ? CLOSENESS.care : CLOSENESS.day;
    const age = itemAt(town.age, person);
    if (setting === "school") relation = age < 18 ? "classmate" : "teacher";
    else relation = setting === "health_care" && age > 70 ? "resident" : "colleague";
  } else if (slot >= 0) {
    setting = "social";
    closeness = CLOSENESS.social;
    if (rng.chance(0.4)) home = groupOf(town, rng.chance(0.5) ? self : person, SLOT.household);
    relation = slot === SLOT.friends ? rng.pick(FRIENDS) : "relative";
  } else {
    const inTransit = rng.chance(0.3);
    const nearMarket = itemAt(town.zones, itemAt(town.zone, self)).role === "main";
    setting = inTransit ? "transport" : "other";
    closeness = CLOSENESS.passing;
    if (!inTransit && nearMarket && rng.chance(0.6)) site = town.market;
    relation = inTransit ? "fellow passenger" : rng.pick(STRANGERS);
    if (rng.chance(0.1)) relation = null;
  }
  return {
    person,
    first,
    last,
    site,
    home,
    setting,
    minutes: rng.chance(closeness.blank) ? null : rng.pick(closeness.minutes),
    distanceM: rng.chance(closeness.blank) ? null : rng.pick(closeness.distances),
    physical: rng.chance(closeness.blank) ? null : rng.chance(closeness.physical),
    indoors: rng.chance(closeness.blank) ? null : rng.chance(closeness.indoors),
    relation,
  };
}

function kinship(town: Town, rng: Rng, self: number, other: number): string {
  const gap = itemAt(town.age, other) - itemAt(town.age, self);
  if (gap > 17) return "parent";
  if (gap < -17) return "child";
  if (itemAt(town.age, self) < 20) return "sibling";
  return rng.pick(ADULT_KIN);
}
