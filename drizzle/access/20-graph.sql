-- Next graph version of the acting investigation; the row lock orders submissions.
create or replace function core.bump_graph() returns bigint
language sql volatile security definer set search_path = pg_catalog, pg_temp as $$
  update core.investigation set graph_version = graph_version + 1
  where id = core.ctx_investigation()
  returning graph_version
$$;

-- Reserves `p_count` place numbers and returns the first.
create or replace function core.next_numbers(p_count integer) returns integer
language sql volatile security definer set search_path = pg_catalog, pg_temp as $$
  update core.investigation set next_number = next_number + greatest(p_count, 0)
  where id = core.ctx_investigation()
  returning next_number - greatest(p_count, 0)
$$;

-- The contact pairs of one person with others, made or revived where needed: a pair may exist of
-- which the acting person sees nothing, and must not be made twice. `made` is true for new ones.
create or replace function core.pairs_for(p_person uuid, p_others uuid[])
returns table (other uuid, pair uuid, made boolean)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_made uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role = 'epidemiologist' or not core.ctx_can_link(p_person)
    or exists (select 1 from unnest(p_others) u (id) where not core.ctx_can_link(u.id)) then
    raise insufficient_privilege using message = 'no context';
  end if;
  with put as (
    insert into core.contact_pair as cp (id, investigation_id, person_a, person_b)
    select gen_random_uuid(), c.investigation_id, least(u.id, p_person), greatest(u.id, p_person)
    from (select distinct o.id from unnest(p_others) o (id) order by o.id) u
    on conflict (investigation_id, person_a, person_b) do update set withdrawn_at = null
      where cp.withdrawn_at is not null
    returning cp.id)
  select coalesce(array_agg(put.id), '{}') into v_made from put;
  -- A statement of its own: it also sees a pair that another transaction made meanwhile.
  return query
    select u.id, cp.id, cp.id = any (v_made)
    from (select distinct o.id from unnest(p_others) o (id)) u
    join core.contact_pair cp on cp.investigation_id = c.investigation_id
      and cp.person_a = least(u.id, p_person) and cp.person_b = greatest(u.id, p_person);
end $$;

-- Contacts under follow-up whom the acting person may see, or one of them, with day 0.
drop function if exists core.follow_up_days();
create or replace function core.follow_up_days(p_only uuid)
returns table (person_id uuid, day_zero text)
language plpgsql stable security definer set search_path = pg_catalog, pg_temp
set plan_cache_mode = force_custom_plan as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('tracer', 'supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  if c.role <> 'tracer' then
    return query select f.person_id, f.day_zero from core.follow_up f
      where f.investigation_id = c.investigation_id and (p_only is null or f.person_id = p_only);
  else
    return query select f.person_id, f.day_zero from core.follow_up f
      where f.person_id = any ((select core.ctx_people())::uuid[])
        and f.investigation_id = c.investigation_id and (p_only is null or f.person_id = p_only);
  end if;
end $$;

-- The message of an event: ids and versions only; delivered when the transaction commits.
create or replace function core.announce(p_topic text, p_entity uuid, p_version bigint) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare v_investigation uuid := core.ctx_investigation();
begin
  if v_investigation is null then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into core.outbox (investigation_id, topic, entity_id, graph_version)
  values (v_investigation, p_topic, p_entity, p_version);
  perform pg_notify('strandline', v_investigation::text);
end $$;

-- Idempotency: claims a key for the acting account, or returns what was answered before.
create or replace function auth.claim_key(p_key uuid, p_route text, p_hash text)
returns table (request_hash text, status smallint, receipt jsonb)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare v_user uuid := core.ctx_user();
begin
  if v_user is null then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into auth.idempotency (account_id, key, route, request_hash, status, receipt)
  values (v_user, p_key, p_route, p_hash, 0, '{}') on conflict do nothing;
  if found then return; end if;
  return query select i.request_hash, i.status, i.receipt from auth.idempotency i
    where i.account_id = v_user and i.key = p_key;
end $$;

create or replace function auth.keep_receipt(p_key uuid, p_status smallint, p_receipt jsonb)
returns void language sql volatile security definer set search_path = pg_catalog, pg_temp as $$
  update auth.idempotency set status = p_status, receipt = p_receipt
  where account_id = core.ctx_user() and key = p_key and status = 0
$$;
