import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { texts, uuids } from "../../db/binary-arrays.ts";
import { nearIds } from "../../db/near-ids.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import { newStudyNumbers } from "./study-number.ts";

/** Core columns of a new person; what is left out is "not asked". */
export interface NewPerson {
  id?: string;
  sex?: string | null;
  ageBand?: string | null;
  area?: string | null;
  occupation?: string | null;
  householdId?: string | null;
  classification?: string | null;
  onsetDate?: string | null;
  /** Of the one test that is recorded with them, see `insertTests`. */
  specimenDate?: string | null;
  resultDate?: string | null;
  result?: string | null;
  reportDate?: string | null;
  interviewDate?: string | null;
  interviewed?: string | null;
  interviewState?: string | null;
  isolationDate?: string | null;
  outcome?: string | null;
  outcomeDate?: string | null;
  assignedAccountId?: string | null;
  source: "form" | "interview" | "import";
}

/** A person just recorded. */
export interface InsertedPerson {
  id: string;
  studyNumber: string;
}

/**
 * Records people in core, with their first classification in its history. Identity follows by
 * `putPeople`; the graph change by `recordGraphChange`.
 *
 * @param definitionVersion version of the case definition in force
 * @throws the driver's 23505 when a random study number is taken (retry), 42501 out of scope
 */
export async function insertPeople(
  tx: Tx,
  actor: Actor,
  people: readonly NewPerson[],
  definitionVersion: number,
): Promise<InsertedPerson[]> {
  if (people.length === 0) return [];
  const ids = people.map((person) => person.id ?? randomUUID());
  const studyNumbers = newStudyNumbers(people.length);
  const column = (key: Exclude<keyof NewPerson, "id">) => texts(people.map((one) => one[key]));
  await tx.execute(
    sql`insert into core.person (id, investigation_id, study_number, sex, age_band, area, occupation,
        household_id, classification, case_definition_version, onset_date, specimen_date, result_date,
        result, report_date, interview_date, interviewed, interview_state, isolation_date, outcome,
        outcome_date, assigned_account_id, source, recorded_by)
      select id, ${actor.investigationId}, study_number, sex, age_band, area, occupation, household_id,
        classification, ${definitionVersion}, onset_date, specimen_date, result_date, result,
        report_date, interview_date, interviewed, interview_state, isolation_date, outcome,
        outcome_date, assigned_account_id, source, ${actor.accountId}
      from unnest(${uuids(ids)}::uuid[], ${texts(studyNumbers)}::text[], ${column("sex")}::text[],
        ${column("ageBand")}::text[], ${column("area")}::text[], ${column("occupation")}::text[],
        ${uuids(people.map((one) => one.householdId))}::uuid[], ${column("classification")}::text[],
        ${column("onsetDate")}::text[], ${column("specimenDate")}::text[],
        ${column("resultDate")}::text[], ${column("result")}::text[], ${column("reportDate")}::text[],
        ${column("interviewDate")}::text[], ${column("interviewed")}::text[],
        ${column("interviewState")}::text[], ${column("isolationDate")}::text[],
        ${column("outcome")}::text[], ${column("outcomeDate")}::text[],
        ${uuids(people.map((one) => one.assignedAccountId))}::uuid[], ${column("source")}::text[])
        as r (id, study_number, sex, age_band, area, occupation, household_id, classification,
          onset_date, specimen_date, result_date, result, report_date, interview_date, interviewed,
          interview_state, isolation_date, outcome, outcome_date, assigned_account_id, source)`,
  );
  const classified = people.flatMap(({ classification }, at) =>
    classification ? [{ personId: ids[at], classification }] : [],
  );
  if (classified.length > 0) {
    await tx.execute(
      sql`insert into core.classification (id, investigation_id, person_id, classification,
          case_definition_version, recorded_by)
        select id, ${actor.investigationId}, person_id, classification, ${definitionVersion},
          ${actor.accountId}
        from unnest(${uuids(nearIds(classified.length).sort())}::uuid[],
          ${uuids(classified.map(({ personId }) => personId))}::uuid[],
          ${texts(classified.map(({ classification }) => classification))}::text[])
          as r (id, person_id, classification)`,
    );
  }
  return ids.map((id, at) => ({ id, studyNumber: studyNumbers[at] as string }));
}

/** One test as stored. */
export interface NewTest {
  personId: string;
  specimenDate: string | null;
  kind: string | null;
  result: string | null;
  resultDate: string | null;
  resultAt?: string | null;
}

/**
 * Records tests and brings each person's copies (reference test) up to date.
 *
 * @param copied true when these are the only tests of people who were recorded with their copies
 */
export async function insertTests(
  tx: Tx,
  actor: Actor,
  tests: readonly NewTest[],
  copied = false,
): Promise<string[]> {
  if (tests.length === 0) return [];
  const ids = nearIds(tests.length).sort();
  const column = (key: keyof NewTest) => texts(tests.map((test) => test[key]));
  await tx.execute(
    sql`insert into core.test_result (id, investigation_id, person_id, specimen_date, kind, result,
        result_date, result_at, recorded_by)
      select id, ${actor.investigationId}, person_id, specimen_date, kind, result, result_date,
        result_at::timestamptz, ${actor.accountId}
      from unnest(${uuids(ids)}::uuid[], ${uuids(tests.map((test) => test.personId))}::uuid[],
        ${column("specimenDate")}::text[], ${column("kind")}::text[], ${column("result")}::text[],
        ${column("resultDate")}::text[], ${column("resultAt")}::text[])
        as r (id, person_id, specimen_date, kind, result, result_date, result_at)`,
  );
  if (!copied) await refreshTestCopies(tx, [...new Set(tests.map((test) => test.personId))]);
  return ids;
}

/** Copies of the reference test: the first positive by specimen day, else the latest recorded. */
export async function refreshTestCopies(tx: Tx, personIds: readonly string[]): Promise<void> {
  await tx.execute(
    sql`update core.person p set specimen_date = t.specimen_date, result_date = t.result_date,
        result = t.result, updated_at = now()
      from (
        select distinct on (person_id) person_id, specimen_date, result_date, result
        from core.test_result
        where person_id = any (${sql.param(`{${personIds.join(",")}}`)}::uuid[]) and withdrawn_at is null
        order by person_id, (result = 'positive') desc nulls last,
          case when result = 'positive' then specimen_date end, recorded_at desc) t
      where p.id = t.person_id`,
  );
}

/**
 * One complete interview for each person of whom it is said that they were interviewed before this
 * record knew of it. The day is the one told and nothing else: where that is missing the day is
 * "unknown", and the instant is that of recording.
 *
 * @param timeZone zone of the investigation; a told day stands at its noon
 */
export async function insertHeldInterviews(
  tx: Tx,
  actor: Actor,
  source: "form" | "import",
  timeZone: string,
  interviews: readonly { personId: string; day: string | null }[],
): Promise<void> {
  if (interviews.length === 0) return;
  const ids = nearIds(interviews.length).sort();
  const noons = interviews.map(({ day }) =>
    day !== null && /^\d{4}-\d{2}-\d{2}$/.test(day) ? `${day} 12:00` : null,
  );
  // Noon of today may be still to come; nothing on record is held later than it was recorded.
  await tx.execute(
    sql`insert into core.interview (id, investigation_id, person_id, outcome, held_at, day, source, recorded_by)
        select id, ${actor.investigationId}, person_id, 'complete',
          least(coalesce(noon::timestamp at time zone ${timeZone}, now()), now()), day, ${source},
          ${actor.accountId}
        from unnest(${uuids(ids)}::uuid[], ${uuids(interviews.map((one) => one.personId))}::uuid[],
          ${texts(interviews.map((one) => one.day ?? "unknown"))}::text[], ${texts(noons)}::text[])
          as r (id, person_id, day, noon)`,
  );
}
