import { ageBandOf } from "../../../../shared/vocabulary.ts";
import { nearIds } from "../../../db/near-ids.ts";
import { savepoint } from "../../../db/with-tx.ts";
import { sqlState } from "../../../http/translate-error.ts";
import { addPeople } from "../../../identity/add-people.ts";
import { type PackedPeople, packNewPeople } from "../../../identity/pack-new-people.ts";
import {
  insertHeldInterviews,
  insertPeople,
  insertTests,
  type NewPerson,
} from "../../people/store.ts";
import { isMissingWord } from "../check-cell.ts";
import { newIdentityOf } from "../row-identity.ts";
import type { StagedPerson } from "../staged-row.ts";
import type { CommitContext } from "./commit-context.ts";

/** People whose identity is encrypted at a stretch: some 15 ms of work. */
const IDENTITY_SLICE = 100;
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

/** Somebody new with their row; `at` is the row's place among those it came with. */
export interface NewRow {
  id: string;
  at: number;
  row: StagedPerson;
}

/**
 * Gives the rows of new people their ids. The order is that of the ids, so that the database stores
 * them side by side, and says nothing of the file's.
 */
export function newRows(
  rows: readonly StagedPerson[],
  isNew: (row: StagedPerson) => boolean = () => true,
): NewRow[] {
  const ids = nearIds(rows.length);
  return rows
    .map((row, at) => ({ id: ids[at] as string, at, row }))
    .filter(({ row }) => isNew(row))
    .sort((a, b) => (a.id < b.id ? -1 : 1));
}

/** Seals the identity of new people here, with turns of the event loop between. */
export async function* packHere(
  { keys, settings, pause }: CommitContext,
  people: readonly NewRow[],
): AsyncGenerator<PackedPeople> {
  for (let from = 0; from < people.length; from += IDENTITY_SLICE) {
    const slice = people.slice(from, from + IDENTITY_SLICE);
    const identities = slice.map(({ id, row }) => ({
      personId: id,
      identity: newIdentityOf(row.cells),
    }));
    yield packNewPeople(keys, identities, settings.countryCode);
    await pause();
  }
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

const hasTest = (cells: Cells) => Boolean(cells.specimen_date || cells.result_date || cells.result);

/** A new person's row of core; their one test and interview are copied into it. */
function corePerson({ today, places }: CommitContext, { id, row: { cells } }: NewRow): NewPerson {
  const { outcome, day } = outcomeOf(cells.died_date);
  return {
    id,
    sex: cells.sex ?? null,
    ageBand: ageBandOf(cells.birth_date ?? null, today),
    area: cells.area ?? null,
    occupation: cells.occupation ?? null,
    householdId: places.idOf(cells.household, "household"),
    classification: cells.classification ?? null,
    onsetDate: cells.onset_date ?? null,
    specimenDate: cells.specimen_date ?? null,
    resultDate: cells.result_date ?? null,
    result: cells.result ?? null,
    reportDate: cells.report_date ?? null,
    interviewDate: cells.interview_date ?? null,
    interviewed: cells.interviewed ?? null,
    interviewState: cells.interviewed === "yes" ? "complete" : null,
    isolationDate: cells.isolation_date ?? null,
    outcome,
    outcomeDate: day,
    source: "import",
  };
}

/**
 * Records new people from rows: core, identity, classification history, the row's test and its
 * interview. Their households are on record.
 *
 * @param packed their identity as `addPeople` takes it, in parts
 */
export async function storeNewPeople(
  context: CommitContext,
  people: readonly NewRow[],
  packed: AsyncIterable<PackedPeople> | Iterable<Promise<PackedPeople>>,
): Promise<void> {
  const { tx, actor, counts, settings } = context;
  if (people.length === 0) return;
  await insertWithRetries(
    context,
    people.map((one) => corePerson(context, one)),
  );
  await context.pause();
  for await (const part of packed) await addPeople(tx, part);
  const tests = people.flatMap(({ id, row: { cells } }) =>
    hasTest(cells) ? [testOf(id, cells)] : [],
  );
  await insertTests(tx, actor, tests, true);
  await context.pause();
  const interviews = people.flatMap(({ id, row: { cells } }) =>
    cells.interviewed === "yes" ? [{ personId: id, day: cells.interview_date ?? null }] : [],
  );
  await insertHeldInterviews(tx, actor, "import", settings.timeZone, interviews);
  counts.addedPeople += people.length;
  counts.addedTests += tests.length;
  counts.addedInterviews += interviews.length;
}

/**
 * Records new people, sealing their identity in this thread: for some hundreds.
 *
 * @returns ids of the new people by reference
 */
export async function putNewPeople(
  context: CommitContext,
  rows: readonly StagedPerson[],
): Promise<Map<string, string>> {
  const people = newRows(rows);
  await storeNewPeople(context, people, packHere(context, people));
  return new Map(people.map(({ id, row }) => [row.cells.ref, id]));
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
