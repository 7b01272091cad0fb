import { sql } from "drizzle-orm";
import { integers, reals, texts, uuids } from "../../../db/binary-arrays.ts";
import { nearIds } from "../../../db/near-ids.ts";
import type { CommitContext } from "./commit-context.ts";

/** One telling of a contact pair, its people and its place by their ids; `a` < `b`. */
export interface Telling {
  a: string;
  b: string;
  namedBy: string | null;
  first: string | null;
  last: string | null;
  setting: string | null;
  place: string | null;
  minutes: number | null;
  minutesMissing: string | null;
  distance: number | null;
  distanceMissing: string | null;
}

interface Pair {
  a: string;
  b: string;
  id: string;
  /** Made by this import just now, so nothing is told of it yet. */
  fresh: boolean;
}

const keyOf = ({ a, b }: Pick<Pair, "a" | "b">) => `${a}${b}`;

/** Pairs on record; one that was withdrawn is revived. */
async function knownPairs(
  { tx, actor, counts }: CommitContext,
  wanted: readonly Pick<Pair, "a" | "b">[],
): Promise<Pair[]> {
  const found = await tx.execute<{ a: string; b: string; id: string; withdrawn: boolean }>(
    sql`select cp.person_a as a, cp.person_b as b, cp.id, cp.withdrawn_at is not null as withdrawn
        from unnest(${uuids(wanted.map(({ a }) => a))}::uuid[],
          ${uuids(wanted.map(({ b }) => b))}::uuid[]) as r (a, b)
        join core.contact_pair cp on cp.investigation_id = ${actor.investigationId}::uuid
          and cp.person_a = r.a and cp.person_b = r.b`,
  );
  const withdrawn = found.rows.filter((row) => row.withdrawn);
  if (withdrawn.length > 0) {
    const revived = await tx.execute(
      sql`update core.contact_pair set withdrawn_at = null
          where id = any (${uuids(withdrawn.map(({ id }) => id))}::uuid[])
            and withdrawn_at is not null`,
    );
    counts.addedPairs += revived.rowCount ?? 0;
  }
  return found.rows.map(({ a, b, id }) => ({ a, b, id, fresh: false }));
}

/** The pairs of some tellings, made where they are missing, in the order they are stored in. */
async function pairsOf(context: CommitContext, tellings: readonly Telling[]): Promise<Pair[]> {
  const { tx, actor, counts } = context;
  const wanted = new Map(tellings.map(({ a, b }) => [keyOf({ a, b }), { a, b }]));
  const known = await knownPairs(context, [...wanted.values()]);
  for (const pair of known) wanted.delete(keyOf(pair));
  if (wanted.size === 0) return known;
  const ids = nearIds(wanted.size).sort();
  const missing = [...wanted]
    .sort(([one], [other]) => (one < other ? -1 : 1))
    .map(([, { a, b }], at): Pair => ({ a, b, id: ids[at] as string, fresh: true }));
  const made = await tx.execute(
    sql`insert into core.contact_pair (id, investigation_id, person_a, person_b)
        select id, ${actor.investigationId}::uuid, a, b
        from unnest(${uuids(ids)}::uuid[], ${uuids(missing.map(({ a }) => a))}::uuid[],
          ${uuids(missing.map(({ b }) => b))}::uuid[]) as r (id, a, b)
        on conflict (investigation_id, person_a, person_b) do nothing`,
  );
  counts.addedPairs += made.rowCount ?? 0;
  if (made.rowCount === missing.length) return [...known, ...missing];
  // An interview made one of them at this moment; its pair stands.
  const others = await knownPairs(context, missing);
  const own = new Set(ids);
  return [...known, ...others.map((pair) => ({ ...pair, fresh: own.has(pair.id) }))];
}

async function insertExposures(
  { tx, actor, importId, counts }: CommitContext,
  rows: readonly (Telling & { pairId: string })[],
  compare: boolean,
): Promise<void> {
  if (rows.length === 0) return;
  const text = (key: "first" | "last" | "setting" | "minutesMissing" | "distanceMissing") =>
    texts(rows.map((row) => row[key]));
  const id = (key: "pairId" | "namedBy" | "place") => uuids(rows.map((row) => row[key]));
  const made = await tx.execute(
    sql`insert into core.exposure (id, investigation_id, pair_id, import_id, named_by, first_exposure,
          last_exposure, setting, place_id, minutes, minutes_missing, distance_m, distance_missing,
          recorded_by)
        select r.id, ${actor.investigationId}::uuid, r.pair_id, ${importId}::uuid, r.named_by, r.first,
          r.last, r.setting, r.place, r.minutes, r.minutes_missing, r.distance, r.distance_missing,
          ${actor.accountId}::uuid
        from unnest(${uuids(nearIds(rows.length).sort())}::uuid[], ${id("pairId")}::uuid[],
          ${id("namedBy")}::uuid[], ${text("first")}::text[], ${text("last")}::text[],
          ${text("setting")}::text[], ${id("place")}::uuid[],
          ${integers(rows.map((row) => row.minutes))}::integer[], ${text("minutesMissing")}::text[],
          ${reals(rows.map((row) => row.distance))}::real[], ${text("distanceMissing")}::text[])
          as r (id, pair_id, named_by, first, last, setting, place, minutes, minutes_missing,
            distance, distance_missing)
        where ${
          compare
            ? sql`not exists (
          select 1 from core.exposure e where e.pair_id = r.pair_id and e.withdrawn_at is null
            and (e.named_by, e.first_exposure, e.last_exposure, e.setting, e.place_id, e.minutes,
              e.minutes_missing, e.distance_m, e.distance_missing)
            is not distinct from (r.named_by, r.first, r.last, r.setting, r.place, r.minutes,
              r.minutes_missing, r.distance, r.distance_missing))`
            : sql`true`
        }`,
  );
  counts.addedExposures += made.rowCount ?? 0;
  counts.repeated += rows.length - (made.rowCount ?? 0);
}

/**
 * Stores tellings that differ from each other: pairs that are missing, then the tellings that are
 * not on record. Those of new pairs need no comparison.
 */
export async function putTellings(
  context: CommitContext,
  tellings: readonly Telling[],
): Promise<void> {
  if (tellings.length === 0) return;
  const pairs = new Map((await pairsOf(context, tellings)).map((pair) => [keyOf(pair), pair]));
  await context.pause();
  const rows = tellings
    .map((telling) => ({ telling, pair: pairs.get(keyOf(telling)) as Pair }))
    .sort((one, other) => (one.pair.id < other.pair.id ? -1 : 1));
  const of = (fresh: boolean) =>
    rows
      .filter(({ pair }) => pair.fresh === fresh)
      .map(({ telling, pair }) => ({ ...telling, pairId: pair.id }));
  await insertExposures(context, of(true), false);
  await context.pause();
  await insertExposures(context, of(false), true);
}
