import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { ageBandOf } from "../../../../shared/vocabulary.ts";
import { type Identity, putPeople } from "../../../identity/records.ts";
import { insertHeldInterviews, insertTests, refreshTestCopies } from "../../people/store.ts";
import { type Comparison, compareKnown } from "../known-people.ts";
import { identityOf } from "../row-identity.ts";
import type { StagedPerson } from "../staged-row.ts";
import type { CommitContext } from "./commit-context.ts";
import { outcomeOf, testOf } from "./put-new-people.ts";

/** People whose identity is encrypted at a stretch: some 30 ms of work. */
const IDENTITY_SLICE = 200;

const idList = (ids: readonly string[]) => sql`${sql.param(`{${ids.join(",")}}`)}::uuid[]`;

/** Encrypts and stores identity in slices, with turns of the event loop between. */
async function putIdentity(
  context: CommitContext,
  people: readonly { personId: string; identity: Identity }[],
): Promise<void> {
  for (let from = 0; from < people.length; from += IDENTITY_SLICE) {
    const slice = people.slice(from, from + IDENTITY_SLICE);
    await putPeople(context.tx, context.keys, slice, context.settings.countryCode);
    await context.pause();
  }
}

/** Blank core columns; a value that came meanwhile stays. */
async function fillCore(context: CommitContext, filled: readonly Comparison[]): Promise<void> {
  const rows = filled.map(({ personId, fills }) => {
    const { outcome, day } = outcomeOf(fills.died_date);
    return {
      id: personId,
      sex: fills.sex,
      age_band: ageBandOf(fills.birth_date ?? null, context.today),
      area: fills.area,
      household_id: context.places.idOf(fills.household, "household"),
      classification: fills.classification,
      onset_date: fills.onset_date,
      report_date: fills.report_date,
      interview_date: fills.interview_date,
      interviewed: fills.interviewed,
      isolation_date: fills.isolation_date,
      outcome,
      outcome_date: day,
    };
  });
  await context.tx.execute(
    sql`update core.person p set sex = coalesce(p.sex, r.sex), age_band = coalesce(p.age_band, r.age_band),
          area = coalesce(p.area, r.area), household_id = coalesce(p.household_id, r.household_id),
          classification = coalesce(p.classification, r.classification),
          case_definition_version = case when p.classification is null and r.classification is not null
            then ${context.settings.caseDefinitionVersion} else p.case_definition_version end,
          onset_date = coalesce(p.onset_date, r.onset_date),
          report_date = coalesce(p.report_date, r.report_date),
          interview_date = coalesce(p.interview_date, r.interview_date),
          interviewed = coalesce(p.interviewed, r.interviewed),
          interview_state = case when p.interviewed is null and r.interviewed = 'yes' then 'complete'
            else p.interview_state end,
          isolation_date = coalesce(p.isolation_date, r.isolation_date),
          outcome = coalesce(p.outcome, r.outcome), outcome_date = coalesce(p.outcome_date, r.outcome_date),
          version = p.version + 1, updated_at = now()
        from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as r (id uuid, sex text, age_band text,
          area text, household_id uuid, classification text, onset_date text, report_date text,
          interview_date text, interviewed text, isolation_date text, outcome text, outcome_date text)
        where p.id = r.id`,
  );
}

/** Occupations go through a function of the database: not every role that imports may read them. */
async function fillOccupations(context: CommitContext, compared: readonly Comparison[]) {
  const rows = compared
    .filter(({ fills }) => fills.occupation)
    .map(({ personId, fills }) => ({ person_id: personId, occupation: fills.occupation }));
  if (rows.length === 0) return;
  await context.tx.execute(
    sql`select core.fill_occupations(${context.importId}::uuid, ${JSON.stringify(rows)}::jsonb)`,
  );
}

/** First classifications go into the history as well. */
async function addClassifications(context: CommitContext, filled: readonly Comparison[]) {
  const rows = filled
    .filter(({ fills }) => fills.classification)
    .map(({ personId, fills }) => ({
      id: randomUUID(),
      person_id: personId,
      classification: fills.classification,
    }));
  if (rows.length === 0) return;
  const { tx, actor, settings } = context;
  await tx.execute(
    sql`insert into core.classification (id, investigation_id, person_id, classification,
          case_definition_version, recorded_by)
        select id, ${actor.investigationId}, person_id, classification,
          ${settings.caseDefinitionVersion}, ${actor.accountId}
        from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb)
          as r (id uuid, person_id uuid, classification text)`,
  );
}

/** A person without any test gets one; else the blanks of the test their record shows are filled. */
async function fillTests(context: CommitContext, filled: readonly Comparison[]): Promise<number> {
  const telling = filled.filter(
    ({ fills }) => fills.specimen_date || fills.result_date || fills.result,
  );
  if (telling.length === 0) return 0;
  const { tx, actor } = context;
  const ids = telling.map(({ personId }) => personId);
  const found = await tx.execute<{ person_id: string; id: string }>(
    sql`select distinct on (person_id) person_id, id from core.test_result
        where person_id = any (${idList(ids)}) and withdrawn_at is null
        order by person_id, (result = 'positive') desc nulls last,
          case when result = 'positive' then specimen_date end, recorded_at desc`,
  );
  const shown = new Map(found.rows.map((row) => [row.person_id, row.id]));
  const fresh = telling.filter(({ personId }) => !shown.has(personId));
  const rest = telling.filter(({ personId }) => shown.has(personId));
  await insertTests(
    tx,
    actor,
    fresh.map(({ personId, fills }) => testOf(personId, fills)),
  );
  if (rest.length > 0) {
    const rows = rest.map(({ personId, fills }) => ({
      id: shown.get(personId),
      specimen_date: fills.specimen_date,
      result: fills.result,
      result_date: fills.result_date,
    }));
    await tx.execute(
      sql`update core.test_result t set specimen_date = coalesce(t.specimen_date, r.specimen_date),
            result = coalesce(t.result, r.result), result_date = coalesce(t.result_date, r.result_date),
            version = t.version + 1
          from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb)
            as r (id uuid, specimen_date text, result text, result_date text)
          where t.id = r.id`,
    );
    await refreshTestCopies(
      tx,
      rest.map(({ personId }) => personId),
    );
  }
  return fresh.length;
}

/**
 * Fills what is blank of people on record from rows that name them; what differs is listed as a
 * conflict and left as it is.
 */
export async function fillKnownPeople(
  context: CommitContext,
  rows: readonly { row: StagedPerson; personId: string }[],
): Promise<void> {
  if (rows.length === 0) return;
  const { tx, keys, importId, actor, settings, places, counts } = context;
  const households = await places.knownHouseholds(
    rows.flatMap(({ row }) => row.cells.household ?? []),
  );
  const compared = await compareKnown(
    { tx, keys, importId, role: actor.role, country: settings.countryCode },
    rows,
    households,
  );
  counts.knownPeople += rows.length;
  for (const { line, conflicts } of compared) {
    counts.conflicts += conflicts.length;
    context.problems.add(conflicts.map((column) => ({ line, column, code: "conflict" })));
  }
  await fillOccupations(context, compared);
  // What the acting role may not read is not compared, so it does not count as a change either.
  const unread = actor.role === "officer" ? ["ref", "occupation"] : ["ref"];
  const filled = compared.filter(({ fills }) =>
    Object.keys(fills).some((column) => !unread.includes(column)),
  );
  if (filled.length === 0) return;
  // Households that only a differing row names are not made.
  await places.ensure(
    filled.flatMap(({ fills }) =>
      fills.household ? [{ name: fills.household, setting: "household" }] : [],
    ),
  );
  await fillCore(context, filled);
  await addClassifications(context, filled);
  await putIdentity(
    context,
    filled
      .map(({ personId, fills }) => ({ personId, identity: identityOf(fills, false) }))
      .filter(({ identity }) => Object.keys(identity).length > 0),
  );
  counts.addedTests += await fillTests(context, filled);
  const cellsOf = new Map(rows.map(({ row, personId }) => [personId, row.cells]));
  const interviews = filled
    .filter(({ fills }) => fills.interviewed === "yes")
    .map(({ personId, conflicts }) => ({
      personId,
      day: conflicts.includes("interview_date")
        ? null
        : (cellsOf.get(personId)?.interview_date ?? null),
    }));
  await insertHeldInterviews(
    context.tx,
    context.actor,
    "import",
    context.settings.timeZone,
    interviews,
  );
  counts.addedInterviews += interviews.length;
  counts.filledPeople += filled.length;
}
