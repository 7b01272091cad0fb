import { sql } from "drizzle-orm";
import {
  type CaseDates,
  type DayWindow,
  infectiousWindow,
  sourceWindow,
  type WindowSettings,
} from "../../../../shared/windows.ts";
import type { Tx } from "../../../db/with-tx.ts";

type Columns = {
  ids: string[] | null;
  onsets: (string | null)[] | null;
  specimens: (string | null)[] | null;
  isolations: (string | null)[] | null;
};

/** A case (any certainty) with the dates that its windows follow from. */
export type DatedCasePerson = CaseDates & { id: string };

/** Cases of an investigation; columns come as arrays in one row, far cheaper to read than rows. */
export async function loadCaseDates(tx: Tx, investigationId: string): Promise<DatedCasePerson[]> {
  const found = await tx.execute<Columns>(
    sql`with positive as (
          select t.person_id, min(t.specimen_date) as day from core.test_result t
          where t.investigation_id = ${investigationId} and t.result = 'positive'
            and t.withdrawn_at is null and t.specimen_date ~ '^\\d{4}-\\d{2}-\\d{2}$'
          group by t.person_id),
        cases as materialized (
          select p.id, p.onset_date, p.isolation_date, s.day as specimen
          from core.person p left join positive s on s.person_id = p.id
          where p.investigation_id = ${investigationId} and p.withdrawn_at is null
            and p.classification in ('confirmed', 'probable', 'suspected'))
        select json_agg(id) as ids, json_agg(onset_date) as onsets, json_agg(specimen) as specimens,
          json_agg(isolation_date) as isolations
        from cases`,
  );
  const row = found.rows[0];
  return (row?.ids ?? []).map((id, at) => ({
    id,
    onsetDate: row?.onsets?.[at] ?? null,
    firstPositiveSpecimen: row?.specimens?.[at] ?? null,
    isolationDate: row?.isolations?.[at] ?? null,
  }));
}

/**
 * Contact pairs of which a telling meets the window of a case that is part of the pair, for two
 * sets of windows at once. As everywhere, where one day of a telling is missing the other stands
 * for both; a telling without any whole day meets nothing.
 */
async function pairsMeeting(
  tx: Tx,
  investigationId: string,
  cases: readonly DatedCasePerson[],
  windowsOf: (dates: CaseDates) => readonly [DayWindow | null, DayWindow | null],
): Promise<{ before: number; after: number }> {
  const rows = cases.map((one) => {
    const [before, after] = windowsOf(one);
    return [one.id, before?.from, before?.to, after?.from, after?.to].map((word) => word ?? null);
  });
  const found = await tx.execute<{ before: number; after: number }>(
    sql`with given as materialized (
          select (r.value ->> 0)::uuid as id, r.value ->> 1 as f1, r.value ->> 2 as t1,
            r.value ->> 3 as f2, r.value ->> 4 as t2
          from jsonb_array_elements(${JSON.stringify(rows)}::jsonb) r),
        pairs as materialized (
          select cp.id, a.f1 as af1, a.t1 as at1, a.f2 as af2, a.t2 as at2,
            b.f1 as bf1, b.t1 as bt1, b.f2 as bf2, b.t2 as bt2
          from core.contact_pair cp left join given a on a.id = cp.person_a
          left join given b on b.id = cp.person_b
          where cp.investigation_id = ${investigationId} and cp.withdrawn_at is null
            and (coalesce(a.f1, a.f2) is not null or coalesce(b.f1, b.f2) is not null)),
        -- Days are compared byte by byte: as text of this form that is their order.
        told as (
          select e.pair_id, least(d.one, d.other) collate "C" as first,
            greatest(d.one, d.other) collate "C" as last
          from core.exposure e cross join lateral (
            select case when length(e.first_exposure) = 10 then e.first_exposure
                when length(e.last_exposure) = 10 then e.last_exposure end as one,
              case when length(e.last_exposure) = 10 then e.last_exposure
                when length(e.first_exposure) = 10 then e.first_exposure end as other) d
          where e.investigation_id = ${investigationId} and e.withdrawn_at is null
            and d.one is not null),
        met as (
          select p.id,
            bool_or(t.first <= p.at1 and t.last >= p.af1 or t.first <= p.bt1 and t.last >= p.bf1)
              as before,
            bool_or(t.first <= p.at2 and t.last >= p.af2 or t.first <= p.bt2 and t.last >= p.bf2)
              as after
          from pairs p join told t on t.pair_id = p.id group by p.id)
        select (count(*) filter (where before))::int as before,
          (count(*) filter (where after))::int as after
        from met`,
  );
  return found.rows[0] ?? { before: 0, after: 0 };
}

/** Contact pairs with a telling inside the infectious window of one of the two. */
export function countInfectious(
  tx: Tx,
  investigationId: string,
  cases: readonly DatedCasePerson[],
  before: WindowSettings,
  after: WindowSettings,
) {
  return pairsMeeting(tx, investigationId, cases, (dates) => [
    infectiousWindow(dates, before),
    infectiousWindow(dates, after),
  ]);
}

/** Contact pairs with a telling inside the source window of one of the two. */
export function countSource(
  tx: Tx,
  investigationId: string,
  cases: readonly DatedCasePerson[],
  before: WindowSettings,
  after: WindowSettings,
) {
  return pairsMeeting(tx, investigationId, cases, (dates) => [
    sourceWindow(dates, before),
    sourceWindow(dates, after),
  ]);
}
