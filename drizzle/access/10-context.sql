-- Who is asking, inside one transaction. The nonce in app.ctx was made by the server at sign-in or
-- at a change of role and stands in auth.ctx_live, which no role login can read; it counts only for
-- the login of its own role and only while the membership lasts.
-- Every function pins its search path with the temporary schema last: left out, that schema would be
-- searched first, and a login could put types of its own under the owner's feet.
create or replace function core.ctx(out account_id uuid, out investigation_id uuid, out role text)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select c.account_id, c.investigation_id, c.role
  from auth.ctx_live c
  join core.member m on m.account_id = c.account_id and m.investigation_id = c.investigation_id
    and m.role = c.role and m.ended_at is null
  where c.nonce = nullif(current_setting('app.ctx', true), '')::uuid
    and c.expires_at > now()
    and session_user = ('strandline_' || c.role)
$$;

create or replace function core.ctx_user() returns uuid
language sql stable security definer set search_path = pg_catalog, pg_temp as $$ select account_id from core.ctx() $$;

create or replace function core.ctx_investigation() returns uuid
language sql stable security definer set search_path = pg_catalog, pg_temp as $$ select investigation_id from core.ctx() $$;

create or replace function core.ctx_role() returns text
language sql stable security definer set search_path = pg_catalog, pg_temp as $$ select role from core.ctx() $$;

-- People assigned to the acting tracer or one of their teams.
create or replace function core.ctx_held() returns uuid[]
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select coalesce(array_agg(p.id), '{}')
  from core.ctx() c
  join core.person p on p.investigation_id = c.investigation_id and p.withdrawn_at is null
  where p.assigned_account_id = c.account_id
     or p.assigned_team_id in (
       select m.team_id from core.member m
       where m.account_id = c.account_id and m.investigation_id = c.investigation_id
         and m.role = c.role and m.ended_at is null and m.team_id is not null)
$$;

-- Is a person held: assigned to the account, or to a team of theirs? Called by the functions below
-- with the context they have read already; no login may call it.
create or replace function core.ctx_holds(
  p_account uuid, p_investigation uuid, p_role text, p_person uuid) returns boolean
language sql stable set search_path = pg_catalog, pg_temp as $$
  select exists (
    select 1 from core.person h
    where h.id = p_person and h.investigation_id = p_investigation and h.withdrawn_at is null
      and (h.assigned_account_id = p_account
        or exists (
          select 1 from core.member m
          where m.team_id = h.assigned_team_id and m.account_id = p_account
            and m.investigation_id = p_investigation and m.role = p_role and m.ended_at is null)))
$$;

-- The tracer's scope: held people and those one contact pair away.
create or replace function core.ctx_people() returns uuid[]
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  with held as (select core.ctx_held() as ids)
  select coalesce(array_agg(distinct id), '{}') from (
    select unnest(ids) as id from held
    union all
    select cp.person_b from held, core.contact_pair cp
    where cp.person_a = any (ids) and cp.withdrawn_at is null
    union all
    select cp.person_a from held, core.contact_pair cp
    where cp.person_b = any (ids) and cp.withdrawn_at is null
  ) scope
$$;

-- People whose identity a tracer may open: held people, and contacts (not cases) of held cases.
-- A case seen from a held contact stays a study number: a contact is not told who the case is.
create or replace function core.ctx_named_people() returns uuid[]
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  with held as (select core.ctx_held() as ids),
  cases as (
    select coalesce(array_agg(p.id), '{}') as ids from held, core.person p
    where p.id = any (held.ids) and p.classification in ('confirmed', 'probable', 'suspected'))
  select coalesce(array_agg(distinct id), '{}') from (
    select unnest(ids) as id from held
    union all
    select p.id from cases, core.contact_pair cp, core.person p
    where cp.person_a = any (cases.ids) and cp.withdrawn_at is null and p.id = cp.person_b
      and (p.classification is null or p.classification in ('contact', 'not_a_case'))
    union all
    select p.id from cases, core.contact_pair cp, core.person p
    where cp.person_b = any (cases.ids) and cp.withdrawn_at is null and p.id = cp.person_a
      and (p.classification is null or p.classification in ('contact', 'not_a_case'))
  ) scope
$$;

-- May the acting person attach something to this person? In scope, or made by them just now. Asked
-- once per row of a form, so it looks at this person and their pairs only, never at a whole scope.
create or replace function core.ctx_can_link(p_person uuid) returns boolean
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select exists (
    select 1 from core.ctx() c
    join core.person p on p.id = p_person and p.investigation_id = c.investigation_id
    where c.role in ('supervisor', 'officer')
       or p.recorded_by = c.account_id
       or core.ctx_holds(c.account_id, c.investigation_id, c.role, p.id)
       or exists (
         select 1 from (
           select cp.person_b as id from core.contact_pair cp
           where cp.person_a = p.id and cp.withdrawn_at is null
           union all
           select cp.person_a from core.contact_pair cp
           where cp.person_b = p.id and cp.withdrawn_at is null) n
         where core.ctx_holds(c.account_id, c.investigation_id, c.role, n.id)))
$$;

create or replace function core.ctx_can_tell(p_pair uuid) returns boolean
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select exists (
    select 1 from core.contact_pair cp
    where cp.id = p_pair and core.ctx_can_link(cp.person_a) and core.ctx_can_link(cp.person_b))
$$;

-- Identity scope of the acting role, as one predicate: the same people as core.ctx_named_people(),
-- asked from the person's side.
create or replace function core.ctx_may_name(p_person uuid) returns boolean
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select exists (
    select 1 from core.ctx() c
    join core.person p on p.id = p_person and p.investigation_id = c.investigation_id
    where c.role in ('supervisor', 'officer')
       or (c.role = 'tracer' and (
         core.ctx_holds(c.account_id, c.investigation_id, c.role, p.id)
         or ((p.classification is null or p.classification in ('contact', 'not_a_case')) and exists (
           select 1 from (
             select cp.person_b as id from core.contact_pair cp
             where cp.person_a = p.id and cp.withdrawn_at is null
             union all
             select cp.person_a from core.contact_pair cp
             where cp.person_b = p.id and cp.withdrawn_at is null) n
           join core.person q on q.id = n.id
             and q.classification in ('confirmed', 'probable', 'suspected')
           where core.ctx_holds(c.account_id, c.investigation_id, c.role, n.id))))))
$$;
