import { sql } from "drizzle-orm";
import { type DayWindow, infectiousWindow, sourceWindow } from "../../../../shared/windows.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { dayReader } from "../../clusters/store.ts";
import type { SettingsRow } from "../settings-store.ts";

type Columns = {
  onsets: (string | null)[] | null;
  specimens: (string | null)[] | null;
  isolations: (string | null)[] | null;
  case_a: (number | null)[] | null;
  case_b: (number | null)[] | null;
  pairs: number[] | null;
  firsts: (string | null)[] | null;
  lasts: (string | null)[] | null;
};

/** Cases (any certainty) with their dates, and every live telling of a pair that a case is part of. */
export type CaseTellings = Columns;

/**
 * Reads what windows are counted on. Columns come as arrays in one row, which is far cheaper to read
 * than rows.
 */
export async function loadCaseTellings(tx: Tx, investigationId: string): Promise<CaseTellings> {
  const found = await tx.execute<Columns>(
    sql`with positive as (
          select t.person_id, min(t.specimen_date) as day from core.test_result t
          where t.investigation_id = ${investigationId} and t.result = 'positive'
            and t.withdrawn_at is null and t.specimen_date ~ '^\\d{4}-\\d{2}-\\d{2}$'
          group by t.person_id),
        cases as materialized (
          select p.id, p.onset_date, p.isolation_date, s.day as specimen,
            (row_number() over (order by p.id) - 1)::int as n
          from core.person p left join positive s on s.person_id = p.id
          where p.investigation_id = ${investigationId} and p.withdrawn_at is null
            and p.classification in ('confirmed', 'probable', 'suspected')),
        pairs as materialized (
          select cp.id, a.n as a, b.n as b, (row_number() over (order by cp.id) - 1)::int as n
          from core.contact_pair cp left join cases a on a.id = cp.person_a
          left join cases b on b.id = cp.person_b
          where cp.investigation_id = ${investigationId} and cp.withdrawn_at is null
            and (a.id is not null or b.id is not null)),
        told as (
          select json_agg(p.n) as n, json_agg(e.first_exposure) as first,
            json_agg(e.last_exposure) as last
          from pairs p join core.exposure e on e.pair_id = p.id
          where e.withdrawn_at is null
            and (e.first_exposure is not null or e.last_exposure is not null)),
        c as (select json_agg(onset_date order by n) as onsets,
            json_agg(specimen order by n) as specimens,
            json_agg(isolation_date order by n) as isolations
          from cases),
        d as (select json_agg(a order by n) as a, json_agg(b order by n) as b from pairs)
        select c.onsets, c.specimens, c.isolations, d.a as case_a, d.b as case_b, told.n as pairs,
          told.first as firsts, told.last as lasts
        from c, d, told`,
  );
  const none = { onsets: null, specimens: null, isolations: null, case_a: null, case_b: null };
  return found.rows[0] ?? { ...none, pairs: null, firsts: null, lasts: null };
}

/** Contact pairs of which a telling meets the window of a case that is part of the pair. */
function pairsMeeting(tellings: CaseTellings, windows: readonly (DayWindow | null)[]): number {
  const dayOf = dayReader();
  const from = windows.map((one) => dayOf(one?.from));
  const to = windows.map((one) => dayOf(one?.to));
  const within = (at: number | null | undefined, first: number, last: number) => {
    const [start, end] = [from[at ?? -1] ?? null, to[at ?? -1] ?? null];
    return start !== null && end !== null && first <= end && last >= start;
  };
  const met = new Set<number>();
  for (const [at, pair] of (tellings.pairs ?? []).entries()) {
    if (met.has(pair)) continue;
    // As everywhere: one day missing, the other stands for both; none, and nothing is met.
    const [told, until] = [dayOf(tellings.firsts?.[at]), dayOf(tellings.lasts?.[at])];
    const [one, other] = [told ?? until, until ?? told];
    if (one === null || other === null) continue;
    const [first, last] = [Math.min(one, other), Math.max(one, other)];
    if (
      within(tellings.case_a?.[pair], first, last) ||
      within(tellings.case_b?.[pair], first, last)
    ) {
      met.add(pair);
    }
  }
  return met.size;
}

const casesOf = (tellings: CaseTellings) =>
  (tellings.onsets ?? []).map((onsetDate, at) => ({
    onsetDate,
    firstPositiveSpecimen: tellings.specimens?.[at] ?? null,
    isolationDate: tellings.isolations?.[at] ?? null,
  }));

/** Contact pairs with a telling inside the infectious window of one of the two. */
export function countInfectious(tellings: CaseTellings, settings: SettingsRow): number {
  return pairsMeeting(
    tellings,
    casesOf(tellings).map((dates) => infectiousWindow(dates, settings)),
  );
}

/** Contact pairs with a telling inside the source window of one of the two. */
export function countSource(tellings: CaseTellings, settings: SettingsRow): number {
  return pairsMeeting(
    tellings,
    casesOf(tellings).map((dates) => sourceWindow(dates, settings)),
  );
}
