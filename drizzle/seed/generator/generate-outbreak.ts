import { type Calendar, createCalendar } from "./calendar.ts";
import { followContacts } from "./follow-up.ts";
import type { ExposureRow } from "./pair-ledger.ts";
import { createRng } from "./rng.ts";
import { spreadInfection } from "./spread.ts";
import { tellStory } from "./story.ts";
import { planSuspects } from "./suspects.ts";
import { buildTown } from "./town.ts";
import { traceOutbreak } from "./tracing.ts";
import type { Exposure, Outbreak, OutbreakOptions } from "./types.ts";

const SUSPECT_SHARE = 0.06;
const LARGE = 5000;

/**
 * An invented outbreak of shore fever in Sallow Bay and the work of the team that traces it, as
 * plain rows in the order they were recorded. Pure: equal options give equal output, byte for byte.
 * Ids are positions in their arrays (people, places, interviews, districts).
 *
 * @throws RangeError when an option is outside what the story can be told with.
 */
export function generateOutbreak(input: OutbreakOptions): Outbreak {
  const people = input.people ?? 1000;
  const days = input.days ?? 35;
  const pairsPerPerson = input.pairsPerPerson ?? (people >= LARGE ? 3 : 1.05);
  const options = { ...input, people, days, pairsPerPerson };
  checkOptions(options);
  const calendar = createCalendar(
    options.lastDay,
    days,
    options.lastMinute ?? 18 * 60,
    options.timeZoneOffsetMinutes ?? 0,
  );
  const town = buildTown(options.seed, people);
  const cases = spreadInfection(town, options, calendar, people);
  const rng = createRng(options.seed, 10);
  const suspects = planSuspects(town, rng, calendar, cases, Math.round(people * SUSPECT_SHARE));
  const traced = traceOutbreak(town, options, calendar, cases, suspects);
  const { clinic, book } = traced;
  clinic.classifications.sort((a, b) => a.minute - b.minute);
  clinic.tests.sort((a, b) => a.minute - b.minute);
  const followed =
    options.followUpChecks === false
      ? { checks: [], lost: [] }
      : followContacts(town, options.seed, calendar, options.monitoringDays, traced, cases);
  const { instant } = calendar;
  return {
    districts: town.districts.map((name, id) => ({ id, name })),
    places: book.places,
    people: book.people,
    classifications: clinic.classifications.map(({ minute, ...row }) => ({
      ...row,
      recordedAt: instant(minute),
    })),
    tests: clinic.tests.map(({ minute, ...row }) => ({ ...row, recordedAt: instant(minute) })),
    interviews: traced.interviews.map(({ at, recorded, ...row }) => ({
      ...row,
      at: instant(at),
      recordedAt: instant(recorded),
    })),
    exposures: traced.exposures.map((row) => publishExposure(row, calendar)),
    groupExposures: traced.groupExposures,
    checks: followed.checks,
    story: tellStory(town, options, calendar, traced, cases, followed),
  };
}

/** Written out field by field: copying with rest and spread costs seconds at load size. */
function publishExposure(row: ExposureRow, { day, instant }: Calendar): Exposure {
  return {
    interviewId: row.interviewId,
    personA: row.personA,
    personB: row.personB,
    namedBy: row.namedBy,
    firstDay: row.first === null ? null : day(row.first),
    lastDay: row.last === null ? null : day(row.last),
    setting: row.setting,
    placeId: row.placeId,
    minutes: row.minutes,
    distanceM: row.distanceM,
    physical: row.physical,
    indoors: row.indoors,
    relation: row.relation,
    recordedAt: instant(row.recorded),
    withdrawnAt: row.withdrawn === null ? null : instant(row.withdrawn),
  };
}

function checkOptions(options: OutbreakOptions & { people: number; days: number }): void {
  const { people, days, incubationMin, incubationMax, tracers, seed } = options;
  const lastMinute = options.lastMinute ?? 18 * 60;
  if (!Number.isSafeInteger(seed)) throw new RangeError("seed must be a whole number");
  if (!Number.isInteger(people) || people < 300 || people > 200_000) {
    throw new RangeError("people must be 300 to 200000");
  }
  if (!Number.isInteger(days) || days < 28 || days > 800) throw new RangeError("days: 28 to 800");
  if (incubationMin < 0 || incubationMax <= incubationMin || incubationMax > days) {
    throw new RangeError("incubation limits must be ordered and shorter than the story");
  }
  if (lastMinute < 0 || lastMinute > 1439) throw new RangeError("lastMinute: 0 to 1439");
  if (tracers.length === 0) throw new RangeError("at least one tracer is needed");
}
