import { type SQL, sql } from "drizzle-orm";
import { isShown, type ListQuestion } from "./shown.ts";

/** Households and shared numbers as far as the acting tracer may open whose they are. */
const OWN_WORDS = sql`
  phones as (select x.person_id, x.shared
    from identity.shared_phones(array(select f.person_id from core.follow_up f)) x),
  worded as materialized (
    select f.person_id, x.shared, coalesce(case when x.shared is not null
        then min(h.number) over (partition by x.shared) end, h.number) as home
    from core.follow_up f join core.person p on p.id = f.person_id
    left join core.place h on h.id = p.household_id
    left join phones x on x.person_id = f.person_id),`;

/**
 * One page in any order, from reading every contact that is shown: `counted` (n) and `page`
 * (person_id, day_zero, symptomatic, together, line) as common table expressions.
 *
 * @param choice.by order of the list
 * @param choice.met which people were looked for
 * @param choice.stored true: who stands together is taken as it is stored for the investigation
 */
export function pageOfFew(
  question: ListQuestion,
  choice: { by: SQL; met: SQL; stored: boolean },
): SQL {
  const { by, met, stored } = choice;
  const direction = sql.raw(question.down ? "desc" : "asc");
  return sql`with ${stored ? sql`` : OWN_WORDS}
    listed as materialized (
      select f.person_id, f.day_zero, f.symptomatic and f.open as symptomatic,
        ${
          stored
            ? sql`f.together`
            : sql`case when w.home is not null then 'household-' || w.home
                when w.shared is not null then 'phone-' || w.shared end as together`
        },
        row_number() over (order by ${by} ${direction} nulls last, f.person_id ${direction}) as place
      from core.follow_up f join core.person p on p.id = f.person_id
      ${stored ? sql`` : sql`join worded w on w.person_id = f.person_id`}
      where f.investigation_id = ${question.investigationId} and ${isShown("f", question)} and ${met}),
    counted as (select count(*)::int as n from listed),
    grouped as (
      select l.*, bool_or(l.symptomatic) over g as any_symptomatic, min(l.place) over g as at,
        count(*) over g as mates
      from listed l window g as (partition by coalesce(l.together, l.person_id::text))),
    page as (
      select g.person_id, g.day_zero, g.symptomatic, case when g.mates > 1 then
          case when g.together like 'phone-%' then 'phone-' || g.at else g.together end
        end as together,
        row_number() over (
          order by g.any_symptomatic desc, g.at, g.symptomatic desc, g.place) as line
      from grouped g order by line limit ${question.limit} offset ${question.offset})`;
}
