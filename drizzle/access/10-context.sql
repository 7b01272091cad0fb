-- Who is asking, inside one transaction. The nonce in app.ctx was made by the server at sign-in or
-- at a change of role and stands in auth.ctx_live, which no role login can read; it counts only for
-- the login of its own role and only while membership and account last.
-- Every function pins its search path with the temporary schema last: left out, that schema would be
-- searched first, and a login could put types of its own under the owner's feet.
-- They are written in PL/pgSQL, whose plans last as long as the connection: a function in SQL would
-- be planned again for each statement that row security touches.

-- Is a role's last day (null: it has none) not over yet in its investigation's zone? Days are text
-- that sorts as it should. It reads no table; the owner's right is for the rule that all have it.
create or replace function core.day_lasts(p_day text, p_zone text) returns boolean
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
begin
  return p_day is null or p_day >= to_char(now() at time zone p_zone, 'YYYY-MM-DD');
end $$;

create or replace function core.ctx(out account_id uuid, out investigation_id uuid, out role text)
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
#variable_conflict use_column
begin
  select c.account_id, c.investigation_id, c.role into $1, $2, $3
  from auth.ctx_live c
  join core.member m on m.account_id = c.account_id and m.investigation_id = c.investigation_id
    and m.role = c.role and m.ended_at is null
  join core.investigation v on v.id = c.investigation_id
    and (m.ends_on is null or core.day_lasts(m.ends_on, v.time_zone))
  join auth.account a on a.id = c.account_id and a.disabled_at is null
  where c.nonce = nullif(current_setting('app.ctx', true), '')::uuid
    and c.expires_at > now()
    and session_user = ('strandline_' || c.role);
end $$;

create or replace function core.ctx_user() returns uuid
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
begin return (select c.account_id from core.ctx() c); end $$;

create or replace function core.ctx_investigation() returns uuid
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
begin return (select c.investigation_id from core.ctx() c); end $$;

create or replace function core.ctx_role() returns text
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
begin return (select c.role from core.ctx() c); end $$;

-- Teams the acting person belongs to in the acting role.
create or replace function core.ctx_teams() returns uuid[]
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  return array(
    select m.team_id from core.member m
    where m.account_id = c.account_id and m.investigation_id = c.investigation_id
      and m.role = c.role and m.ended_at is null and m.team_id is not null);
end $$;

-- People assigned to the acting tracer or one of their teams.
create or replace function core.ctx_held() returns uuid[]
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  -- Two look-ups by index; as one condition they would read every person.
  return array(
    select p.id from core.person p
    where p.assigned_account_id = c.account_id and p.investigation_id = c.investigation_id
      and p.withdrawn_at is null
    union
    select p.id from core.member m
    join core.person p on p.assigned_team_id = m.team_id
      and p.investigation_id = c.investigation_id and p.withdrawn_at is null
    where m.account_id = c.account_id and m.investigation_id = c.investigation_id
      and m.role = c.role and m.ended_at is null);
end $$;

-- The tracer's scope: held people and those one contact pair away.
create or replace function core.ctx_people() returns uuid[]
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare v_held uuid[] := core.ctx_held();
begin
  return array(
    select h.id from unnest(v_held) h (id)
    union
    select cp.person_b from unnest(v_held) h (id)
    join core.contact_pair cp on cp.person_a = h.id and cp.withdrawn_at is null
    union
    select cp.person_a from unnest(v_held) h (id)
    join core.contact_pair cp on cp.person_b = h.id and cp.withdrawn_at is null);
end $$;

-- People whose identity a tracer may open: held people, and contacts (not cases) of held cases.
-- A case seen from a held contact stays a study number: a contact is not told who the case is.
-- Held to indexes: with a few thousand of them the planner would read everybody instead.
create or replace function core.ctx_named_people() returns uuid[]
language plpgsql stable security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off as $$
declare
  v_held uuid[] := core.ctx_held();
  v_cases uuid[];
  v_near uuid[];
begin
  v_cases := array(
    select p.id from core.person p
    where p.id = any (v_held) and p.classification in ('confirmed', 'probable', 'suspected'));
  -- Whom a case met is often met by several: first who they are, then each looked up once.
  v_near := array(
    select cp.person_b from unnest(v_cases) h (id)
    join core.contact_pair cp on cp.person_a = h.id and cp.withdrawn_at is null
    union
    select cp.person_a from unnest(v_cases) h (id)
    join core.contact_pair cp on cp.person_b = h.id and cp.withdrawn_at is null);
  return array(
    select h.id from unnest(v_held) h (id)
    union
    select p.id from core.person p
    where p.id = any (v_near)
      and (p.classification is null or p.classification in ('contact', 'not_a_case')));
end $$;

-- Those of some people whose identity the acting person may open: the same people as
-- core.ctx_named_people(), asked for a page at a time, so that the cost is that of the page and not
-- of everything held. Supervisors and data officers: everybody of the investigation.
create or replace function core.ctx_named_of(p_people uuid[]) returns uuid[]
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_teams uuid[] := core.ctx_teams();
begin
  select * into c from core.ctx();
  if c.role in ('supervisor', 'officer') then
    return array(
      select p.id from core.person p
      where p.id = any (p_people) and p.investigation_id = c.investigation_id);
  end if;
  if c.role is distinct from 'tracer' then return '{}'; end if;
  return array(
    select p.id from core.person p
    where p.id = any (p_people) and p.investigation_id = c.investigation_id and (
      (p.withdrawn_at is null
        and (p.assigned_account_id = c.account_id or p.assigned_team_id = any (v_teams)))
      or ((p.classification is null or p.classification in ('contact', 'not_a_case'))
        and exists (
          select 1 from (
            select cp.person_b as id from core.contact_pair cp
            where cp.person_a = p.id and cp.withdrawn_at is null
            union all
            select cp.person_a from core.contact_pair cp
            where cp.person_b = p.id and cp.withdrawn_at is null) n
          join core.person h on h.id = n.id and h.investigation_id = c.investigation_id
            and h.withdrawn_at is null
          where h.classification in ('confirmed', 'probable', 'suspected')
            and (h.assigned_account_id = c.account_id or h.assigned_team_id = any (v_teams))))));
end $$;

-- Is a person held, or does one of their neighbours (only cases, if asked) make them so? Looks at
-- this person and their pairs only, because it is asked once per row of a form. Called by the
-- functions below with the context they have read; no login may call it.
create or replace function core.ctx_near(
  p_account uuid, p_investigation uuid, p_role text, p_person uuid, p_of_cases boolean)
returns boolean
language plpgsql stable set search_path = pg_catalog, pg_temp as $$
declare
  v_teams uuid[] := array(
    select m.team_id from core.member m
    where m.account_id = p_account and m.investigation_id = p_investigation and m.role = p_role
      and m.ended_at is null and m.team_id is not null);
begin
  if exists (
    select 1 from core.person h where h.id = p_person and h.withdrawn_at is null
      and (h.assigned_account_id = p_account or h.assigned_team_id = any (v_teams))) then
    return true;
  end if;
  return exists (
    select 1 from (
      select cp.person_b as id from core.contact_pair cp
      where cp.person_a = p_person and cp.withdrawn_at is null
      union all
      select cp.person_a from core.contact_pair cp
      where cp.person_b = p_person and cp.withdrawn_at is null) n
    join core.person h on h.id = n.id and h.investigation_id = p_investigation
      and h.withdrawn_at is null
    where (h.assigned_account_id = p_account or h.assigned_team_id = any (v_teams))
      and (not p_of_cases or h.classification in ('confirmed', 'probable', 'suspected')));
end $$;

-- May the acting person attach something to this person? In scope, or made by them just now.
create or replace function core.ctx_can_link(p_person uuid) returns boolean
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_recorder uuid;
begin
  select * into c from core.ctx();
  select p.recorded_by into v_recorder from core.person p
  where p.id = p_person and p.investigation_id = c.investigation_id;
  if not found then return false; end if;
  if c.role in ('supervisor', 'officer') or v_recorder = c.account_id then return true; end if;
  return core.ctx_near(c.account_id, c.investigation_id, c.role, p_person, false);
end $$;

create or replace function core.ctx_can_tell(p_pair uuid) returns boolean
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare v_pair record;
begin
  select cp.person_a, cp.person_b into v_pair from core.contact_pair cp where cp.id = p_pair;
  if not found then return false; end if;
  return core.ctx_can_link(v_pair.person_a) and core.ctx_can_link(v_pair.person_b);
end $$;

-- Identity scope of the acting role, as one predicate: the same people as core.ctx_named_people(),
-- asked from the person's side.
create or replace function core.ctx_may_name(p_person uuid) returns boolean
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_class text;
begin
  select * into c from core.ctx();
  select p.classification into v_class from core.person p
  where p.id = p_person and p.investigation_id = c.investigation_id;
  if not found then return false; end if;
  if c.role in ('supervisor', 'officer') then return true; end if;
  if c.role <> 'tracer' then return false; end if;
  if v_class is null or v_class in ('contact', 'not_a_case') then
    return core.ctx_near(c.account_id, c.investigation_id, c.role, p_person, true);
  end if;
  return p_person = any (core.ctx_held());
end $$;
