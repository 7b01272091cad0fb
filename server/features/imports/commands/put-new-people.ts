import { randomUUID } from "node:crypto";
import { ageBandOf } from "../../../../shared/vocabulary.ts";
import { savepoint } from "../../../db/with-tx.ts";
import { sqlState } from "../../../http/translate-error.ts";
import { type Identity, putPeople } from "../../../identity/records.ts";
import {
  insertHeldInterviews,
  insertPeople,
  insertTests,
  type NewPerson,
} from "../../people/store.ts";
import { isMissingWord } from "../check-cell.ts";
import type { StagedPerson } from "../staged-row.ts";
import type { CommitContext } from "./commit-context.ts";

/** People whose identity is encrypted at a stretch: some 30 ms of work. */
const IDENTITY_SLICE = 200;
const STUDY_NUMBER_TRIES = 3;

type Cells = StagedPerson["cells"];

/** Outcome a died_date tells of; the words for "missing" say that it was asked, not that it came. */
export function outcomeOf(died: string | undefined): {
  outcome: string | null;
  day: string | null;
} {
  if (died === undefined) return { outcome: null, day: null };
  return { outcome: isMissingWord(died) ? "unknown" : "died", day: died };
}

/** Identity cells of a row; the keys that the row leaves out are left out, or null when `whole`. */
export function identityOf(cells: Cells, whole: boolean): Identity {
  const identity: Identity = {};
  const put = (key: keyof Identity, value: string | undefined) => {
    if (value !== undefined) identity[key] = value;
    else if (whole) identity[key] = null;
  };
  put("name", cells.name);
  put("phone", cells.phone);
  put("email", cells.email);
  put("birthDate", cells.birth_date);
  put("address", cells.address);
  return identity;
}

/** A random study number may be taken; the part is then repeated with others. */
async function insertWithRetries(context: CommitContext, people: NewPerson[]): Promise<void> {
  const { tx, actor, settings } = context;
  for (let attempt = 1; ; attempt++) {
    const done = await savepoint(tx, () =>
      insertPeople(tx, actor, people, settings.caseDefinitionVersion),
    );
    if (done.ok) return;
    if (attempt >= STUDY_NUMBER_TRIES || sqlState(done.error) !== "23505") throw done.error;
  }
}

/** Encrypts and stores identity in slices, with turns of the event loop between. */
export async function putIdentity(
  context: CommitContext,
  people: readonly { personId: string; identity: Identity }[],
): Promise<void> {
  for (let from = 0; from < people.length; from += IDENTITY_SLICE) {
    const slice = people.slice(from, from + IDENTITY_SLICE);
    await putPeople(context.tx, context.keys, slice, context.settings.countryCode);
    await context.pause();
  }
}

/**
 * Records new people from rows: core, identity, classification history, the row's test and its
 * interview.
 *
 * @returns ids of the new people by reference
 */
export async function putNewPeople(
  context: CommitContext,
  rows: readonly StagedPerson[],
): Promise<Map<string, string>> {
  const { today, places, counts } = context;
  const ids = new Map(rows.map((row) => [row.cells.ref, randomUUID()]));
  const idOf = (cells: Cells) => ids.get(cells.ref) as string;
  const people = rows.map(({ cells }): NewPerson => {
    const { outcome, day } = outcomeOf(cells.died_date);
    return {
      id: idOf(cells),
      sex: cells.sex ?? null,
      ageBand: ageBandOf(cells.birth_date ?? null, today),
      area: cells.area ?? null,
      occupation: cells.occupation ?? null,
      householdId: places.idOf(cells.household, "household"),
      classification: cells.classification ?? null,
      onsetDate: cells.onset_date ?? null,
      reportDate: cells.report_date ?? null,
      interviewDate: cells.interview_date ?? null,
      interviewed: cells.interviewed ?? null,
      interviewState: cells.interviewed === "yes" ? "complete" : null,
      isolationDate: cells.isolation_date ?? null,
      outcome,
      outcomeDate: day,
      source: "import",
    };
  });
  if (people.length === 0) return ids;
  await insertWithRetries(context, people);
  await context.pause();
  await putIdentity(
    context,
    rows.map(({ cells }) => ({
      personId: idOf(cells),
      identity: { ref: cells.ref, ...identityOf(cells, true) },
    })),
  );
  const tests = rows
    .filter(({ cells }) => cells.specimen_date || cells.result_date || cells.result)
    .map(({ cells }) => testOf(idOf(cells), cells));
  await insertTests(context.tx, context.actor, tests);
  const interviews = rows
    .filter(({ cells }) => cells.interviewed === "yes")
    .map(({ cells }) => ({ personId: idOf(cells), day: cells.interview_date ?? null }));
  await insertHeldInterviews(
    context.tx,
    context.actor,
    "import",
    context.settings.timeZone,
    interviews,
  );
  counts.addedPeople += people.length;
  counts.addedTests += tests.length;
  counts.addedInterviews += interviews.length;
  return ids;
}

/** The test a row tells of. */
export function testOf(personId: string, cells: Cells) {
  return {
    personId,
    specimenDate: cells.specimen_date ?? null,
    kind: null,
    result: cells.result ?? null,
    resultDate: cells.result_date ?? null,
  };
}
