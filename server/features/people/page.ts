import { sql } from "drizzle-orm";
import { accessTo, openableKeys, readableColumns } from "../../../shared/fields.ts";
import { bestOutcomes, expectedSince, followState } from "../../../shared/follow-state.ts";
import { type Classification, isCase } from "../../../shared/vocabulary.ts";
import { infectiousWindow, monitoringPeriod, sourceWindow } from "../../../shared/windows.ts";
import { dayIn, now } from "../../clock.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { KeyRing } from "../../identity/keys.ts";
import { openPeople } from "../../identity/records.ts";
import { checksOf, endsOf } from "../follow-up/store.ts";
import type { InvestigationRow } from "../investigations/store.ts";
import { type CorePerson, peopleById } from "./queries.ts";

interface ExposureRow extends Record<string, unknown> {
  id: string;
  pairId: string;
  otherId: string;
  firstExposure: string | null;
  lastExposure: string | null;
  setting: string | null;
  place: string | null;
  placeNumber: number | null;
  minutes: number | null;
  minutesMissing: string | null;
  distanceM: number | null;
  distanceMissing: string | null;
  physical: string | null;
  indoors: string | null;
  relation?: string | null;
  recordedAt: string;
}

async function exposuresOf(tx: Tx, actor: Actor, personId: string): Promise<ExposureRow[]> {
  const relation = readableColumns("core.exposure", actor.role).includes("relation")
    ? sql`, e.relation`
    : sql``;
  const found = await tx.execute<ExposureRow>(
    sql`select e.id, e.pair_id as "pairId",
          case when cp.person_a = ${personId} then cp.person_b else cp.person_a end as "otherId",
          e.first_exposure as "firstExposure", e.last_exposure as "lastExposure", e.setting,
          pl.name as place, pl.number as "placeNumber", e.minutes, e.minutes_missing as "minutesMissing",
          e.distance_m as "distanceM", e.distance_missing as "distanceMissing", e.physical, e.indoors,
          e.recorded_at as "recordedAt"${relation}
        from core.contact_pair cp
        join core.exposure e on e.pair_id = cp.id and e.withdrawn_at is null
        left join core.place pl on pl.id = e.place_id
        where (cp.person_a = ${personId} or cp.person_b = ${personId}) and cp.withdrawn_at is null
        order by e.first_exposure nulls last, e.recorded_at limit 500`,
  );
  return found.rows;
}

/** What a place is called for someone who may not open household names. */
const placeLabel = (row: { place: string | null; placeNumber: number | null }) =>
  row.place ?? (row.placeNumber === null ? null : `Household ${row.placeNumber}`);

async function pairsOf(tx: Tx, ring: KeyRing, actor: Actor, rows: readonly ExposureRow[]) {
  const others = await peopleById(tx, actor.role, [...new Set(rows.map((row) => row.otherId))]);
  const mine = others.filter((other) => other.mine).map((other) => other.id);
  const names =
    openableKeys(actor.role).includes("name") && mine.length > 0
      ? await openPeople(
          tx,
          await ring.of(tx, actor.investigationId),
          mine,
          ["name"],
          "person.opened",
        )
      : new Map();
  return others.map((other) => {
    const tellings = rows.filter((row) => row.otherId === other.id);
    return {
      pairId: tellings[0]?.pairId ?? other.id,
      personId: other.id,
      studyNumber: other.studyNumber,
      ...(other.mine && openableKeys(actor.role).includes("name")
        ? { name: names.get(other.id)?.name ?? null }
        : {}),
      classification: other.classification,
      becameCase: other.becameCase,
      exposures: tellings.map((row) => ({
        id: row.id,
        firstExposure: row.firstExposure,
        lastExposure: row.lastExposure,
        setting: row.setting,
        place: placeLabel(row),
        minutes: row.minutes ?? row.minutesMissing,
        distanceM: row.distanceM ?? row.distanceMissing,
        physical: row.physical,
        indoors: row.indoors,
        ...(accessTo("name", actor.role) === "full" ? { relation: row.relation ?? null } : {}),
        recordedAt: row.recordedAt,
      })),
    };
  });
}

/**
 * Day 0 of a contact: as Follow has it where the role has Follow (all cases count, also those out of
 * the acting person's sight), else the latest exposure to a case on this page.
 */
async function dayZeroOf(
  tx: Tx,
  actor: Actor,
  person: CorePerson,
  pairs: Awaited<ReturnType<typeof pairsOf>>,
): Promise<(string | null)[]> {
  if (actor.role === "tracer" || actor.role === "supervisor") {
    const found = await tx.execute<{ day_zero: string | null }>(
      sql`select day_zero from core.follow_up where person_id = ${person.id}`,
    );
    return found.rows.map((row) => row.day_zero);
  }
  return pairs
    .filter((pair) => isCase(pair.classification))
    .flatMap((pair) => pair.exposures.map((exposure) => exposure.lastExposure));
}

/** Days on which the contact was tried, with the best outcome; and from when on a gap is a miss. */
async function checkedDays(
  tx: Tx,
  person: CorePerson,
  settings: InvestigationRow,
  dayZero: string,
) {
  const checks = (await checksOf(tx, [person.id])).get(person.id) ?? [];
  const ends = (await endsOf(tx, [person.id], settings.timeZone)).get(person.id);
  const expectedFrom = expectedSince(
    dayIn(settings.timeZone, String(person.recordedAt)),
    ends?.reopenedOn ?? null,
  );
  const { monitoringDays, lostAfterDays } = settings;
  return {
    expectedFrom,
    state: followState({
      classification: person.classification as Classification | null,
      ended: ends?.standing?.reason ?? null,
      dayZero,
      monitoringDays,
      today: dayIn(settings.timeZone, now()),
      expectedFrom,
      lostAfterDays,
      checks,
    }),
    outcomes: [...bestOutcomes(checks)].map(([day, outcome]) => ({ day, outcome })),
  };
}

/**
 * Everything beside the person on a person's page: windows, monitoring, history, pairs, attempts.
 * A neighbour's name is there only when it is the acting person's to know.
 */
export async function personPageParts(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  person: CorePerson,
  settings: InvestigationRow,
) {
  const positive = await tx.execute<{ day: string | null }>(
    sql`select min(specimen_date) as day from core.test_result
        where person_id = ${person.id} and result = 'positive' and withdrawn_at is null
          and specimen_date ~ '^\\d{4}-\\d{2}-\\d{2}$'`,
  );
  const dates = {
    onsetDate: person.onsetDate,
    isolationDate: person.isolationDate,
    firstPositiveSpecimen: positive.rows[0]?.day ?? null,
  };
  const sick = isCase(person.classification);
  const exposures = await exposuresOf(tx, actor, person.id);
  const history = await tx.execute(
    sql`select classification, case_definition_version as "caseDefinitionVersion", recorded_at as "recordedAt"
        from core.classification where person_id = ${person.id} order by recorded_at, id`,
  );
  const groups = await tx.execute(
    sql`select g.id, g.setting, pl.name as place, pl.number as "placeNumber",
          g.first_exposure as "firstExposure", g.last_exposure as "lastExposure",
          g.count_min as "countMin", g.count_max as "countMax"
        from core.group_exposure g left join core.place pl on pl.id = g.place_id
        where g.person_id = ${person.id} and g.withdrawn_at is null
        order by g.first_exposure nulls last, g.recorded_at`,
  );
  const attempts = await tx.execute(
    sql`select id, outcome, channel, held_at as "heldAt", recorded_at as "recordedAt"
        from core.interview where person_id = ${person.id} and withdrawn_at is null
        order by held_at desc, id`,
  );
  const pairs = await pairsOf(tx, ring, actor, exposures);
  const monitoring =
    sick && !person.becameCase
      ? null
      : monitoringPeriod(await dayZeroOf(tx, actor, person, pairs), settings.monitoringDays);
  return {
    windows: {
      infectious: sick ? infectiousWindow(dates, settings) : null,
      source: sick ? sourceWindow(dates, settings) : null,
    },
    monitoring: monitoring && {
      ...monitoring,
      ...(await checkedDays(tx, person, settings, monitoring.dayZero)),
    },
    classifications: history.rows,
    pairs,
    groupExposures: groups.rows.map(({ placeNumber, ...row }) => ({
      ...row,
      place: placeLabel({
        place: row.place as string | null,
        placeNumber: placeNumber as number | null,
      }),
    })),
    attempts: attempts.rows,
  };
}
