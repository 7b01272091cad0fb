import { type SQL, sql } from "drizzle-orm";
import type { z } from "zod";
import type { followUpQuery } from "../../../shared/contracts/follow-up.ts";
import type { Tx } from "../../db/with-tx.ts";
import { invalid } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";
import { pageByIndex } from "./page-by-index.ts";
import { pageOfFew } from "./page-of-few.ts";
import { dayKey, type ListQuestion } from "./shown.ts";

/** Somebody under follow-up, as the list reads it. */
export interface FollowUpRow {
  id: string;
  studyNumber: string;
  area: string | null;
  classification: string | null;
  assignedTo: string | null;
  /** Null while no last exposure day is known to the day. */
  dayZero: string | null;
  version: number;
  recordedAt: string;
  /** A symptom report that no later day has taken back, of somebody who is still followed. */
  symptomatic: boolean;
  /** Contacts of the list with the same word share a household or a telephone number. */
  together: string | null;
  /** True when the acting person may open this contact's identity. */
  mine: boolean;
}

const SORTS: Record<string, SQL> = {
  // The last due day lies a fixed number of days after day 0, so both sort alike.
  lastDueDay: dayKey("f"),
  dayZero: dayKey("f"),
  studyNumber: sql`f.study_number`,
  area: sql`f.area`,
};

function readSort(sort = "lastDueDay"): { key: string; by: SQL; down: boolean } {
  const down = sort.startsWith("-");
  const key = down ? sort.slice(1) : sort;
  const by = Object.hasOwn(SORTS, key) ? SORTS[key] : undefined;
  if (!by) throw invalid({ path: "sort", code: "not_sortable" });
  return { key, by, down };
}

/**
 * One page of the contacts under follow-up within the acting person's scope: symptomatic ones on
 * top, then those ending first; contacts who share a household or a telephone number stand together
 * at the place of the first of them. And how many have no day 0 because no whole last exposure day
 * is on record.
 *
 * @param found people met by what was typed, or null when nothing was
 * @param today local day in the investigation's zone
 * @throws HttpProblem invalid for a sort key that is none
 */
export async function listFollowUp(
  tx: Tx,
  actor: Actor,
  query: z.output<typeof followUpQuery>,
  found: readonly string[] | null,
  today: string,
  monitoringDays: number,
): Promise<{ rows: FollowUpRow[]; total: number; withoutDayZero: number }> {
  const { key, by, down } = readSort(query.sort);
  const start = (query.q ?? "").toUpperCase().replace(/[\\%_]/g, "\\$&");
  const question: ListQuestion = {
    show: query.show,
    today,
    monitoringDays,
    investigationId: actor.investigationId,
    down,
    limit: query.pageSize,
    offset: (query.page - 1) * query.pageSize,
  };
  // Few are shown to a tracer, or to whoever looks for somebody; all of an investigation are not
  // read for one page.
  const wide =
    actor.role === "supervisor" && found === null && (key === "lastDueDay" || key === "dayZero");
  const met =
    found === null
      ? sql`true`
      : sql`(f.person_id = any (${sql.param(`{${found.join(",")}}`)}::uuid[]) or f.study_number like ${`${start}%`})`;
  const page = wide
    ? pageByIndex(question)
    : pageOfFew(question, { by, met, near: actor.role === "tracer" });
  const answer = await tx.execute<{
    rows: FollowUpRow[];
    total: number;
    withoutDayZero: number;
  }>(
    sql`${page}
        select
          (select n from counted) as total,
          (select n from undated) as "withoutDayZero",
          (select coalesce(json_agg(json_build_object('id', g.person_id,
              'studyNumber', g.study_number, 'area', g.area, 'classification', g.classification,
              'assignedTo', g.assigned_account_id, 'version', g.version,
              'recordedAt', g.recorded_at, 'symptomatic', g.symptomatic, 'together', g.together,
              'dayZero', g.day_zero, 'mine', g.mine)
              order by g.line), '[]'::json)
           from page g) as rows`,
  );
  return answer.rows[0] ?? { rows: [], total: 0, withoutDayZero: 0 };
}
