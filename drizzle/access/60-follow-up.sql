-- Everyone under follow-up within the acting tracer's scope, with what the due list shows of them;
-- with days (YYYYMMDD as numbers) only who is listed as due between them, and those without a day 0.
-- Who stands together is told as far as the tracer may open whose numbers are shared, whether those
-- are listed or not; neither number nor token leaves the database. One function, because beside row
-- security each of these joins would search the whole scope again for every row.
drop function if exists identity.shared_phones(uuid[]);
drop function if exists core.followed_near();
create or replace function core.followed_near(p_first integer, p_last integer)
returns table (person_id uuid, day_zero text, day_key integer, open boolean, symptomatic boolean,
  together text, study_number text, area text, classification text, assigned_account_id uuid,
  version integer, recorded_at timestamptz, mine boolean)
language plpgsql stable security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_mergejoin = off as $$
declare
  c record;
  v_people uuid[];
  v_named uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role <> 'tracer' then
    raise insufficient_privilege using message = 'no context';
  end if;
  v_people := core.ctx_people();
  v_named := core.ctx_named_people();
  return query
    with named as materialized (select n.id from unnest(v_named) n (id)),
    near as materialized (
      select f.person_id, f.day_zero, f.day_key, f.open, f.symptomatic, f.together
      from core.follow_up f
      where f.person_id = any (v_people) and f.investigation_id = c.investigation_id),
    -- Without a word in core.follow_up nobody stands with anybody in the whole investigation.
    numbers as (
      select f.person_id, t.token, count(*) over (partition by t.token) as holders
      from near f join named n on n.id = f.person_id
      join identity.search_token t on t.person_id = f.person_id and t.kind = 1
      where f.together is not null),
    shared as (
      select m.person_id, min(h.number) over k as home, min(m.person_id::text) over k as first
      from numbers m join core.person p on p.id = m.person_id
      left join core.place h on h.id = p.household_id
      where m.holders > 1
      window k as (partition by m.token)),
    sharing as (
      select s.person_id, min(s.home) as home, min(s.first) as first
      from shared s group by s.person_id)
    select f.person_id, f.day_zero, f.day_key, f.open, f.symptomatic,
      case when s.home is not null or h.number is not null
          then 'household-' || coalesce(s.home, h.number)
        when s.first is not null then 'phone-' || s.first end,
      p.study_number, p.area, p.classification, p.assigned_account_id, p.version, p.recorded_at,
      n.id is not null
    from near f
    join core.person p on p.id = f.person_id
    left join core.place h on h.id = p.household_id and f.together is not null
    left join sharing s on s.person_id = f.person_id
    left join named n on n.id = f.person_id
    where p_first is null
      or f.open and (f.day_key between p_first and p_last or f.symptomatic or f.day_key = 99991231);
end $$;

-- Keeps the sealed note of a check that the acting person has just recorded.
create or replace function identity.put_check_note(p_check uuid, p_cipher bytea) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('tracer', 'supervisor') then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.follow_check (check_id, investigation_id, note_cipher)
  select k.id, k.investigation_id, p_cipher from core.follow_check k
  where k.id = p_check and k.investigation_id = c.investigation_id
    and k.recorded_by = c.account_id;
  if not found then raise insufficient_privilege using message = 'no context'; end if;
end $$;

-- Sealed notes of a person's checks; the opening is recorded. Out of scope there are none.
create or replace function identity.open_check_notes(p_person uuid)
returns table (check_id uuid, cipher bytea)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('tracer', 'supervisor') then
    raise insufficient_privilege using message = 'no context';
  end if;
  if not core.ctx_may_name(p_person) then return; end if;
  insert into audit.event (investigation_id, account_id, role, action, person_ids, fields)
  values (c.investigation_id, c.account_id, c.role, 'follow_checks.opened', array[p_person], '{note}');
  return query
    select n.check_id, n.note_cipher from core.follow_check k
    join identity.follow_check n on n.check_id = k.id
    where k.person_id = p_person and k.withdrawn_at is null;
end $$;
