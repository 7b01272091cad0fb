import { type SQL, sql } from "drizzle-orm";
import { dayKey, inDays, isShown, type ListQuestion, NO_DAY } from "./shown.ts";

/**
 * One page in the order of day 0 without reading all who are shown: `counted` and
 * `undated` (n), and `page`, as common table expressions. Those with symptoms, and who stands with
 * them, are few and are read whole. Of the rest, the first of each
 * group is found along the index, as many as the page can reach, and brings the others with it.
 */
export function pageByIndex(question: ListQuestion): SQL {
  const { investigationId: here, limit, offset, down } = question;
  const direction = sql.raw(down ? "desc" : "asc");
  const earlier = sql.raw(down ? ">" : "<");
  const inside = (alias: string) => sql`${sql.raw(alias)}.investigation_id = ${here}`;
  const shown = (alias: string) => isShown(alias, question);
  return sql`with
    sick as materialized (
      select f.person_id, f.together from core.follow_up f
      where ${inside("f")} and f.symptomatic and f.open and ${shown("f")}),
    sick_groups as materialized (
      select distinct s.together from sick s where s.together is not null),
    top_people as (
      select s.person_id from sick s
      union
      select m.person_id from sick_groups s join core.follow_up m on ${inside("m")}
        and m.together = s.together and ${shown("m")}),
    top as (
      select f.person_id, f.day_zero, f.together, f.symptomatic and f.open as symptomatic,
        row_number() over (order by ${dayKey("f")} ${direction}, f.person_id ${direction}) as place
      from top_people t join core.follow_up f on f.person_id = t.person_id),
    top_grouped as (
      select t.*, min(t.place) over g as at, count(*) over g as mates
      from top t window g as (partition by coalesce(t.together, t.person_id::text))),
    top_lines as materialized (
      select t.*, row_number() over (order by t.at, t.symptomatic desc, t.place) as line
      from top_grouped t),
    counted as (
      select ((select count(*) from core.follow_up f where ${inside("f")} and ${inDays("f", question)})
        + (select count(*) from sick s join core.follow_up f on f.person_id = s.person_id
           where not (${inDays("f", question)})))::int as n),
    leads as materialized (
      select f.person_id, f.day_zero, f.together, ${dayKey("f")} as day
      from core.follow_up f
      where ${inside("f")} and ${inDays("f", question)} and not (f.symptomatic and f.open)
        and (f.together is null
          or not exists (select 1 from sick_groups s where s.together = f.together)
            and not exists (select 1 from core.follow_up e
              where ${inside("e")} and e.together = f.together and ${inDays("e", question)}
                and (${dayKey("e")}, e.person_id) ${earlier} (${dayKey("f")}, f.person_id)))
      order by ${dayKey("f")} ${direction}, f.person_id ${direction}
      limit greatest(0, ${offset + limit} - (select count(*) from top_lines))),
    rest as (
      select l.person_id as lead, l.day as lead_day, l.person_id, l.day_zero, l.day, l.together,
        1::bigint as mates
      from leads l where l.together is null
      union all
      select l.person_id, l.day, m.person_id, m.day_zero, m.day, l.together,
        count(*) over (partition by l.person_id)
      from leads l cross join lateral (
        select f.person_id, f.day_zero, ${dayKey("f")} as day from core.follow_up f
        where ${inside("f")} and f.together = l.together and ${inDays("f", question)}
        -- Kept apart: joined as a whole, all who are due would be read.
        offset 0) m),
    lines as (
      select t.person_id, t.day_zero, t.symptomatic, t.together, t.mates, t.line,
        t.line - row_number() over (partition by t.together order by t.line) as at
      from top_lines t
      union all
      select r.person_id, r.day_zero, false, r.together, r.mates,
        (select count(*) from top_lines) + row_number() over w,
        (select count(*) from top_lines) + row_number() over w
          - row_number() over (partition by r.lead order by r.day ${direction}, r.person_id ${direction})
      from rest r
      window w as (order by r.lead_day ${direction}, r.lead ${direction},
        r.day ${direction}, r.person_id ${direction})),
    undated as (
      select count(*)::int as n from core.follow_up f
      where ${inside("f")} and f.open and ${dayKey("f")} = ${NO_DAY}),
    cut as materialized (select l.* from lines l order by l.line limit ${limit} offset ${offset}),
    page as (
      select p.id as person_id, p.study_number, p.area, p.classification, p.assigned_account_id,
        p.version, p.recorded_at, true as mine, c.day_zero, c.symptomatic,
        case when c.mates > 1 then
          case when c.together like 'phone-%' then 'phone-' || c.at else c.together end
        end as together, c.line
      from cut c join core.person p on p.id = c.person_id)`;
}
