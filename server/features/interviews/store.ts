import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";

const ids = (list: readonly string[]) => sql`${sql.param(`{${list.join(",")}}`)}::uuid[]`;

/** The person an interview is about. */
export interface Interviewee {
  id: string;
  householdId: string | null;
}

/**
 * Locks the person to be interviewed, so that two interviews of one person follow each other. Null
 * when absent, withdrawn, or not the acting person's to speak with (a case that a tracer sees from a
 * contact's page stays a study number).
 */
export async function lockInterviewee(tx: Tx, personId: string): Promise<Interviewee | null> {
  const found = await tx.execute<Interviewee & Record<string, unknown>>(
    sql`select id, household_id as "householdId" from core.person
        where id = ${personId} and withdrawn_at is null and core.ctx_may_name(id)
        for no key update`,
  );
  return found.rows[0] ?? null;
}

/** True when the acting person may speak with a person, and so keep a draft about them. */
export async function mayInterview(tx: Tx, personId: string): Promise<boolean> {
  const found = await tx.execute(
    sql`select 1 from core.person
        where id = ${personId} and withdrawn_at is null and core.ctx_may_name(id)`,
  );
  return found.rows.length > 0;
}

/** Which of these people and places are on record within the acting person's scope. */
export async function knownIds(
  tx: Tx,
  personIds: readonly string[],
  placeIds: readonly string[],
): Promise<{ people: Set<string>; places: Set<string> }> {
  const known = { people: new Set<string>(), places: new Set<string>() };
  if (personIds.length + placeIds.length === 0) return known;
  const found = await tx.execute<{ kind: "people" | "places"; id: string }>(
    sql`select 'people' as kind, id from core.person
        where id = any (${ids(personIds)}) and withdrawn_at is null
        union all
        select 'places', id from core.place where id = any (${ids(placeIds)})`,
  );
  for (const { kind, id } of found.rows) known[kind].add(id);
  return known;
}

/** An interview as stored; `day` is the local day of `heldAt` in the investigation's zone. */
export interface NewInterview {
  id: string;
  personId: string;
  outcome: string;
  channel: string | null;
  heldAt: string;
  day: string;
}

/** Stores an interview; its graph version is set when it is known. */
export async function insertInterview(tx: Tx, actor: Actor, one: NewInterview): Promise<void> {
  await tx.execute(
    sql`insert into core.interview (id, investigation_id, person_id, outcome, channel, held_at, day, recorded_by)
        values (${one.id}, ${actor.investigationId}, ${one.personId}, ${one.outcome}, ${one.channel},
          ${one.heldAt}::timestamptz, ${one.day}, ${actor.accountId})`,
  );
}

/** Notes under which graph version an interview became part of the graph. */
export async function setInterviewVersion(tx: Tx, id: string, version: number): Promise<void> {
  await tx.execute(sql`update core.interview set graph_version = ${version} where id = ${id}`);
}

/** Contact pairs of one person with others, by the other's id; `made` when new or revived. */
export async function pairsFor(
  tx: Tx,
  personId: string,
  others: readonly string[],
): Promise<Map<string, { pairId: string; made: boolean }>> {
  const pairs = new Map<string, { pairId: string; made: boolean }>();
  if (others.length === 0) return pairs;
  const found = await tx.execute<{ other: string; pair: string; made: boolean }>(
    sql`select other, pair, made from core.pairs_for(${personId}::uuid, ${ids(others)})`,
  );
  for (const row of found.rows) pairs.set(row.other, { pairId: row.pair, made: row.made });
  return pairs;
}

/** A number as told: the number, or the word that stands for a missing one. */
type Told = number | string | null;
const numberOf = (value: Told) => (typeof value === "number" ? value : null);
const wordOf = (value: Told) => (typeof value === "string" ? value : null);

/** One telling of a contact pair, as an interview gives it. */
export interface NewExposure {
  pairId: string;
  firstExposure: string | null;
  lastExposure: string | null;
  setting: string | null;
  placeId: string | null;
  minutes: Told;
  distanceM: Told;
  physical: string | null;
  indoors: string | null;
  relation: string | null;
}

/** Stores the exposures that an interview tells of; `namedBy` is the person interviewed. */
export async function insertExposures(
  tx: Tx,
  actor: Actor,
  interviewId: string,
  namedBy: string,
  exposures: readonly NewExposure[],
): Promise<void> {
  if (exposures.length === 0) return;
  const rows = exposures.map((one) => ({
    id: randomUUID(),
    pair_id: one.pairId,
    first_exposure: one.firstExposure,
    last_exposure: one.lastExposure,
    setting: one.setting,
    place_id: one.placeId,
    minutes: numberOf(one.minutes),
    minutes_missing: wordOf(one.minutes),
    distance_m: numberOf(one.distanceM),
    distance_missing: wordOf(one.distanceM),
    physical: one.physical,
    indoors: one.indoors,
    relation: one.relation,
  }));
  await tx.execute(
    sql`insert into core.exposure (id, investigation_id, pair_id, interview_id, named_by, first_exposure,
        last_exposure, setting, place_id, minutes, minutes_missing, distance_m, distance_missing,
        physical, indoors, relation, recorded_by)
      select id, ${actor.investigationId}, pair_id, ${interviewId}, ${namedBy}, first_exposure,
        last_exposure, setting, place_id, minutes, minutes_missing, distance_m, distance_missing,
        physical, indoors, relation, ${actor.accountId}
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as r (id uuid, pair_id uuid,
        first_exposure text, last_exposure text, setting text, place_id uuid, minutes integer,
        minutes_missing text, distance_m real, distance_missing text, physical text, indoors text,
        relation text)`,
  );
}

/** People who could not be named. */
export interface NewGroupExposure {
  setting: string | null;
  placeId: string | null;
  firstExposure: string | null;
  lastExposure: string | null;
  countMin: number | null;
  countMax: number | null;
}

/** Stores group exposures; they make no people and no pairs. */
export async function insertGroupExposures(
  tx: Tx,
  actor: Actor,
  interviewId: string,
  personId: string,
  groups: readonly NewGroupExposure[],
): Promise<void> {
  if (groups.length === 0) return;
  const rows = groups.map((one) => ({
    setting: one.setting,
    place_id: one.placeId,
    first_exposure: one.firstExposure,
    last_exposure: one.lastExposure,
    count_min: one.countMin,
    count_max: one.countMax,
  }));
  await tx.execute(
    sql`insert into core.group_exposure (id, investigation_id, interview_id, person_id, setting, place_id,
        first_exposure, last_exposure, count_min, count_max, recorded_by)
      select gen_random_uuid(), ${actor.investigationId}, ${interviewId}, ${personId}, setting,
        place_id, first_exposure, last_exposure, count_min, count_max, ${actor.accountId}
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as r (setting text, place_id uuid,
        first_exposure text, last_exposure text, count_min integer, count_max integer)`,
  );
}

/**
 * Brings a person's copies of what the interviews say up to date: the state of the best one
 * (complete, then partial, then the latest attempt) and the day of the first complete one. An
 * earlier day that came with a file stays.
 */
export async function refreshInterviewCopies(tx: Tx, personId: string): Promise<void> {
  await tx.execute(
    sql`update core.person p set
        interview_state = case when p.interview_state = 'complete' then p.interview_state
          else i.state end,
        interviewed = case when i.first_day is not null then 'yes' else p.interviewed end,
        interview_date = case
          when i.first_day is null then p.interview_date
          when p.interviewed = 'yes' and p.interview_date ~ '^[0-9]' and p.interview_date <= i.first_day
            then p.interview_date
          else i.first_day end,
        updated_at = now()
      from (
        select
          (array_agg(outcome order by (outcome = 'complete') desc, (outcome = 'partial') desc,
            held_at desc, recorded_at desc))[1] as state,
          (array_agg(day order by held_at) filter (where outcome = 'complete'))[1] as first_day
        from core.interview where person_id = ${personId} and withdrawn_at is null) i
      where p.id = ${personId} and i.state is not null`,
  );
}

/**
 * People on record without a classification become contacts when a case names them, as far as the
 * acting person may change them.
 *
 * @returns the people changed
 */
export async function markContacts(
  tx: Tx,
  actor: Actor,
  personIds: readonly string[],
  definitionVersion: number,
): Promise<string[]> {
  if (personIds.length === 0) return [];
  const changed = await tx.execute<{ id: string }>(
    sql`update core.person set classification = 'contact', case_definition_version = ${definitionVersion},
          version = version + 1, updated_at = now()
        where id = any (${ids(personIds)}) and classification is null and withdrawn_at is null
        returning id`,
  );
  const marked = changed.rows.map((row) => row.id);
  if (marked.length > 0) {
    await tx.execute(
      sql`insert into core.classification (id, investigation_id, person_id, classification,
            case_definition_version, recorded_by)
          select gen_random_uuid(), ${actor.investigationId}, id, 'contact', ${definitionVersion},
            ${actor.accountId}
          from unnest(${ids(marked)}) as m (id)`,
    );
  }
  return marked;
}
