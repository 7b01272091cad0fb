-- Which of these people share a telephone number, as far as the acting person may open theirs: a
-- running number for each shared one. Neither the number nor its token leaves the database.
create or replace function identity.shared_phones(p_people uuid[])
returns table (person_id uuid, shared integer)
language plpgsql stable security definer set search_path = pg_catalog, pg_temp
set plan_cache_mode = force_custom_plan as $$
declare
  c record;
  v_people uuid[] := p_people;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('tracer', 'supervisor') then
    raise insufficient_privilege using message = 'no context';
  end if;
  if c.role = 'tracer' then
    v_people := array(
      select n.id from unnest(core.ctx_named_people()) n (id) where n.id = any (p_people));
  end if;
  return query
    with held as (
      select t.person_id as id, t.token, min(t.person_id::text) over (partition by t.token) as first,
        count(*) over (partition by t.token) as met
      from unnest(v_people) u (id)
      join identity.search_token t on t.person_id = u.id and t.kind = 1
        and t.investigation_id = c.investigation_id)
    select h.id, (dense_rank() over (order by h.first))::integer from held h where h.met > 1;
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
