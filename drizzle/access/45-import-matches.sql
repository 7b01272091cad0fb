-- Rows of a file beside people on record whom they may be: the same telephone number, or the same
-- name parts and no others. p_rows: [{line, phone, name}], tokens in base64; `name` is the hash of the
-- row's sorted name tokens. Whole names are computed here for all people at once, so a call should
-- bring many rows. Ids only; nothing is opened.
create or replace function identity.resembling(p_rows jsonb)
returns table (line integer, person_id uuid)
language plpgsql volatile security definer
set search_path = pg_catalog, pg_temp set enable_seqscan = on as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  return query
    with r as materialized (
      select t.line, decode(t.phone, 'base64') as phone, decode(t.name, 'base64') as name
      from jsonb_to_recordset(p_rows) as t (line integer, phone text, name text)),
    whole as materialized (
      select t.person_id as id,
        substring(sha256(string_agg(t.token, ''::bytea order by t.token)) for 16) as key
      from identity.search_token t
      where t.investigation_id = c.investigation_id and t.kind = 3
      group by t.person_id),
    hits as (
      select r.line as at, t.person_id as id, 1 as phone, 0 as name
      from r join identity.search_token t on t.investigation_id = c.investigation_id
        and t.token = r.phone and t.kind = 1
      union all
      select r.line, w.id, 0, 1 from r join whole w on w.key = r.name),
    ranked as (
      select h.at, h.id, row_number() over (
        partition by h.at order by max(h.phone) + max(h.name) desc, max(h.phone) desc, h.id) as place
      from hits h join core.person p on p.id = h.id and p.withdrawn_at is null
      group by h.at, h.id)
    select k.at, k.id from ranked k where k.place <= 8 order by k.at, k.place;
end $$;

-- Rows set aside. p_rows: [{id, line, ref_token, other_id, matched_on, body}], binary in base64.
create or replace function identity.keep_import_matches(p_import uuid, p_rows jsonb) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.role not in ('supervisor', 'officer') or not exists (
    select 1 from core.import f where f.id = p_import and f.investigation_id = c.investigation_id
      and f.state = 'checking') then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.import_match (id, import_id, investigation_id, line, ref_token, other_id,
    matched_on, body_cipher)
  select r.id, p_import, c.investigation_id, r.line, decode(r.ref_token, 'base64'), r.other_id,
    r.matched_on, decode(r.body, 'base64')
  from jsonb_to_recordset(p_rows) as r (id uuid, line integer, ref_token text, other_id uuid,
    matched_on text, body text);
end $$;

-- Before a file is checked again; of an import that is on record nothing goes.
create or replace function identity.drop_import_matches(p_import uuid) returns void
language sql volatile security definer set search_path = pg_catalog, pg_temp as $$
  delete from identity.import_match m
  where m.import_id = p_import and m.investigation_id = core.ctx_investigation()
    and core.ctx_role() in ('supervisor', 'officer')
    and exists (select 1 from core.import f where f.id = p_import and f.state <> 'committed')
$$;

-- Rows of an import that wait, in the order of the file; of one kind, or of some ids.
create or replace function identity.open_import_matches(
  p_import uuid, p_ids uuid[], p_kind text, p_limit integer, p_offset integer)
returns table (id uuid, line integer, other_id uuid, matched_on text, body_cipher bytea)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select m.id, m.line, m.other_id, m.matched_on, m.body_cipher from identity.import_match m
  where m.import_id = p_import and m.investigation_id = core.ctx_investigation()
    and core.ctx_role() in ('supervisor', 'officer') and m.state = 'open'
    and (p_ids is null or m.id = any (p_ids)) and (p_kind is null or m.matched_on = p_kind)
  order by m.line limit p_limit offset p_offset
$$;

create or replace function identity.count_import_matches(p_import uuid)
returns table (matched_on text, waiting integer)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select m.matched_on, count(*)::integer from identity.import_match m
  where m.import_id = p_import and m.investigation_id = core.ctx_investigation()
    and core.ctx_role() in ('supervisor', 'officer') and m.state = 'open'
  group by m.matched_on order by m.matched_on
$$;

-- Claims rows that wait, so that two deciders cannot both put one on record. A decided row's content
-- is deleted with the decision.
create or replace function identity.decide_import_matches(p_import uuid, p_ids uuid[], p_state text)
returns table (id uuid)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') or p_state not in ('same', 'other')
    or not exists (select 1 from core.import f where f.id = p_import
      and f.investigation_id = c.investigation_id and f.state = 'committed') then
    raise insufficient_privilege using message = 'no context';
  end if;
  return query
    update identity.import_match m set state = p_state, body_cipher = null,
      decided_by = c.account_id, decided_at = now()
    where m.import_id = p_import and m.id = any (p_ids) and m.state = 'open'
    returning m.id;
end $$;

-- References of files on record whose rows wait for a decision.
create or replace function identity.waiting_refs(p_tokens bytea[]) returns table (token bytea)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select distinct m.ref_token from unnest(p_tokens) t (token)
  join identity.import_match m on m.investigation_id = (select core.ctx_investigation())
    and m.ref_token = t.token and m.state = 'open'
  join core.import f on f.id = m.import_id and f.state = 'committed'
  where (select core.ctx_role()) in ('supervisor', 'officer')
$$;

-- Further references of people on record. p_rows: [{token, person_id}], tokens in base64.
create or replace function identity.add_ref_aliases(p_rows jsonb) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.ref_alias (investigation_id, ref_token, person_id)
  select c.investigation_id, decode(r.token, 'base64'), p.id
  from jsonb_to_recordset(p_rows) as r (token text, person_id uuid)
  join core.person p on p.id = r.person_id and p.investigation_id = c.investigation_id
  where not exists (select 1 from identity.person i
    where i.investigation_id = c.investigation_id and i.ref_token = decode(r.token, 'base64'))
  on conflict do nothing;
end $$;
