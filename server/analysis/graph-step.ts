import type pg from "pg";
import {
  GRAPH_SQL,
  readClassified,
  readExposure,
  readGroupExposure,
  readInterview,
  readPerson,
} from "./graph-rows.ts";
import type { GraphStore } from "./graph-store.ts";
import { streamRows, type TextRow } from "./stream-rows.ts";

/** What a step of the graph touched, by numbers in the store. */
export type Touched = {
  readonly people: ReadonlySet<number>;
  readonly pairs: ReadonlySet<number>;
};

/** A row of `core.graph_change`. */
export type Change = { kind: string; person_a: string | null; person_b: string | null };

// Kinds that may change tellings which no row of their own names.
const REACHES_ALL_PAIRS = new Set(["interview", "withdrawn"]);

function sortChanges(changes: readonly Change[]) {
  const ids = new Set<string>();
  const centres = new Set<string>();
  const low: string[] = [];
  const high: string[] = [];
  for (const { kind, person_a: a, person_b: b } of changes) {
    if (a) ids.add(a);
    if (b) ids.add(b);
    if (a && b) {
      const [first, second] = [a, b].sort() as [string, string];
      low.push(first);
      high.push(second);
    } else if (a && REACHES_ALL_PAIRS.has(kind)) centres.add(a);
  }
  return { ids, centres, low, high };
}

/** Rows by owner; owners without a row get an empty list, so that theirs are replaced by nothing. */
function byOwner<R>(owners: Iterable<number>, rows: readonly R[], ownerOf: (row: R) => number) {
  const lists = new Map<number, R[]>();
  for (const owner of owners) lists.set(owner, []);
  for (const row of rows) {
    const list = lists.get(ownerOf(row));
    if (list) list.push(row);
    else lists.set(ownerOf(row), [row]);
  }
  return lists;
}

/** Rows of one step, read but not yet in the store. */
export type StepRows = {
  readonly people: readonly TextRow[];
  readonly classified: readonly TextRow[];
  readonly interviews: readonly TextRow[];
  readonly groupExposures: readonly TextRow[];
  readonly exposures: readonly TextRow[];
  /** Ends of the pairs that changes name, in the database's order. */
  readonly low: readonly string[];
  readonly high: readonly string[];
};

/**
 * Fetches what changes name: people with their classifications, interviews and group exposures, and
 * all tellings of touched pairs. The store is only asked who is known, so that whoever reads it
 * meanwhile sees one version.
 *
 * @param client inside one snapshot of the database
 */
export async function fetchStep(
  client: pg.ClientBase,
  investigationId: string,
  store: GraphStore,
  changes: readonly Change[],
): Promise<StepRows> {
  const { ids, centres, low, high } = sortChanges(changes);
  const rowsOf = async (sql: string, values: unknown[]) => {
    const rows: TextRow[] = [];
    await streamRows(client, sql, [investigationId, ...values], (row) => rows.push(row));
    return rows;
  };
  const exposures = await rowsOf(
    `${GRAPH_SQL.exposures} where e.investigation_id = $1 and e.pair_id in (
       select t.id from core.contact_pair t
         join unnest($2::uuid[], $3::uuid[]) as named (a, b)
           on t.person_a = named.a and t.person_b = named.b
       union
       select t.id from core.contact_pair t where t.person_a = any ($4::uuid[])
       union
       select t.id from core.contact_pair t where t.person_b = any ($4::uuid[]))
     order by e.recorded_at, e.id`,
    [low, high, [...centres]],
  );
  for (const [a, b] of exposures) {
    if (a && store.indexOf(a) === undefined) ids.add(a);
    if (b && store.indexOf(b) === undefined) ids.add(b);
  }
  const owned = async (sql: string, alias: string, column: string) =>
    await rowsOf(
      `${sql} where ${alias}.investigation_id = $1 and ${alias}.${column} = any ($2::uuid[])
       order by ${alias}.recorded_at, ${alias}.id`,
      [[...ids]],
    );
  return {
    people: await owned(GRAPH_SQL.people, "p", "id"),
    classified: await owned(GRAPH_SQL.classified, "c", "person_id"),
    interviews: await owned(GRAPH_SQL.interviews, "i", "person_id"),
    groupExposures: await owned(GRAPH_SQL.groupExposures, "g", "person_id"),
    exposures,
    low,
    high,
  };
}

/** Puts fetched rows into the store, in one go, and says what they touched. */
export function applyStep(store: GraphStore, step: StepRows): Touched {
  const people = new Set(step.people.map((row) => store.putPerson(...readPerson(row))));
  const classified = step.classified.map((row) => readClassified(store, row));
  for (const [who, rows] of byOwner(people, classified, (row) => row.person)) {
    store.classified.replace(who, rows);
  }
  const interviews = step.interviews.map((row) => readInterview(store, row));
  for (const [who, rows] of byOwner(people, interviews, (row) => row.person)) {
    store.interviews.replace(who, rows);
  }
  const groups = step.groupExposures.map((row) => readGroupExposure(store, row));
  for (const [who, rows] of byOwner(people, groups, (row) => row.person)) {
    store.groupExposures.replace(who, rows);
  }
  const named: number[] = [];
  step.low.forEach((id, k) => {
    const [a, b] = [store.indexOf(id), store.indexOf(step.high[k] ?? "")];
    const pair = a === undefined || b === undefined ? -1 : store.pairs.find(a, b);
    if (pair >= 0) named.push(pair);
  });
  const exposures = step.exposures.map((row) => readExposure(store, row));
  const pairs = byOwner(named, exposures, (row) => row.pair);
  for (const [pair, rows] of pairs) store.exposures.replace(pair, rows);
  return { people, pairs: new Set(pairs.keys()) };
}
