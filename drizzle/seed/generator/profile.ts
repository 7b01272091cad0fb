import type { Calendar } from "./calendar.ts";
import { groupOf, SLOT } from "./circles.ts";
import { itemAt } from "./item-at.ts";
import { inventFamilyName, inventGivenName, inventGroundName, pickManner } from "./names.ts";
import { createRng, type Rng } from "./rng.ts";
import type { Town } from "./town.ts";
import { type Person, REFUSED, UNKNOWN } from "./types.ts";

export type Profile = Pick<
  Person,
  "name" | "birthDate" | "sex" | "address" | "area" | "occupation"
> & { hasPhone: "yes" | "no" | "unknown" | "refused"; mail: string | null };

const STREETS = ["Street", "Lane", "Steps", "Row", "Terrace", "Close", "Slip"];

function partialBirthDate(rng: Rng, full: string, asked: boolean): string | null {
  const roll = rng.next();
  if (roll < 0.08) return full.slice(0, 7);
  if (roll < 0.1) return UNKNOWN;
  if (roll < 0.115) return REFUSED;
  return !asked && roll < 0.4 ? null : full;
}

function mailName(name: string): string {
  const plain = name
    .normalize("NFKD")
    .toLowerCase()
    .replace(/[^a-z ]/g, "")
    .trim()
    .replace(/ +/g, ".");
  return plain.length > 2 ? plain : "neighbour";
}

/**
 * Who somebody is. Depends on the seed and the person alone, never on when they come on record;
 * people of one household share an address and mostly a family name. `asked` is true for cases,
 * whose form is fuller than the line a contact gets in somebody else's interview.
 */
export function inventProfile(
  town: Town,
  seed: number,
  calendar: Calendar,
  person: number,
  asked: boolean,
): Profile {
  const rng = createRng(seed, 3, person);
  const household = groupOf(town, person, SLOT.household);
  const home = createRng(seed, 4, household < 0 ? -2 - person : household);
  const homeManner = pickManner(home);
  const sharedFamily = inventFamilyName(home, homeManner);
  const house = `${home.between(1, 96)} ${inventGroundName(home, STREETS)}`;
  const manner = rng.chance(0.85) ? homeManner : pickManner(rng);
  const given = inventGivenName(rng, manner);
  const family = rng.chance(0.82) ? sharedFamily : inventFamilyName(rng, manner);
  const name = `${given} ${family}`;
  const age = itemAt(town.age, person);
  const birthDay = calendar.days - 1 - Math.floor(age * 365.25) - rng.between(1, 365);
  const address = household < 0 ? "Lantern House, Lantern Point" : house;
  const addressRoll = rng.next();
  const sexRoll = rng.next();
  const phoneRoll = rng.next();
  return {
    name,
    birthDate: partialBirthDate(rng, calendar.day(birthDay), asked),
    sex: sexRoll < 0.49 ? "female" : sexRoll < 0.97 ? "male" : sexRoll < 0.985 ? "other" : UNKNOWN,
    address:
      addressRoll < 0.02
        ? REFUSED
        : addressRoll < 0.05
          ? UNKNOWN
          : asked || addressRoll < 0.7
            ? address
            : null,
    area: itemAt(town.districts, itemAt(town.district, person)),
    occupation: occupationOf(town, rng, person, age, asked),
    hasPhone:
      age < 12 || phoneRoll < 0.03
        ? "no"
        : phoneRoll < 0.05
          ? UNKNOWN
          : phoneRoll < 0.06
            ? REFUSED
            : "yes",
    mail: age >= 15 && rng.chance(asked ? 0.5 : 0.15) ? mailName(name) : null,
  };
}

function occupationOf(
  town: Town,
  rng: Rng,
  person: number,
  age: number,
  asked: boolean,
): string | null {
  if (!asked && rng.chance(0.35)) return null;
  if (rng.chance(0.02)) return UNKNOWN;
  if (age < 5) return null;
  if (age < 18) return "pupil";
  const group = groupOf(town, person, SLOT.day);
  const site = group < 0 ? -1 : itemAt(town.groupSite, group);
  if (age > 66) return "retired";
  if (site < 0) return rng.pick(["at home", "looking for work", "casual work", "carer at home"]);
  return rng.pick(itemAt(town.sites, site).jobs);
}
