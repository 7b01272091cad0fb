import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import { newStudyNumber } from "./study-number.ts";

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
  const rows = people.map((person) => ({
    id: person.id ?? randomUUID(),
    study_number: newStudyNumber(),
    sex: person.sex ?? null,
    age_band: person.ageBand ?? null,
    area: person.area ?? null,
    occupation: person.occupation ?? null,
    household_id: person.householdId ?? null,
    classification: person.classification ?? null,
    onset_date: person.onsetDate ?? null,
    report_date: person.reportDate ?? null,
    interview_date: person.interviewDate ?? null,
    interviewed: person.interviewed ?? null,
    interview_state: person.interviewState ?? null,
    isolation_date: person.isolationDate ?? null,
    outcome: person.outcome ?? null,
    outcome_date: person.outcomeDate ?? null,
    assigned_account_id: person.assignedAccountId ?? null,
    source: person.source,
  }));
  const json = JSON.stringify(rows);
  await tx.execute(
    sql`insert into core.person (id, investigation_id, study_number, sex, age_band, area, occupation,
        household_id, classification, case_definition_version, onset_date, report_date, interview_date,
        interviewed, interview_state, isolation_date, outcome, outcome_date, assigned_account_id,
        source, recorded_by)
      select id, ${actor.investigationId}, study_number, sex, age_band, area, occupation, household_id,
        classification, ${definitionVersion}, onset_date, report_date, interview_date, interviewed,
        interview_state, isolation_date, outcome, outcome_date, assigned_account_id, source,
        ${actor.accountId}
      from jsonb_to_recordset(${json}::jsonb) as r (id uuid, study_number text, sex text, age_band text,
        area text, occupation text, household_id uuid, classification text, onset_date text,
        report_date text, interview_date text, interviewed text, interview_state text,
        isolation_date text, outcome text, outcome_date text, assigned_account_id uuid, source text)`,
  );
  await tx.execute(
    sql`insert into core.classification (id, investigation_id, person_id, classification,
        case_definition_version, recorded_by)
      select gen_random_uuid(), ${actor.investigationId}, id, classification, ${definitionVersion},
        ${actor.accountId}
      from jsonb_to_recordset(${json}::jsonb) as r (id uuid, classification text)
      where classification is not null`,
  );
  return rows.map((row) => ({ id: row.id, studyNumber: row.study_number }));
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

/** Records tests and brings each person's copies (reference test) up to date. */
export async function insertTests(
  tx: Tx,
  actor: Actor,
  tests: readonly NewTest[],
): Promise<string[]> {
  if (tests.length === 0) return [];
  const rows = tests.map((test) => ({
    id: randomUUID(),
    person_id: test.personId,
    specimen_date: test.specimenDate,
    kind: test.kind,
    result: test.result,
    result_date: test.resultDate,
    result_at: test.resultAt ?? null,
  }));
  await tx.execute(
    sql`insert into core.test_result (id, investigation_id, person_id, specimen_date, kind, result,
        result_date, result_at, recorded_by)
      select id, ${actor.investigationId}, person_id, specimen_date, kind, result, result_date,
        result_at, ${actor.accountId}
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as r (id uuid, person_id uuid,
        specimen_date text, kind text, result text, result_date text, result_at timestamptz)`,
  );
  await refreshTestCopies(tx, [...new Set(tests.map((test) => test.personId))]);
  return rows.map((row) => row.id);
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
  const rows = interviews.map(({ personId, day }) => ({
    id: randomUUID(),
    person_id: personId,
    day: day ?? "unknown",
    noon: day !== null && /^\d{4}-\d{2}-\d{2}$/.test(day) ? `${day} 12:00` : null,
  }));
  // Noon of today may be still to come; nothing on record is held later than it was recorded.
  await tx.execute(
    sql`insert into core.interview (id, investigation_id, person_id, outcome, held_at, day, source, recorded_by)
        select id, ${actor.investigationId}, person_id, 'complete',
          least(coalesce(noon::timestamp at time zone ${timeZone}, now()), now()), day, ${source},
          ${actor.accountId}
        from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb)
          as r (id uuid, person_id uuid, day text, noon text)`,
  );
}
