import type { Calendar } from "./calendar.ts";
import { groupOf, SLOT } from "./circles.ts";
import { itemAt } from "./item-at.ts";
import { respellName } from "./names.ts";
import { inventedPhone } from "./phones.ts";
import { inventProfile, type Profile } from "./profile.ts";
import { createRng, type Rng } from "./rng.ts";
import type { Town } from "./town.ts";
import type { Person, Place } from "./types.ts";

/** What the team has on record, growing in the order of recording: ids are positions. */
export interface RecordBook {
  people: Person[];
  places: Place[];
  /** Minute each person came on record. */
  recordedMinute: number[];
  /** Town person behind each record. */
  townPerson: number[];
  /** Record of a town person, or -1. */
  recordOf(person: number): number;
  /** Puts a person on record unless they are; returns the id. */
  register(person: number, minute: number, source: Person["source"], tracer: string): number;
  /** Enters somebody a second time under a respelt name and the same phone; returns the new id. */
  registerAgain(original: number, minute: number, tracer: string): number;
  sitePlace(site: number, minute: number): number;
  householdPlace(group: number, minute: number): number;
}

interface Entry {
  profile: Profile;
  phone: string | null;
  householdPlaceId: number | null;
  source: Person["source"];
  tracer: string;
  duplicateOf: number | null;
}

const NOTES = ["call after six", "prefers a visit", "hard of hearing", "works nights this month"];

/** An empty record book for a town. */
export function createRecordBook(town: Town, seed: number, calendar: Calendar): RecordBook {
  const rng: Rng = createRng(seed, 5);
  const people: Person[] = [];
  const places: Place[] = [];
  const recordedMinute: number[] = [];
  const townPerson: number[] = [];
  const ids = new Int32Array(town.population).fill(-1);
  const sitePlaces = new Int32Array(town.sites.length).fill(-1);
  const householdPlaces = new Map<number, number>();
  let phones = 0;
  let households = 0;

  function add(entry: Entry, minute: number, person: number): number {
    const id = people.length;
    const { profile, tracer, duplicateOf } = entry;
    people.push({
      id,
      ref: `SB-${String(id + 1).padStart(5, "0")}`,
      name: profile.name,
      phone: entry.phone,
      email: profile.mail === null ? null : `${profile.mail}.${id + 1}@example.org`,
      birthDate: profile.birthDate,
      sex: profile.sex,
      address: profile.address,
      area: profile.area,
      occupation: profile.occupation,
      householdPlaceId: entry.householdPlaceId,
      recordedAt: calendar.instant(minute),
      source: entry.source,
      enteredBy: tracer,
      assignedTracer: tracer,
      isolationDate: null,
      outcome: null,
      outcomeDate: null,
      reportDate: null,
      reportedAt: null,
      onsetDate: null,
      duplicateOf,
      note: duplicateOf === null && rng.chance(0.03) ? rng.pick(NOTES) : null,
    });
    recordedMinute.push(minute);
    townPerson.push(person);
    return id;
  }

  function sitePlace(site: number, minute: number): number {
    let id = itemAt(sitePlaces, site);
    if (id < 0) {
      const { name, setting, district } = itemAt(town.sites, site);
      const area = itemAt(town.districts, district);
      id =
        places.push({
          id: places.length,
          name,
          setting,
          area,
          recordedAt: calendar.instant(minute),
        }) - 1;
      sitePlaces[site] = id;
    }
    return id;
  }

  function householdPlace(group: number, minute: number): number {
    let id = householdPlaces.get(group);
    if (id === undefined) {
      households += 1;
      const first = itemAt(town.groupPeople, itemAt(town.groupStart, group));
      const area = itemAt(town.districts, itemAt(town.district, first));
      id =
        places.push({
          id: places.length,
          name: `Household ${households}`,
          setting: "household",
          area,
          recordedAt: calendar.instant(minute),
        }) - 1;
      householdPlaces.set(group, id);
    }
    return id;
  }

  function register(person: number, minute: number, source: Person["source"], tracer: string) {
    const known = itemAt(ids, person);
    if (known >= 0) return known;
    const profile = inventProfile(town, seed, calendar, person, source === "form");
    const { hasPhone } = profile;
    const household = groupOf(town, person, SLOT.household);
    const householdPlaceId = household < 0 ? null : householdPlace(household, minute);
    let phone: string | null = null;
    if (hasPhone === "yes") {
      phone = inventedPhone(phones);
      phones += 1;
    } else if (hasPhone !== "no") phone = hasPhone;
    const id = add(
      { profile, phone, householdPlaceId, source, tracer, duplicateOf: null },
      minute,
      person,
    );
    ids[person] = id;
    return id;
  }

  function registerAgain(original: number, minute: number, tracer: string): number {
    const { name, birthDate, phone, sex, area } = itemAt(people, original);
    const profile: Profile = {
      name: respellName(rng, name),
      birthDate: birthDate !== null && /^\d{4}/.test(birthDate) ? birthDate.slice(0, 7) : null,
      sex,
      area,
      address: null,
      occupation: null,
      hasPhone: "yes",
      mail: null,
    };
    return add(
      {
        profile,
        phone,
        householdPlaceId: null,
        source: "interview",
        tracer,
        duplicateOf: original,
      },
      minute,
      itemAt(townPerson, original),
    );
  }

  return {
    people,
    places,
    recordedMinute,
    townPerson,
    recordOf: (person) => itemAt(ids, person),
    register,
    registerAgain,
    sitePlace,
    householdPlace,
  };
}
