-- Next graph version of the acting investigation; the row lock orders submissions.
create or replace function core.bump_graph() returns bigint
language sql volatile security definer set search_path = '' as $$
  update core.investigation set graph_version = graph_version + 1
  where id = core.ctx_investigation()
  returning graph_version
$$;

-- Reserves `p_count` place numbers and returns the first.
create or replace function core.next_numbers(p_count integer) returns integer
language sql volatile security definer set search_path = '' as $$
  update core.investigation set next_number = next_number + greatest(p_count, 0)
  where id = core.ctx_investigation()
  returning next_number - greatest(p_count, 0)
$$;

-- The message of an event: ids and versions only; delivered when the transaction commits.
create or replace function core.announce(p_topic text, p_entity uuid, p_version bigint) returns void
language plpgsql volatile security definer set search_path = '' as $$
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
language plpgsql volatile security definer set search_path = '' as $$
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
returns void language sql volatile security definer set search_path = '' as $$
  update auth.idempotency set status = p_status, receipt = p_receipt
  where account_id = core.ctx_user() and key = p_key and status = 0
$$;
