import type { Setting } from "./types.ts";

/** A facility of the town, before anybody has put it on record. */
export interface Site {
  name: string;
  setting: Setting;
  district: number;
  jobs: readonly string[];
}

export interface Trade {
  kind: string;
  setting: Setting;
  jobs: readonly string[];
  share: number;
}

export const TRADES: readonly Trade[] = [
  { kind: "Boatyard", setting: "workplace", jobs: ["boat builder", "fitter", "clerk"], share: 3 },
  { kind: "Smokehouse", setting: "workplace", jobs: ["fish smoker", "packer"], share: 2 },
  { kind: "Bakery", setting: "workplace", jobs: ["baker", "shop assistant"], share: 3 },
  { kind: "Depot", setting: "workplace", jobs: ["driver", "loader", "dispatcher"], share: 2 },
  { kind: "Works Office", setting: "workplace", jobs: ["clerk", "surveyor"], share: 3 },
  { kind: "Ropewalk", setting: "workplace", jobs: ["rope maker", "machinist"], share: 2 },
  { kind: "Inn", setting: "workplace", jobs: ["cook", "bar staff", "cleaner"], share: 3 },
  { kind: "Nursery Garden", setting: "workplace", jobs: ["gardener", "grower"], share: 2 },
  { kind: "Health Room", setting: "health_care", jobs: ["nurse", "receptionist"], share: 1 },
];

export const SCHOOL_JOBS: readonly string[] = ["teacher", "school cook", "caretaker"];
export const CARE_JOBS: readonly string[] = ["carer", "nurse", "kitchen staff"];
export const SAIL_JOBS: readonly string[] = ["sail maker", "cutter", "packer"];

/** What a zone is for in the story; zones are parts of town whose people do not mix by name. */
export type ZoneRole = "main" | "far" | "quiet" | "edge" | "ordinary";

export interface ZonePlan {
  role: ZoneRole;
  population: number;
  districts: readonly string[];
}

const TOWN_PER_RECORD = 2.4;
const CORE_LIMIT = 2000;
const CORE_PEOPLE = 1000;

/**
 * Parts of the town for a number of people on record. Up to 2,000 there are the parts of the story;
 * above that the same ones at demo size and as many ordinary parts as it takes.
 */
export function planZones(people: number, groundName: () => string): ZonePlan[] {
  const core = (people <= CORE_LIMIT ? people : CORE_PEOPLE) * TOWN_PER_RECORD;
  const plans: ZonePlan[] = [
    {
      role: "main",
      population: Math.round(core * 0.4),
      districts: ["Quayside", "Ropery", "Hillfoot"],
    },
    { role: "far", population: Math.round(core * 0.33), districts: ["Farshore", "Lantern Point"] },
    { role: "quiet", population: Math.round(core * 0.09), districts: ["Tarn Lane"] },
    ...["Saltmarsh", "Upper Sallow", "Weir End"].map(
      (name): ZonePlan => ({
        role: "edge",
        population: Math.round(core * 0.06),
        districts: [name],
      }),
    ),
  ];
  if (people > CORE_LIMIT) {
    const rest = (people - CORE_PEOPLE) * TOWN_PER_RECORD;
    const count = Math.max(1, Math.round(rest / (CORE_PEOPLE * TOWN_PER_RECORD)));
    for (let i = 0; i < count; i += 1) {
      plans.push({
        role: "ordinary",
        population: Math.round(rest / count),
        districts: [groundName(), groundName(), groundName()],
      });
    }
  }
  return plans;
}
