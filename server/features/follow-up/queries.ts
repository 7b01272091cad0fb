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

function ordering(sort = "lastDueDay"): SQL {
  const down = sort.startsWith("-");
  const key = down ? sort.slice(1) : sort;
  const by = Object.hasOwn(SORTS, key) ? SORTS[key] : undefined;
  if (!by) throw invalid({ path: "sort", code: "not_sortable" });
  return sql`${by} ${down ? sql`desc` : sql`asc`} nulls last, p.id`;
}

/** Contacts whose day today is 1 … M, is past M, or any. */
function shown(show: "due" | "all" | "ended", today: string, monitoringDays: number): SQL {
  const first = shiftDay(today, -monitoringDays);
  if (show === "due") return sql`d.day_zero between ${first} and ${shiftDay(today, -1)}`;
  if (show === "ended") return sql`d.day_zero < ${first}`;
  return sql`d.day_zero is not null`;
}

/**
 * One page of the contacts under follow-up within the acting person's scope, those ending first at
 * the top, and how many contacts have no day 0 because no whole last exposure day is on record.
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
        listed as (
          select p.id, p.study_number, p.area, p.classification, p.assigned_account_id, d.day_zero,
            row_number() over (order by ${order}) as place
          from days d join core.person p on p.id = d.person_id
          where ${shown(query.show, today, monitoringDays)} and ${met}),
        page as (
          select * from listed order by place
          limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize})
        select
          (select count(*)::int from listed) as total,
          (select count(*)::int from days where day_zero is null) as "withoutDayZero",
          (select coalesce(json_agg(json_build_object('id', id, 'studyNumber', study_number,
              'area', area, 'classification', classification, 'assignedTo', assigned_account_id,
              'dayZero', day_zero, 'mine', core.ctx_may_name(id)) order by place), '[]'::json)
           from page) as rows`,
  );
  return answer.rows[0] ?? { rows: [], total: 0, withoutDayZero: 0 };
}
