import { SLOT, SLOTS } from "./circles.ts";
import { itemAt } from "./item-at.ts";
import { inventGroundName } from "./names.ts";
import { createRng, type Rng } from "./rng.ts";
import {
  CARE_JOBS,
  planZones,
  SAIL_JOBS,
  SCHOOL_JOBS,
  type Site,
  TRADES,
  type ZonePlan,
} from "./sites.ts";

/**
 * Everybody who lives in the town, as flat arrays; person i lives in the zone whose range holds i.
 * A group is a household, a workplace, a school class, the care home or a circle of friends.
 */
export interface Town {
  population: number;
  zones: (ZonePlan & { start: number; end: number; firstDistrict: number })[];
  districts: string[];
  sites: Site[];
  zone: Uint16Array;
  district: Uint16Array;
  age: Uint8Array;
  /** Group of person i in a slot at [i * 4 + slot], or -1. */
  member: Int32Array;
  /** Site of a group, or -1. */
  groupSite: Int32Array;
  /** People of group g are groupPeople[groupStart[g] .. groupStart[g + 1]). */
  groupStart: Int32Array;
  groupPeople: Int32Array;
  market: number;
  ferry: number;
  careHome: number;
  quietSite: number;
}

const HOUSEHOLD_SIZES = [1, 1, 1, 1, 2, 2, 2, 2, 2, 3, 3, 3, 4, 4, 4, 5, 5, 6];
const GROUND_KINDS = ["Ward", "Reach", "Common", "Green"];

function ageIn(rng: Rng, position: number, size: number): number {
  if (position === 0) return size > 2 ? rng.between(26, 58) : rng.between(20, 88);
  if (position === 1)
    return size === 2 && rng.chance(0.12) ? rng.between(4, 17) : rng.between(22, 80);
  return rng.chance(0.82) ? rng.between(0, 19) : rng.between(18, 79);
}

/** Builds the town for a seed and a number of people on record; pure. */
export function buildTown(seed: number, people: number): Town {
  const rng = createRng(seed, 1);
  const plans = planZones(people, () => inventGroundName(rng, GROUND_KINDS));
  const population = plans.reduce((sum, plan) => sum + plan.population, 0);
  const zone = new Uint16Array(population);
  const district = new Uint16Array(population);
  const age = new Uint8Array(population);
  const member = new Int32Array(population * SLOTS).fill(-1);
  const groupSite: number[] = [];
  const sites: Site[] = [];
  const districts: string[] = [];
  const zones: Town["zones"] = [];
  const used = new Set<string>();
  const addGroup = (site: number) => groupSite.push(site) - 1;
  const addSite = (site: Site) => sites.push(site) - 1;
  const join = (person: number, slot: number, group: number) => {
    member[person * SLOTS + slot] = group;
  };

  let start = 0;
  for (const [zoneIndex, plan] of plans.entries()) {
    const end = start + plan.population;
    const firstDistrict = districts.length;
    districts.push(...plan.districts);
    zones.push({ ...plan, start, end, firstDistrict });
    const residents = plan.role === "far" ? Math.min(34, Math.floor(plan.population / 12)) : 0;
    zone.fill(zoneIndex, start, end);

    // Households; the first people of the far part live in the care home instead.
    for (let person = start; person < end; ) {
      const size =
        person < start + residents ? 1 : Math.min(rng.pick(HOUSEHOLD_SIZES), end - person);
      const share = (person - start) / plan.population;
      const home =
        firstDistrict +
        Math.min(plan.districts.length - 1, Math.floor(share * plan.districts.length));
      const group = person < start + residents ? -1 : addGroup(-1);
      for (let position = 0; position < size; position += 1, person += 1) {
        district[person] = home;
        age[person] = group < 0 ? rng.between(72, 96) : ageIn(rng, position, size);
        join(person, SLOT.household, group);
      }
    }
    fillDayGroups(start, end, residents, firstDistrict, plan);
    for (const slot of [SLOT.friends, SLOT.relatives]) fillCircles(start, end, slot);
    start = end;
  }

  function shuffled(from: number, to: number, keep: (person: number) => boolean): number[] {
    const list: number[] = [];
    for (let person = from; person < to; person += 1) if (keep(person)) list.push(person);
    for (let i = list.length - 1; i > 0; i -= 1) {
      const j = rng.below(i + 1);
      const swap = itemAt(list, i);
      list[i] = itemAt(list, j);
      list[j] = swap;
    }
    return list;
  }

  function fillDayGroups(
    from: number,
    to: number,
    residents: number,
    firstDistrict: number,
    plan: ZonePlan,
  ): void {
    const workers = shuffled(
      from + residents,
      to,
      (p) => itemAt(age, p) >= 18 && itemAt(age, p) <= 66 && rng.chance(0.76),
    );
    const staff = (count: number, site: number, group = addGroup(site)): number => {
      for (const person of workers.splice(0, count)) join(person, SLOT.day, group);
      return group;
    };
    const area = () => firstDistrict + rng.below(plan.districts.length);
    if (plan.role === "quiet") {
      staff(
        26,
        addSite({
          name: "Tarn Lane Sailworks",
          setting: "workplace",
          district: firstDistrict,
          jobs: SAIL_JOBS,
        }),
      );
    }
    if (residents > 0) {
      const site = addSite({
        name: "Lantern House",
        setting: "health_care",
        district: firstDistrict + 1,
        jobs: CARE_JOBS,
      });
      const home = staff(16, site);
      for (let person = from; person < from + residents; person += 1) join(person, SLOT.day, home);
    }
    if (plan.role === "main" || plan.role === "ordinary") {
      const label = plan.role === "main" ? "Sallow Bay" : plan.districts[0];
      const site = addSite({
        name: `${label} School`,
        setting: "school",
        district: firstDistrict,
        jobs: SCHOOL_JOBS,
      });
      const pupils = shuffled(from, to, (p) => itemAt(age, p) >= 5 && itemAt(age, p) <= 17);
      pupils.sort((a, b) => itemAt(age, a) - itemAt(age, b));
      for (let i = 0; i < pupils.length; i += 22) {
        const group = staff(2, site);
        for (const pupil of pupils.slice(i, i + 22)) join(pupil, SLOT.day, group);
      }
    }
    const trades = TRADES.flatMap((trade) => Array.from({ length: trade.share }, () => trade));
    while (workers.length > 0) {
      const trade = rng.pick(trades);
      let name = inventGroundName(rng, [trade.kind]);
      // A large town runs out of names; a demo-sized one never shows two places of one name.
      for (let again = 0; used.has(name) && again < 8; again += 1) {
        name = inventGroundName(rng, [trade.kind]);
      }
      used.add(name);
      const size = Math.min(40, 3 + Math.round(rng.exponential(9)));
      staff(size, addSite({ name, setting: trade.setting, district: area(), jobs: trade.jobs }));
    }
  }

  function fillCircles(from: number, to: number, slot: number): void {
    const list = shuffled(from, to, (p) => itemAt(age, p) >= 3);
    for (let i = 0; i < list.length; ) {
      const size = rng.between(4, 10);
      const group = addGroup(-1);
      for (const person of list.slice(i, i + size)) join(person, slot, group);
      i += size;
    }
  }

  const named = (name: string) => sites.findIndex((site) => site.name === name);
  const market = addSite({ name: "Saltern Market", setting: "other", district: 0, jobs: [] });
  const ferry = addSite({ name: "Cutter Ferry", setting: "transport", district: 0, jobs: [] });
  return {
    population,
    zones,
    districts,
    sites,
    zone,
    district,
    age,
    member,
    groupSite: Int32Array.from(groupSite),
    ...indexGroups(member, groupSite.length),
    market,
    ferry,
    careHome: named("Lantern House"),
    quietSite: named("Tarn Lane Sailworks"),
  };
}

function indexGroups(member: Int32Array, groups: number) {
  const groupStart = new Int32Array(groups + 1);
  for (const group of member) {
    if (group >= 0) groupStart[group + 1] = itemAt(groupStart, group + 1) + 1;
  }
  for (let g = 0; g < groups; g += 1) {
    groupStart[g + 1] = itemAt(groupStart, g + 1) + itemAt(groupStart, g);
  }
  const cursor = groupStart.slice();
  const groupPeople = new Int32Array(itemAt(groupStart, groups));
  for (let i = 0; i < member.length; i += 1) {
    const group = itemAt(member, i);
    if (group < 0) continue;
    const position = itemAt(cursor, group);
    groupPeople[position] = Math.floor(i / SLOTS);
    cursor[group] = position + 1;
  }
  return { groupStart, groupPeople };
}
