import { type SQL, sql } from "drizzle-orm";
import type { z } from "zod";
import type { followUpQuery } from "../../../shared/contracts/follow-up.ts";
import { shiftDay } from "../../clock.ts";
import type { Tx } from "../../db/with-tx.ts";
import { invalid } from "../../http/problem.ts";

/** A contact with a day 0, as the list reads it. */
export interface FollowUpRow {
  id: string;
  studyNumber: string;
  area: string | null;
  classification: string | null;
  assignedTo: string | null;
  dayZero: string;
  version: number;
  recordedAt: string;
  /** A symptom report that no later day has taken back, of somebody who is still a contact. */
  symptomatic: boolean;
  /** Contacts of the list with the same word share a household or a telephone number. */
  together: string | null;
  /** True when the acting person may open this contact's identity. */
  mine: boolean;
}

const SORTS: Record<string, SQL> = {
  // The last due day lies a fixed number of days after day 0, so both sort alike.
  lastDueDay: sql`d.day_zero`,
  dayZero: sql`d.day_zero`,
  studyNumber: sql`p.study_number`,
  area: sql`p.area`,
};

/** Still a contact: neither a case by now nor found to be none. */
const CURRENT = sql`(p.classification = 'contact' or p.classification is null)`;

function ordering(sort = "lastDueDay"): SQL {
  const down = sort.startsWith("-");
  const key = down ? sort.slice(1) : sort;
  const by = Object.hasOwn(SORTS, key) ? SORTS[key] : undefined;
  if (!by) throw invalid({ path: "sort", code: "not_sortable" });
  return sql`${by} ${down ? sql`desc` : sql`asc`} nulls last, p.id`;
}

/**
 * Contacts whose day today is 1 … M, is past M, or any. Somebody who reported symptoms stays among
 * those due whichever day it is, until a later day says otherwise.
 */
function shown(show: "due" | "all" | "ended", today: string, monitoringDays: number): SQL {
  const first = shiftDay(today, -monitoringDays);
  if (show === "due") {
    return sql`d.day_zero is not null and ${CURRENT} and (s.person_id is not null
      or d.day_zero between ${first} and ${shiftDay(today, -1)})`;
  }
  if (show === "ended") return sql`d.day_zero < ${first}`;
  return sql`d.day_zero is not null`;
}

/**
 * One page of the contacts under follow-up within the acting person's scope: symptomatic ones on
 * top, then those ending first; contacts who share a household or a telephone number stand together
 * at the place of the first of them. And how many contacts have no day 0 because no whole last
 * exposure day is on record.
 *
 * @param found people met by what was typed, or null when nothing was
 * @param today local day in the investigation's zone
 * @throws HttpProblem invalid for a sort key that is none
 */
export async function listFollowUp(
  tx: Tx,
  query: z.output<typeof followUpQuery>,
  found: readonly string[] | null,
  today: string,
  monitoringDays: number,
): Promise<{ rows: FollowUpRow[]; total: number; withoutDayZero: number }> {
  const order = ordering(query.sort);
  const start = (query.q ?? "").toUpperCase().replace(/[\\%_]/g, "\\$&");
  const met =
    found === null
      ? sql`true`
      : sql`(p.id = any (${sql.param(`{${found.join(",")}}`)}::uuid[]) or p.study_number like ${`${start}%`})`;
  const answer = await tx.execute<{
    rows: FollowUpRow[];
    total: number;
    withoutDayZero: number;
  }>(
    sql`with days as materialized (select person_id, day_zero from core.follow_up_days(null)),
        sick as materialized (
          select distinct y.person_id from core.follow_check y
          where y.symptoms = 'yes' and y.withdrawn_at is null and not exists (
            select 1 from core.follow_check n where n.person_id = y.person_id
              and n.day > y.day and n.symptoms = 'no' and n.withdrawn_at is null)),
        listed as materialized (
          select p.id, p.study_number, p.area, p.classification, p.assigned_account_id, p.version,
            p.recorded_at, p.household_id, d.day_zero,
            s.person_id is not null and ${CURRENT} as symptomatic,
            row_number() over (order by ${order}) as place
          from days d join core.person p on p.id = d.person_id
          left join sick s on s.person_id = d.person_id
          where ${shown(query.show, today, monitoringDays)} and ${met}),
        phones as (select f.person_id, f.shared
          from identity.shared_phones(array(select id from listed)) f),
        homes as (
          select l.*, f.shared, case when l.household_id is not null
              and count(*) over (partition by l.household_id) > 1 then h.number end as home
          from listed l left join phones f on f.person_id = l.id
          left join core.place h on h.id = l.household_id),
        -- Whoever shares a number with a member of a household stands with that household.
        joined as (
          select k.*, coalesce(case when k.shared is not null
              then min(k.home) over (partition by k.shared) end, k.home) as with_home
          from homes k),
        worded as (
          select j.*, case when j.with_home is not null then 'household-' || j.with_home
              when j.shared is not null then 'phone-' || j.shared end as together
          from joined j),
        grouped as (
          select w.*, bool_or(w.symptomatic) over g as any_symptomatic, min(w.place) over g as at
          from worded w window g as (partition by coalesce(w.together, w.id::text))),
        page as (
          select g.*, row_number() over (
            order by g.any_symptomatic desc, g.at, g.symptomatic desc, g.place) as line
          from grouped g order by line
          limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize})
        select
          (select count(*)::int from listed) as total,
          (select count(*)::int from days d join core.person p on p.id = d.person_id
           where d.day_zero is null and ${CURRENT}) as "withoutDayZero",
          (select coalesce(json_agg(json_build_object('id', id, 'studyNumber', study_number,
              'area', area, 'classification', classification, 'assignedTo', assigned_account_id,
              'version', version, 'recordedAt', recorded_at, 'symptomatic', symptomatic,
              'together', together, 'dayZero', day_zero, 'mine', core.ctx_may_name(id))
              order by line), '[]'::json)
           from page) as rows`,
  );
  return answer.rows[0] ?? { rows: [], total: 0, withoutDayZero: 0 };
}
