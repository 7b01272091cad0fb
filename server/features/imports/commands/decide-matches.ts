import { sql } from "drizzle-orm";
import type { z } from "zod";
import type {
  matchDecisionAnswer,
  matchDecisionInput,
} from "../../../../shared/contracts/imports.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce, recordGraphChange } from "../../../events/record-graph-change.ts";
import { HttpProblem } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { Services } from "../../../services.ts";
import { loadInvestigation } from "../../investigations/store.ts";
import { COMPARED_FIELDS } from "../known-people.ts";
import {
  addRefAliases,
  closeRows,
  countWaiting,
  type WaitingRow,
  waitingRows,
} from "../match-store.ts";
import { createPause } from "../pause.ts";
import { createPlaceBook } from "../place-book.ts";
import { ProblemList } from "../problem-list.ts";
import { loadImport, peopleByRef } from "../store.ts";
import { type CommitContext, noCounts } from "./commit-context.ts";
import { fillKnownPeople } from "./fill-known-people.ts";
import { putNewPeople } from "./put-new-people.ts";

/** Rows decided in one request; who decides about all of a kind asks again until none is left. */
const MOST_ROWS = 200;

/** A row with the person it is about; null makes a new one. */
interface Placed {
  row: WaitingRow;
  personId: string | null;
}

async function contextOf(
  tx: Tx,
  services: Pick<Services, "keys">,
  actor: Actor,
  importId: string,
): Promise<CommitContext> {
  const settings = await loadInvestigation(tx, actor.investigationId);
  const keys = await services.keys.of(tx, actor.investigationId);
  const reserve = async (count: number) => {
    const found = await tx.execute<{ first: number | null }>(
      sql`select core.next_numbers(${count}) as first`,
    );
    const first = found.rows[0]?.first;
    if (first == null) throw new Error("no place numbers were given");
    return first;
  };
  return {
    tx,
    actor,
    keys,
    settings,
    importId,
    createMissing: false,
    today: dayIn(settings.timeZone, now()),
    places: createPlaceBook(tx, actor, keys, reserve),
    counts: noCounts(),
    problems: new ProblemList(),
    pause: createPause(),
    progress: async () => undefined,
  };
}

/**
 * Whom the rows are about. A reference that came on record meanwhile names its person, whatever was
 * decided; "same" needs the person it looks like, which an earlier row may not be yet.
 */
async function placeRows(
  { tx, keys }: CommitContext,
  rows: readonly WaitingRow[],
  decision: "same" | "other",
): Promise<Placed[]> {
  const refs = rows.flatMap(({ row, otherRef }) => [row.cells.ref, otherRef ?? []].flat());
  const known = await peopleByRef(tx, keys, refs);
  return rows.flatMap((row): Placed[] => {
    const own = known.get(row.row.cells.ref) ?? null;
    if (own !== null || decision === "other") return [{ row, personId: own }];
    const other = row.otherId ?? (row.otherRef === null ? null : known.get(row.otherRef));
    return other ? [{ row, personId: other }] : [];
  });
}

async function putNew(context: CommitContext, placed: readonly Placed[]): Promise<string[]> {
  const rows = placed.filter(({ personId }) => personId === null).map(({ row }) => row.row);
  await context.places.ensure(
    rows.flatMap(({ cells }) =>
      cells.household ? [{ name: cells.household, setting: "household" }] : [],
    ),
  );
  return [...(await putNewPeople(context, rows)).values()];
}

/** Fills people on record; of several rows about one person each sees what the one before filled. */
async function fill(context: CommitContext, placed: readonly Placed[]): Promise<string[]> {
  let rest = placed.flatMap(({ row, personId }) =>
    personId === null ? [] : [{ row: row.row, personId }],
  );
  const people = new Set(rest.map(({ personId }) => personId));
  while (rest.length > 0) {
    const seen = new Set<string>();
    const turn = rest.filter(({ personId }) => !seen.has(personId) && seen.add(personId));
    await fillKnownPeople(context, turn);
    rest = rest.filter((one) => !turn.includes(one));
  }
  return [...people];
}

/**
 * Puts rows that were set aside on record, as another person or as the one they look like: then
 * their blanks are filled and the row's reference names that person too.
 *
 * @throws HttpProblem 404 for an import that is not there, 409 for one that is not on record
 */
export async function decideMatches(
  tx: Tx,
  services: Pick<Services, "keys">,
  actor: Actor,
  importId: string,
  { decision, ids, matchedOn }: z.output<typeof matchDecisionInput>,
): Promise<z.output<typeof matchDecisionAnswer>> {
  const found = await loadImport(tx, importId);
  if (!found) throw new HttpProblem("not_found");
  if (found.state !== "committed") throw new HttpProblem("conflict");
  const context = await contextOf(tx, services, actor, importId);
  const page = { limit: MOST_ROWS, offset: 0 };
  const asked = await waitingRows(tx, context.keys, importId, { ids, matchedOn }, page);
  const placed = await placeRows(context, asked, decision);
  // Before the rows are closed: reading what is on record needs rows that wait.
  const filled = await fill(context, placed);
  const closed = await closeRows(
    tx,
    importId,
    placed.map(({ row }) => row.id),
    decision,
  );
  // Somebody else decided about one of them at this moment; theirs stands and this is undone whole.
  if (closed.size < placed.length) throw new HttpProblem("conflict");
  const made = await putNew(context, placed);
  if (decision === "same") {
    await addRefAliases(
      tx,
      context.keys,
      placed.flatMap(({ row, personId }) =>
        personId === null ? [] : [{ ref: row.row.cells.ref, personId }],
      ),
    );
  }
  const { counts } = context;
  const decided = placed.length;
  if (decided > 0) {
    await tx.execute(
      sql`update core.import set counts = counts || jsonb_build_object(
            ${decision}::text, coalesce((counts ->> ${decision})::int, 0) + ${decided}::int)
          where id = ${importId}`,
    );
    await recordEvent(tx, {
      action: "import.matches_decided",
      accountId: actor.accountId,
      role: actor.role,
      investigationId: actor.investigationId,
      personIds: [...filled, ...made],
      fields: filled.length > 0 ? COMPARED_FIELDS : [],
      counts: { ...counts, [decision]: decided },
    });
    await announce(tx, "imports", importId);
    await announce(tx, "people", null);
    await recordGraphChange(tx, actor, [
      ...made.map((personA) => ({ kind: "person" as const, personA })),
      ...filled.map((personA) => ({ kind: "classification" as const, personA })),
    ]);
  }
  const left = (await countWaiting(tx, importId))
    .filter((kind) => matchedOn === undefined || kind.matchedOn === matchedOn)
    .reduce((sum, { waiting }) => sum + waiting, 0);
  return { decided, waiting: asked.length - decided, left, conflicts: counts.conflicts };
}
