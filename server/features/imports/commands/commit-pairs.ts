import { createHash } from "node:crypto";
import { createRefBook, type RefBook } from "../ref-book.ts";
import { stageBatches } from "../stage-batches.ts";
import type { StagedPair } from "../staged-row.ts";
import { splitNumber } from "../telling.ts";
import type { CommitContext } from "./commit-context.ts";
import { putNewPeople } from "./put-new-people.ts";
import { putTellings, type Telling } from "./put-tellings.ts";

/** People whom only pairs name, when creating them was chosen: a reference and nothing else. */
async function createMissingPeople(
  context: CommitContext,
  refs: RefBook,
  rows: readonly StagedPair[],
): Promise<void> {
  const missing = new Map<string, number>();
  for (const { line, cells } of rows) {
    for (const ref of [cells.ref_a, cells.ref_b]) {
      if (!refs.idOf(ref) && !refs.waits(ref) && !missing.has(ref)) missing.set(ref, line);
    }
  }
  const made = await putNewPeople(
    context,
    [...missing].map(([ref, line]) => ({ line, cells: { ref } })),
  );
  for (const [ref, id] of made) refs.add(ref, id);
}

function tellingOf({ places }: CommitContext, refs: RefBook, { cells }: StagedPair): Telling {
  const [a, b] = [refs.idOf(cells.ref_a) as string, refs.idOf(cells.ref_b) as string];
  const [minutes, distance] = [splitNumber(cells.minutes), splitNumber(cells.distance_m)];
  return {
    // Text of ids in lower case sorts as the database sorts ids.
    a: a < b ? a : b,
    b: a < b ? b : a,
    namedBy: cells.named_by ? refs.idOf(cells.named_by) : null,
    first: cells.first_exposure ?? null,
    last: cells.last_exposure ?? null,
    setting: cells.setting ?? null,
    place: places.idOf(cells.place, cells.setting ?? null),
    minutes: minutes.number,
    minutesMissing: minutes.missing,
    // As precise as it is stored.
    distance: distance.number === null ? null : Math.fround(distance.number),
    distanceMissing: distance.missing,
  };
}

/** Tells tellings of one file apart, by a hash each: a file may have a million. */
function createTold(): (telling: Telling) => boolean {
  const told = new Set<string>();
  return (telling) => {
    const hash = createHash("sha256")
      .update(JSON.stringify(Object.values(telling)))
      .digest();
    const key = hash.toString("latin1", 0, 16);
    if (told.has(key)) return false;
    told.add(key);
    return true;
  };
}

/** Records the staged pairs: one contact pair per two people, one exposure per telling. */
export async function commitPairs(context: CommitContext): Promise<void> {
  const { tx, keys, importId, places, counts, createMissing, pause } = context;
  const refs = createRefBook(tx, keys, pause);
  const isNew = createTold();
  const read = stageBatches<StagedPair>(tx, keys, importId, pause);
  for (let batch = await read(); batch; batch = await read()) {
    const { rows } = batch;
    await refs.find(rows);
    if (createMissing) await createMissingPeople(context, refs, rows);
    const good: StagedPair[] = [];
    for (const row of rows) {
      const unknown = refs.unknownIn(row);
      if (unknown.length === 0) good.push(row);
      else {
        counts.unknownRows += 1;
        context.problems.add(unknown);
      }
    }
    await pause();
    await places.ensure(
      good.flatMap(({ cells }) =>
        cells.place ? [{ name: cells.place, setting: cells.setting ?? null }] : [],
      ),
    );
    const tellings: Telling[] = [];
    for (const row of good) {
      const telling = tellingOf(context, refs, row);
      if (isNew(telling)) tellings.push(telling);
      else counts.repeated += 1;
      await pause();
    }
    await putTellings(context, tellings);
    await context.progress(rows.length);
  }
}
