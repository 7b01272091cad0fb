-- Everyone under follow-up within the acting tracer's scope, with what the due list shows of them.
-- Who stands together is told as far as the tracer may open whose numbers are shared; neither number
-- nor token leaves the database. One function, because beside row security each of these joins would
-- search the whole scope again for every row.
drop function if exists identity.shared_phones(uuid[]);
create or replace function core.followed_near()
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
    followed as materialized (
      select f.person_id, f.day_zero, f.day_key, f.open, f.symptomatic, h.number, p.study_number,
        p.area, p.classification, p.assigned_account_id, p.version, p.recorded_at
      from unnest(v_people) u (id)
      join core.follow_up f on f.person_id = u.id and f.investigation_id = c.investigation_id
      join core.person p on p.id = f.person_id
      left join core.place h on h.id = p.household_id),
    numbers as (
      select f.person_id, count(*) over k as holders, min(f.number) over k as home,
        min(f.person_id::text) over k as first
      from followed f join named n on n.id = f.person_id
      join identity.search_token t on t.person_id = f.person_id and t.kind = 1
      window k as (partition by t.token)),
    sharing as (
      select m.person_id, min(m.home) as home, min(m.first) as first
      from numbers m where m.holders > 1 group by m.person_id)
    select f.person_id, f.day_zero, f.day_key, f.open, f.symptomatic,
      case when s.home is not null or f.number is not null
          then 'household-' || coalesce(s.home, f.number)
        when s.first is not null then 'phone-' || s.first end,
      f.study_number, f.area, f.classification, f.assigned_account_id, f.version, f.recorded_at,
      n.id is not null
    from followed f
    left join sharing s on s.person_id = f.person_id
    left join named n on n.id = f.person_id;
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
