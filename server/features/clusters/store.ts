import { sql } from "drizzle-orm";
import { CLUSTER_KINDS, type ClusterKind } from "../../../shared/contracts/clusters.ts";
import { dayNumber } from "../../../shared/core/index.ts";
import type { ClusterInput, DatedCase, Stay } from "../../../shared/group-cases.ts";
import type { Tx } from "../../db/with-tx.ts";

const CASES = sql`core.person p where p.investigation_id = `;
const COUNTED = sql` and p.classification in ('confirmed', 'probable') and p.withdrawn_at is null`;

/**
 * A word that changes with every change of what clusters are made of: the graph's version covers
 * pairs, tellings and group exposures; the dates and classes of cases are hashed as they stand.
 */
export async function clusterState(tx: Tx, investigationId: string): Promise<string> {
  const found = await tx.execute<{ state: string }>(
    sql`select i.graph_version || '/' || (
          select count(*) || '/' || coalesce(sum(hashtextextended(
            concat_ws('|', p.id::text, coalesce(p.onset_date, ''), coalesce(p.specimen_date, '')), 0)), 0)
          from ${CASES}${investigationId}${COUNTED}) as state
        from core.investigation i where i.id = ${investigationId}`,
  );
  return found.rows[0]?.state ?? "";
}

type Columns = {
  numbers: string[] | null;
  onsets: (string | null)[] | null;
  specimens: (string | null)[] | null;
  link_a: number[] | null;
  link_b: number[] | null;
  stay_case: number[] | null;
  stay_place: number[] | null;
  stay_first: string[] | null;
  stay_last: string[] | null;
  place_numbers: number[] | null;
  place_settings: (string | null)[] | null;
};

/** Days are written over and over: each is worked out once. */
function dayReader(): (text: string | null | undefined) => number | null {
  const known = new Map<string, number | null>();
  return (text) => {
    if (!text) return null;
    let day = known.get(text);
    if (day === undefined) {
      day = dayNumber(text);
      known.set(text, day);
    }
    return day;
  };
}

/**
 * Confirmed and probable cases of an investigation with what can join them, from `core` alone.
 * A case's reference day is its onset where that is a whole day, else the specimen day of its
 * reference test; cases with neither are counted and left out. A stay is a telling, or a group
 * exposure, of a case at a place whose first and last day are both whole.
 *
 * Columns come as arrays in one row, which is far cheaper to read than rows.
 */
export async function loadClusterInput(
  tx: Tx,
  investigationId: string,
): Promise<{ input: ClusterInput; withoutReferenceDay: number }> {
  const found = await tx.execute<Columns>(
    sql`with cases as materialized (
          select p.id, p.study_number, p.onset_date, p.specimen_date,
            (row_number() over (order by p.study_number, p.id) - 1)::int as n
          from ${CASES}${investigationId}${COUNTED}),
        links as (
          select a.n as a, b.n as b
          from core.contact_pair cp
          join cases a on a.id = cp.person_a
          join cases b on b.id = cp.person_b
          where cp.investigation_id = ${investigationId} and cp.withdrawn_at is null
            and exists (select 1 from core.exposure e
              where e.pair_id = cp.id and e.withdrawn_at is null)),
        told as materialized (
          select cp.person_a, cp.person_b, e.place_id, e.first_exposure, e.last_exposure
          from core.exposure e join core.contact_pair cp on cp.id = e.pair_id
          where e.investigation_id = ${investigationId} and e.place_id is not null
            and e.withdrawn_at is null and cp.withdrawn_at is null
            and e.first_exposure is not null and e.last_exposure is not null),
        stays as materialized (
          select c.n, t.place_id, t.first_exposure, t.last_exposure
          from told t join cases c on c.id = t.person_a
          union
          select c.n, t.place_id, t.first_exposure, t.last_exposure
          from told t join cases c on c.id = t.person_b
          union
          select c.n, g.place_id, g.first_exposure, g.last_exposure
          from core.group_exposure g join cases c on c.id = g.person_id
          where g.investigation_id = ${investigationId} and g.place_id is not null
            and g.withdrawn_at is null
            and g.first_exposure is not null and g.last_exposure is not null),
        placed as materialized (
          select s.n, pl.number, pl.setting, s.first_exposure, s.last_exposure
          from stays s join core.place pl on pl.id = s.place_id),
        c as (select json_agg(study_number order by n) as numbers,
            json_agg(onset_date order by n) as onsets, json_agg(specimen_date order by n) as specimens
          from cases),
        l as (select json_agg(a) as a, json_agg(b) as b from links),
        s as (select json_agg(n) as n, json_agg(number) as place, json_agg(first_exposure) as first,
            json_agg(last_exposure) as last from placed),
        k as (select json_agg(number) as number, json_agg(setting) as setting
          from (select distinct number, setting from placed) as of_place)
        select c.numbers, c.onsets, c.specimens, l.a as link_a, l.b as link_b, s.n as stay_case,
          s.place as stay_place, s.first as stay_first, s.last as stay_last,
          k.number as place_numbers, k.setting as place_settings
        from c, l, s, k`,
  );
  const row = found.rows[0];
  const dayOf = dayReader();

  // Cases without a reference day are left out, so the others move up: -1 is nobody.
  const cases: DatedCase[] = [];
  const numbers = row?.numbers ?? [];
  const indexes = new Int32Array(numbers.length).fill(-1);
  for (const [at, studyNumber] of numbers.entries()) {
    const onset = dayOf(row?.onsets?.[at]);
    const day = onset ?? dayOf(row?.specimens?.[at]);
    if (day === null) continue;
    indexes[at] = cases.length;
    cases.push({ studyNumber, day, basis: onset === null ? "specimen" : "onset" });
  }
  const indexOf = (at: number | undefined) => (at === undefined ? -1 : (indexes[at] ?? -1));

  const links: [number, number][] = [];
  for (const [at, one] of (row?.link_a ?? []).entries()) {
    const [a, b] = [indexOf(one), indexOf(row?.link_b?.[at])];
    if (a >= 0 && b >= 0) links.push([a, b]);
  }
  const stays: Stay[] = [];
  for (const [at, one] of (row?.stay_case ?? []).entries()) {
    const person = indexOf(one);
    const place = row?.stay_place?.[at];
    const [first, last] = [dayOf(row?.stay_first?.[at]), dayOf(row?.stay_last?.[at])];
    if (person < 0 || place === undefined || first === null || last === null) continue;
    if (first <= last) stays.push({ person, place, first, last });
  }
  const settingOf = new Map<number, ClusterKind>();
  for (const [at, place] of (row?.place_numbers ?? []).entries()) {
    const kind = CLUSTER_KINDS.find((one) => one === row?.place_settings?.[at]);
    settingOf.set(place, kind ?? "unknown");
  }
  return {
    input: { cases, links, stays, settingOf },
    withoutReferenceDay: numbers.length - cases.length,
  };
}
