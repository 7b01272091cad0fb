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

-- Contacts under follow-up whom the acting person may see, with day 0: the latest last exposure day
-- to a case (or to someone not yet classified) over all their pairs, because one contact has one
-- follow-up whoever named them. Partial and missing days give no day 0. A person not yet classified
-- counts as a contact once a case has named them. Contacts who became a case, or were found to be
-- none, keep their day 0 and with it their history; what they themselves told does not move it.
-- Planned anew each time: the list of people may hold ten or a hundred thousand.
drop function if exists core.follow_up_days();
create or replace function core.follow_up_days(p_only uuid)
returns table (person_id uuid, day_zero text)
language plpgsql stable security definer set search_path = pg_catalog, pg_temp
set plan_cache_mode = force_custom_plan as $$
declare
  c record;
  v_people uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('tracer', 'supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  if c.role = 'tracer' then
    select coalesce(array_agg(p.id), '{}') into v_people from core.person p
    where p.id = any ((select core.ctx_people())::uuid[]) and p.withdrawn_at is null
      and (p.classification = 'contact' or p.classification is null or p.became_case
        or p.classification = 'not_a_case' and exists (select 1 from core.classification k
          where k.person_id = p.id and k.classification = 'contact'))
      and (p_only is null or p.id = p_only);
  else
    select coalesce(array_agg(p.id), '{}') into v_people from core.person p
    where p.investigation_id = c.investigation_id and p.withdrawn_at is null
      and (p.classification = 'contact' or p.classification is null or p.became_case
        or p.classification = 'not_a_case' and exists (select 1 from core.classification k
          where k.person_id = p.id and k.classification = 'contact'))
      and (p_only is null or p.id = p_only);
  end if;
  return query
    with sides as (
      select cp.id, cp.person_a as contact, cp.person_b as source from core.contact_pair cp
      where cp.person_a = any (v_people) and cp.withdrawn_at is null
      union all
      select cp.id, cp.person_b, cp.person_a from core.contact_pair cp
      where cp.person_b = any (v_people) and cp.withdrawn_at is null),
    told as (
      select s.contact,
        max(e.last_exposure) filter (where e.last_exposure ~ '^\d{4}-\d{2}-\d{2}$') as day_zero
      from sides s
      join core.person p on p.id = s.contact
      join core.person q on q.id = s.source and q.withdrawn_at is null
      join core.exposure e on e.pair_id = s.id and e.withdrawn_at is null
      where q.classification in ('confirmed', 'probable', 'suspected')
          and (p.classification = 'contact' or e.named_by = q.id
            or p.classification is not null and e.named_by is distinct from p.id)
        or q.classification is null and p.classification = 'contact'
      group by s.contact)
    select p.id, t.day_zero from core.person p
    left join told t on t.contact = p.id
    where p.id = any (v_people) and (p.classification = 'contact' or t.contact is not null);
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
