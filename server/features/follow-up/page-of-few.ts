import { type SQL, sql } from "drizzle-orm";
import { dayKey, dueKeys, isShown, type ListQuestion, NO_DAY } from "./shown.ts";

/**
 * One page in any order, from reading every contact that is shown: `counted` and `undated` (n), and
 * `page`, as common table expressions.
 *
 * @param choice.by order of the list
 * @param choice.met which people were looked for
 * @param choice.near true: a tracer's scope, as far as they may know who stands together
 */
export function pageOfFew(
  question: ListQuestion,
  choice: { by: SQL; met: SQL; near: boolean },
): SQL {
  const { by, met, near } = choice;
  const direction = sql.raw(question.down ? "desc" : "asc");
  const [first, last] = question.show === "due" ? dueKeys(question) : [null, null];
  const people = near
    ? sql`select f.* from core.followed_near(${first}::integer, ${last}::integer) f`
    : sql`select f.person_id, f.day_zero, f.day_key, f.open, f.symptomatic, f.together,
            p.study_number, p.area, p.classification, p.assigned_account_id, p.version,
            p.recorded_at, true as mine
          from core.follow_up f join core.person p on p.id = f.person_id
          where f.investigation_id = ${question.investigationId}`;
  return sql`with
    people as ${sql.raw(near ? "materialized" : "not materialized")} (${people}),
    listed as materialized (
      select f.person_id, f.day_zero, f.symptomatic and f.open as symptomatic, f.together,
        f.study_number, f.area, f.classification, f.assigned_account_id, f.version, f.recorded_at,
        f.mine,
        row_number() over (order by ${by} ${direction} nulls last, f.person_id ${direction}) as place
      from people f where ${isShown("f", question)} and ${met}),
    counted as (select count(*)::int as n from listed),
    undated as (
      select count(*)::int as n from ${sql.raw(near ? "people" : "core.follow_up")} f
      where ${near ? sql`true` : sql`f.investigation_id = ${question.investigationId}`}
        and f.open and ${dayKey("f")} = ${NO_DAY}),
    grouped as (
      select l.*, bool_or(l.symptomatic) over g as any_symptomatic, min(l.place) over g as at,
        count(*) over g as mates
      from listed l window g as (partition by coalesce(l.together, l.person_id::text))),
    page as (
      select g.person_id, g.study_number, g.area, g.classification, g.assigned_account_id,
        g.version, g.recorded_at, g.mine, g.day_zero, g.symptomatic, case when g.mates > 1 then
          case when g.together like 'phone-%' then 'phone-' || g.at else g.together end
        end as together,
        row_number() over (
          order by g.any_symptomatic desc, g.at, g.symptomatic desc, g.place) as line
      from grouped g order by line limit ${question.limit} offset ${question.offset})`;
}
