import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { createRefBook, type RefBook } from "../ref-book.ts";
import type { StagedPair } from "../staged-row.ts";
import { readStage } from "../store.ts";
import { splitNumber, tellingKey } from "../telling.ts";
import type { CommitContext } from "./commit-context.ts";
import { putNewPeople } from "./put-new-people.ts";

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

function exposureRow({ places }: CommitContext, refs: RefBook, { cells }: StagedPair) {
  const [a, b] = [refs.idOf(cells.ref_a) as string, refs.idOf(cells.ref_b) as string];
  const [minutes, distance] = [splitNumber(cells.minutes), splitNumber(cells.distance_m)];
  return {
    id: randomUUID(),
    pair: randomUUID(),
    // Text of ids in lower case sorts as the database sorts ids.
    a: a < b ? a : b,
    b: a < b ? b : a,
    named_by: cells.named_by ? refs.idOf(cells.named_by) : null,
    first: cells.first_exposure,
    last: cells.last_exposure,
    setting: cells.setting,
    place: places.idOf(cells.place, cells.setting ?? null),
    minutes: minutes.number,
    minutes_missing: minutes.missing,
    distance: distance.number,
    distance_missing: distance.missing,
  };
}

/** Pairs that are missing, then the tellings that are not on record. */
async function putTellings(
  context: CommitContext,
  rows: readonly ReturnType<typeof exposureRow>[],
): Promise<void> {
  if (rows.length === 0) return;
  const { tx, actor, counts } = context;
  const json = JSON.stringify(rows);
  const pairs = await tx.execute(
    sql`insert into core.contact_pair as cp (id, investigation_id, person_a, person_b)
        select distinct on (a, b) pair, ${actor.investigationId}::uuid, a, b
        from jsonb_to_recordset(${json}::jsonb) as r (pair uuid, a uuid, b uuid)
        order by a, b
        on conflict (investigation_id, person_a, person_b) do update set withdrawn_at = null
          where cp.withdrawn_at is not null`,
  );
  const exposures = await tx.execute(
    sql`insert into core.exposure (id, investigation_id, pair_id, import_id, named_by, first_exposure,
          last_exposure, setting, place_id, minutes, minutes_missing, distance_m, distance_missing,
          recorded_by)
        select r.id, cp.investigation_id, cp.id, ${context.importId}::uuid, r.named_by, r.first, r.last,
          r.setting, r.place, r.minutes, r.minutes_missing, r.distance, r.distance_missing,
          ${actor.accountId}::uuid
        from jsonb_to_recordset(${json}::jsonb) as r (id uuid, a uuid, b uuid, named_by uuid, first text,
          last text, setting text, place uuid, minutes integer, minutes_missing text, distance real,
          distance_missing text)
        join core.contact_pair cp on cp.investigation_id = ${actor.investigationId}::uuid
          and cp.person_a = r.a and cp.person_b = r.b
        where not exists (
          select 1 from core.exposure e where e.pair_id = cp.id and e.withdrawn_at is null
            and (e.named_by, e.first_exposure, e.last_exposure, e.setting, e.place_id, e.minutes,
              e.minutes_missing, e.distance_m, e.distance_missing)
            is not distinct from (r.named_by, r.first, r.last, r.setting, r.place, r.minutes,
              r.minutes_missing, r.distance, r.distance_missing))`,
  );
  counts.addedPairs += pairs.rowCount ?? 0;
  counts.addedExposures += exposures.rowCount ?? 0;
  counts.repeated += rows.length - (exposures.rowCount ?? 0);
}

/** Records the staged pairs: one contact pair per two people, one exposure per telling. */
export async function commitPairs(context: CommitContext): Promise<void> {
  const { tx, keys, importId, places, counts, createMissing } = context;
  const refs = createRefBook(tx, keys);
  const told = new Set<string>();
  const chunks = await readStage<StagedPair>(tx, keys, importId);
  for (const [at, openChunk] of chunks.entries()) {
    const rows = openChunk();
    await refs.find(rows);
    await context.pause();
    if (createMissing) await createMissingPeople(context, refs, rows);
    const good: StagedPair[] = [];
    for (const row of rows) {
      const unknown = refs.unknownIn(row);
      if (unknown.length > 0) {
        counts.unknownRows += 1;
        context.problems.add(unknown);
        continue;
      }
      const key = tellingKey(row);
      if (told.has(key)) counts.repeated += 1;
      else good.push(row);
      told.add(key);
    }
    await places.ensure(
      good.flatMap(({ cells }) =>
        cells.place ? [{ name: cells.place, setting: cells.setting ?? null }] : [],
      ),
    );
    await context.pause();
    await putTellings(
      context,
      good.map((row) => exposureRow(context, refs, row)),
    );
    await context.progress((at + 1) / chunks.length);
  }
}
