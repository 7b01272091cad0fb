import { type SQL, sql } from "drizzle-orm";
import { type PeopleFilters, refusedFilters } from "../../shared/contracts/people-filters.ts";
import { invalid } from "../http/problem.ts";
import type { Actor } from "../http/route.ts";

/**
 * Days of a column between two days. Days are text: a month known without its day sorts before its
 * days, and `unknown` and `refused` after every day.
 */
function dayRange(column: string, from: string | undefined, to: string | undefined): SQL[] {
  if (!from && !to) return [];
  const name = sql`p.${sql.identifier(column)}`;
  const month = (from ?? "1900").slice(0, 7);
  const range = [sql`${name} >= ${month}`, sql`${name} <= ${to ?? "2100-12-31"}`];
  if (from) range.push(sql`(${name} >= ${from} or ${name} = ${month})`);
  return range;
}

function assignedTo(actor: Actor, assigned: string): SQL {
  if (assigned === "me") return sql`p.assigned_account_id = ${actor.accountId}`;
  if (assigned === "none") {
    return sql`p.assigned_account_id is null and p.assigned_team_id is null`;
  }
  if (assigned === "team") return sql`p.assigned_team_id = any ((select core.ctx_teams())::uuid[])`;
  return sql`p.assigned_account_id = ${assigned}`;
}

/**
 * Conditions on `core.person p` for the filters of the line list, and of files made from it.
 *
 * @param under what stands before each path of an error, such as `filter.`
 * @throws HttpProblem invalid, with the path of each filter that the role may not use or that cannot
 *   be met
 */
export function peopleConditions(filters: PeopleFilters, actor: Actor, under = ""): SQL[] {
  const refused = refusedFilters(filters, actor.role);
  if (refused.length > 0) {
    throw invalid(...refused.map((key) => ({ path: under + key, code: "not_in_list" as const })));
  }
  for (const [from, to] of [
    ["onsetFrom", "onsetTo"],
    ["reportFrom", "reportTo"],
  ] as const) {
    const [first, last] = [filters[from], filters[to]];
    if (first && last && last < first)
      throw invalid({ path: under + to, code: "last_before_first" });
  }
  const where: SQL[] = [];
  const { classification, interviewed, interviewState, followUp, needs, area, assigned } = filters;
  if (classification === "case" || needs === "interview") {
    where.push(sql`p.classification in ('confirmed', 'probable', 'suspected')`);
  }
  if (classification && classification !== "case") {
    where.push(sql`p.classification = ${classification}`);
  }
  if (needs === "interview") {
    where.push(
      sql`(p.interview_state is null or p.interview_state in ('attempted', 'partial', 'unreachable'))`,
    );
  }
  if (interviewed === "yes") where.push(sql`p.interviewed = 'yes'`);
  if (interviewed === "no") where.push(sql`p.interviewed is distinct from 'yes'`);
  if (interviewState === "none") where.push(sql`p.interview_state is null`);
  else if (interviewState) where.push(sql`p.interview_state = ${interviewState}`);
  if (area) where.push(sql`p.area = ${area}`);
  if (assigned) where.push(assignedTo(actor, assigned));
  if (followUp) {
    const checked = sql`exists (select 1 from core.follow_check k
      where k.person_id = p.id and k.withdrawn_at is null)`;
    where.push(followUp === "yes" ? checked : sql`not ${checked}`);
  }
  where.push(...dayRange("onset_date", filters.onsetFrom, filters.onsetTo));
  where.push(...dayRange("report_date", filters.reportFrom, filters.reportTo));
  return where;
}
