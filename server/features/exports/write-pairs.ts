import { sql } from "drizzle-orm";
import { PAIR_COLUMNS } from "../../../shared/contracts/imports.ts";
import { namesHouseholds } from "../../../shared/export-columns.ts";
import { type BuildContext, SLICE, turn } from "./build-context.ts";
import { openDoor, openHouseholds, refNamer } from "./open-identity.ts";

interface TellingRow extends Record<string, unknown> {
  a: string;
  b: string;
  number_a: string;
  number_b: string;
  named_by: "a" | "b" | null;
  first_exposure: string | null;
  last_exposure: string | null;
  setting: string | null;
  place_id: string | null;
  place: string | null;
  place_number: string | null;
  minutes: string | null;
  distance: string | null;
}

/** Tellings that stand: neither they, their pair nor one of the two people were withdrawn. */
const STANDING = sql`core.exposure e
  join core.contact_pair cp on cp.id = e.pair_id and cp.withdrawn_at is null
  join core.person pa on pa.id = cp.person_a and pa.withdrawn_at is null
  join core.person pb on pb.id = cp.person_b and pb.withdrawn_at is null`;

const standingIn = ({ actor }: BuildContext) =>
  sql`e.investigation_id = ${actor.investigationId} and e.withdrawn_at is null`;

/** Opens the references of everybody in a pair, and names of households, where that was asked for. */
async function openNames(context: BuildContext) {
  const refs = new Map<string, string>();
  const households = new Map<string, string>();
  if (!context.identified) return { refs, households };
  const people = await context.tx.execute<{ id: string }>(
    sql`select distinct u.id from ${STANDING}
        cross join lateral (values (cp.person_a), (cp.person_b)) as u (id)
        where ${standingIn(context)} order by u.id`,
  );
  const door = await openDoor(
    context,
    people.rows.map((row) => row.id),
    false,
  );
  if (!namesHouseholds(context.actor.role, true)) return { refs: door.refs, households };
  const places = await context.tx.execute<{ id: string }>(
    sql`select distinct e.place_id as id from ${STANDING}
        join core.place pl on pl.id = e.place_id and pl.name is null
        where ${standingIn(context)} and e.setting = 'household'`,
  );
  const ids = places.rows.map((row) => row.id);
  return { refs: door.refs, households: await openHouseholds(context, ids) };
}

/** Small numbers may come with an exponent, which no file has. */
const plainNumber = (text: string | null) =>
  text !== null && /^[\d.]+e/i.test(text)
    ? Number(text)
        .toFixed(15)
        .replace(/\.?0+$/, "")
    : text;

/**
 * Writes the contact pairs, one record per telling, in the order they were recorded. A household is
 * named only beside the setting "household": with another one the import would take the name for a
 * facility's, which is kept in the clear.
 *
 * @returns how many tellings were written, of how many people
 */
export async function writePairs(context: BuildContext): Promise<{ rows: number; people: number }> {
  const { tx } = context;
  const counted = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from ${STANDING} where ${standingIn(context)}`,
  );
  const total = counted.rows[0]?.count ?? 0;
  const { refs, households } = await openNames(context);
  const refOf = refNamer(refs);
  await context.write(PAIR_COLUMNS);
  await tx.execute(
    sql`declare tellings no scroll cursor for
        select cp.person_a as a, cp.person_b as b, pa.study_number as number_a,
          pb.study_number as number_b,
          case e.named_by when cp.person_a then 'a' when cp.person_b then 'b' end as named_by,
          e.first_exposure, e.last_exposure, e.setting, e.place_id, pl.name as place,
          pl.number::text as place_number, coalesce(e.minutes::text, e.minutes_missing) as minutes,
          coalesce(e.distance_m::text, e.distance_missing) as distance
        from ${STANDING} left join core.place pl on pl.id = e.place_id
        where ${standingIn(context)} order by e.recorded_at, e.id`,
  );
  const seen = new Set<string>();
  let rows = 0;
  for (;;) {
    const found = await tx.execute<TellingRow>(
      sql`fetch forward ${sql.raw(String(SLICE))} from tellings`,
    );
    if (found.rows.length === 0) break;
    for (const row of found.rows) {
      const [a, b] = [refOf(row.a, row.number_a), refOf(row.b, row.number_b)];
      const household = row.place_id !== null && row.place === null;
      const name = row.setting === "household" ? households.get(row.place_id ?? "") : undefined;
      await context.write([
        a,
        b,
        row.first_exposure,
        row.last_exposure,
        row.setting,
        household ? (name ?? row.place_number) : row.place,
        row.minutes,
        plainNumber(row.distance),
        row.named_by === "a" ? a : row.named_by === "b" ? b : null,
      ]);
      seen.add(row.a).add(row.b);
    }
    rows += found.rows.length;
    await context.progress(rows / total);
    await turn();
  }
  return { rows, people: seen.size };
}
