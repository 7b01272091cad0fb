-- The only door to full identity values: it writes the access event in the same transaction and
-- returns ciphertext, which only the application can open. Rows out of scope are left out silently.
create or replace function identity.open_people(p_people uuid[], p_fields text[], p_action text)
returns table (person_id uuid, field text, cipher bytea)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_fields text[];
  v_people uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null then raise insufficient_privilege using message = 'no context'; end if;
  select coalesce(array_agg(distinct r.field), '{}') into v_fields
  from auth.field_right r where r.role = c.role and r.field = any (p_fields);
  if cardinality(v_fields) < (select count(distinct f) from unnest(p_fields) f) then
    raise insufficient_privilege using message = 'field not readable by this role';
  end if;
  v_people := core.ctx_named_of(p_people);
  if cardinality(v_people) = 0 then return; end if;
  -- One reading is one event: what a request opens in parts (a person, then the names of those met)
  -- is added to the event that the first part wrote in this transaction.
  update audit.event set
    person_ids = (select array_agg(distinct p) from unnest(person_ids || v_people) p),
    fields = (select array_agg(distinct f) from unnest(fields || v_fields) f)
  where id = (
    select e.id from audit.event e
    where e.investigation_id = c.investigation_id and e.at = now() and e.account_id = c.account_id
      and e.action = p_action limit 1);
  if not found then
    insert into audit.event (investigation_id, account_id, role, action, person_ids, fields)
    values (c.investigation_id, c.account_id, c.role, p_action, v_people, v_fields);
  end if;
  return query
    select i.person_id, f.field, f.cipher
    from identity.person i
    cross join lateral (values
      ('ref', i.ref_cipher), ('name', i.name_cipher), ('phone', i.phone_cipher),
      ('email', i.email_cipher), ('birthDate', i.birth_date_cipher),
      ('address', i.address_cipher), ('note', i.note_cipher)) as f (field, cipher)
    where i.person_id = any (v_people) and f.field = any (v_fields) and f.cipher is not null;
end $$;

-- Household names, likewise recorded (tracers: households of people whose identity is theirs).
create or replace function identity.open_places(p_places uuid[])
returns table (place_id uuid, cipher bytea)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_named uuid[];
  v_places uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null then raise insufficient_privilege using message = 'no context'; end if;
  if c.role not in ('tracer', 'supervisor') then
    raise insufficient_privilege using message = 'field not readable by this role';
  end if;
  v_places := p_places;
  if c.role = 'tracer' then
    v_named := core.ctx_named_of(
      array(select p.id from core.person p where p.household_id = any (p_places)));
    v_places := array(
      select distinct p.household_id from core.person p
      where p.id = any (v_named) and p.household_id = any (p_places));
  end if;
  select coalesce(array_agg(i.place_id), '{}') into v_places
  from identity.place i
  where i.place_id = any (v_places) and i.investigation_id = c.investigation_id;
  if cardinality(v_places) = 0 then return; end if;
  -- Opened along with people, households belong to the event of that opening, which says whose they
  -- are; it is still this transaction's own (an event's time is its transaction's).
  update audit.event set fields = array_append(fields, 'household') where id = (
    select e.id from audit.event e
    where e.investigation_id = c.investigation_id and e.at = now() and e.account_id = c.account_id
      and cardinality(e.person_ids) > 0 and 'name' = any (e.fields)
    order by cardinality(e.fields) desc limit 1);
  if not found then
    insert into audit.event (investigation_id, account_id, role, action, fields, counts)
    values (c.investigation_id, c.account_id, c.role, 'places.opened', '{household}',
      jsonb_build_object('places', cardinality(v_places)));
  end if;
  return query select i.place_id, i.name_cipher from identity.place i where i.place_id = any (v_places);
end $$;

-- People by search tokens, within what the acting person may name. Kinds are those of the
-- application; every token of p_all must be met (name parts), any token of p_any suffices.
create or replace function identity.find_people(p_all bytea[], p_any bytea[], p_limit integer)
returns table (person_id uuid, kinds smallint[])
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_met uuid[];
  v_named uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null then raise insufficient_privilege using message = 'no context'; end if;
  if not exists (select 1 from auth.field_right r where r.role = c.role and r.field = 'name') then
    raise insufficient_privilege using message = 'search not open to this role';
  end if;
  if c.role = 'tracer' then
    -- Of a few who are met each is asked; a tracer's people are fewer than those who share a name,
    -- who are looked up among them.
    v_met := array(
      select distinct t.person_id from identity.search_token t
      where t.investigation_id = c.investigation_id and t.token = any (p_all || p_any)
      limit 201);
    v_named := case when cardinality(v_met) > 200 then core.ctx_named_people()
      else core.ctx_named_of(v_met) end;
  end if;
  return query
    with hits as (
      select t.person_id, array_agg(distinct t.kind) as kinds,
        count(distinct t.token) filter (where t.token = any (p_all)) as met,
        bool_or(t.token = any (p_any)) as direct
      from identity.search_token t
      where t.investigation_id = c.investigation_id and t.token = any (p_all || p_any)
        and (v_named is null or t.person_id = any (v_named))
      group by t.person_id)
    select h.person_id, h.kinds from hits h
    join core.person p on p.id = h.person_id and p.withdrawn_at is null
    where (h.direct or (cardinality(p_all) > 0 and h.met = cardinality(p_all)))
    order by h.direct desc, h.person_id
    limit p_limit;
end $$;

-- A new person may be one already on record whom the acting person may not see. Nothing is said to
-- them: the pair goes to the supervisor's list.
create or replace function identity.flag_hidden_matches(
  p_person uuid, p_phone bytea[], p_names bytea[]) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or not core.ctx_can_link(p_person) then
    raise insufficient_privilege using message = 'no context';
  end if;
  -- From the other roles nobody is hidden.
  if c.role <> 'tracer' then return; end if;
  insert into core.match_review (id, investigation_id, person_id, other_id, matched_on, recorded_by)
  with met as materialized (
    select t.person_id, 'phone' as how from identity.search_token t
    where t.investigation_id = c.investigation_id and t.token = any (p_phone)
    union
    select t.person_id, 'name' from identity.search_token t
    where t.investigation_id = c.investigation_id and t.token = any (p_names)
    group by t.person_id having count(distinct t.token) = cardinality(p_names)),
  -- Materialised, so that scope is asked of the few who are met and not of every shared name.
  hits as materialized (
    select met.person_id, array_agg(met.how order by met.how desc) as matched_on
    from met where met.person_id <> p_person group by met.person_id
    order by cardinality(array_agg(met.how)) desc, min(met.how) desc, met.person_id)
  select gen_random_uuid(), c.investigation_id, p_person, h.person_id, h.matched_on, c.account_id
  from hits h
  join core.person p on p.id = h.person_id and p.withdrawn_at is null
  where not core.ctx_may_name(h.person_id)
  limit 20
  on conflict do nothing;
end $$;

-- References of a file to people on record (supervisor and officer only). A join, not "= any": an
-- import asks for thousands at a time while it fills the table.
create or replace function identity.people_by_ref(p_tokens bytea[])
returns table (token bytea, person_id uuid)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  return query select i.ref_token, i.person_id from unnest(p_tokens) t (token)
    join identity.person i on i.investigation_id = c.investigation_id and i.ref_token = t.token
    union all
    select a.ref_token, a.person_id from unnest(p_tokens) t (token)
    join identity.ref_alias a on a.investigation_id = c.investigation_id and a.ref_token = t.token;
end $$;

-- True when a reference is taken in the acting investigation (says nothing of whom).
create or replace function identity.ref_taken(p_token bytea, p_except uuid) returns boolean
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select exists (select 1 from identity.person i
    where i.investigation_id = core.ctx_investigation() and i.ref_token = p_token
      and i.person_id is distinct from p_except)
    or exists (select 1 from identity.ref_alias a
      where a.investigation_id = core.ctx_investigation() and a.ref_token = p_token
        and a.person_id is distinct from p_except)
$$;

-- Ciphertext of people a file names, to compare and fill blanks; the import's own event records it.
create or replace function identity.open_for_import(p_import uuid, p_people uuid[])
returns table (person_id uuid, field text, cipher bytea)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') or not exists (
    select 1 from core.import f where f.id = p_import and f.investigation_id = c.investigation_id
      and (f.state in ('checking', 'ready', 'committing') or exists (
        select 1 from identity.import_match m where m.import_id = f.id and m.state = 'open'))) then
    raise insufficient_privilege using message = 'no context';
  end if;
  return query
    select i.person_id, f.field, f.cipher
    from identity.person i
    cross join lateral (values
      ('name', i.name_cipher), ('phone', i.phone_cipher), ('email', i.email_cipher),
      ('birthDate', i.birth_date_cipher), ('address', i.address_cipher)) as f (field, cipher)
    where i.person_id = any (p_people) and i.investigation_id = c.investigation_id
      and f.cipher is not null;
end $$;

-- Households by keyed name.
create or replace function identity.households_by_token(p_tokens bytea[])
returns table (token bytea, place_id uuid)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select i.name_token, i.place_id from unnest(p_tokens) t (token)
  join identity.place i on i.investigation_id = (select core.ctx_investigation())
    and i.name_token = t.token
$$;

create or replace function identity.put_place(p_place uuid, p_cipher bytea, p_token bytea)
returns void language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
begin
  insert into identity.place (place_id, investigation_id, name_cipher, name_token)
  select p.id, p.investigation_id, p_cipher, p_token from core.place p
  where p.id = p_place and p.investigation_id = core.ctx_investigation();
  if not found then raise insufficient_privilege using message = 'no context'; end if;
end $$;

-- The wrapped data key of the acting investigation; only the application can unwrap it.
create or replace function identity.wrapped_key() returns bytea
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select k.wrapped_key from identity.data_key k where k.investigation_id = core.ctx_investigation()
$$;

-- Drafts: the acting person's own, for a person they may interview.
create or replace function identity.read_draft(p_person uuid)
returns table (body_cipher bytea, version integer, updated_at timestamptz)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select d.body_cipher, d.version, d.updated_at from identity.interview_draft d
  where d.person_id = p_person and d.account_id = core.ctx_user()
    and d.investigation_id = core.ctx_investigation()
$$;

create or replace function identity.keep_draft(p_person uuid, p_body bytea, p_version integer)
returns integer language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_version integer;
begin
  select * into c from core.ctx();
  if c.role not in ('tracer', 'supervisor') or not core.ctx_can_link(p_person) then
    raise insufficient_privilege using message = 'no context';
  end if;
  -- A draft that was submitted meanwhile is not brought back by a page that still holds it.
  if p_version > 0 and not exists (
    select 1 from identity.interview_draft d
    where d.person_id = p_person and d.account_id = c.account_id) then
    return null;
  end if;
  insert into identity.interview_draft as d (person_id, account_id, investigation_id, body_cipher, version)
  values (p_person, c.account_id, c.investigation_id, p_body, 1)
  on conflict (person_id, account_id) do update
    set body_cipher = excluded.body_cipher, version = d.version + 1, updated_at = now()
    where d.version = p_version
  returning d.version into v_version;
  return v_version;
end $$;

create or replace function identity.drop_draft(p_person uuid) returns void
language sql volatile security definer set search_path = pg_catalog, pg_temp as $$
  delete from identity.interview_draft
  where person_id = p_person and account_id = core.ctx_user()
$$;

-- Staged rows of a file, encrypted in chunks.
create or replace function identity.keep_stage(p_import uuid, p_chunk integer, p_body bytea)
returns void language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.role not in ('supervisor', 'officer') or not exists (
    select 1 from core.import f where f.id = p_import and f.investigation_id = c.investigation_id) then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.import_stage (import_id, investigation_id, chunk, body_cipher)
  values (p_import, c.investigation_id, p_chunk, p_body);
end $$;

-- The next chunks after one, in order: a commit holds a few at a time.
drop function if exists identity.read_stage(uuid);
create or replace function identity.read_stage(p_import uuid, p_after integer, p_count integer)
returns table (chunk integer, body_cipher bytea)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select s.chunk, s.body_cipher from identity.import_stage s
  where s.import_id = p_import and s.chunk > p_after
    and s.investigation_id = (select core.ctx_investigation())
    and (select core.ctx_role()) in ('supervisor', 'officer')
  order by s.chunk limit p_count
$$;

create or replace function identity.drop_stage(p_import uuid) returns void
language sql volatile security definer set search_path = pg_catalog, pg_temp as $$
  delete from identity.import_stage s
  where s.import_id = p_import and s.investigation_id = core.ctx_investigation()
    and core.ctx_role() in ('supervisor', 'officer')
$$;

-- Writes identity of people the acting person may write, and replaces the tokens of those fields.
-- p_rows: [{person_id, has: [field…], ref_cipher, ref_token, name_cipher, …}], binary in base64;
-- p_tokens: [{person_id, kind, token}]; p_kinds: token kinds to clear first.
create or replace function identity.put_people(p_rows jsonb, p_tokens jsonb, p_kinds smallint[])
returns integer language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_ids uuid[];
  v_count integer;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role = 'epidemiologist' then
    raise insufficient_privilege using message = 'no context';
  end if;
  select array_agg((r ->> 'person_id')::uuid) into v_ids from jsonb_array_elements(p_rows) r;
  if exists (
    select 1 from unnest(v_ids) u (id)
    left join core.person p on p.id = u.id and p.investigation_id = c.investigation_id
    where p.id is null) then
    raise insufficient_privilege using message = 'no context';
  end if;
  if c.role = 'tracer' and exists (
    select 1 from core.person p where p.id = any (v_ids) and p.recorded_by is distinct from c.account_id
      and p.id <> all ((select core.ctx_named_people())::uuid[])) then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.person as i (
    person_id, investigation_id, ref_cipher, ref_token, name_cipher, name_masked, phone_cipher,
    phone_last2, email_cipher, email_masked, birth_date_cipher, birth_year, address_cipher, note_cipher)
  select r.person_id, c.investigation_id, decode(r.ref_cipher, 'base64'), decode(r.ref_token, 'base64'),
    decode(r.name_cipher, 'base64'), r.name_masked, decode(r.phone_cipher, 'base64'), r.phone_last2,
    decode(r.email_cipher, 'base64'), r.email_masked, decode(r.birth_date_cipher, 'base64'),
    r.birth_year, decode(r.address_cipher, 'base64'), decode(r.note_cipher, 'base64')
  from jsonb_to_recordset(p_rows) as r (
    person_id uuid, ref_cipher text, ref_token text, name_cipher text, name_masked text,
    phone_cipher text, phone_last2 text, email_cipher text, email_masked text,
    birth_date_cipher text, birth_year integer, address_cipher text, note_cipher text)
  on conflict (person_id) do nothing;
  get diagnostics v_count = row_count;
  if v_count < cardinality(v_ids) then
    update identity.person i set
      ref_cipher = case when r.has ? 'ref' then decode(r.ref_cipher, 'base64') else i.ref_cipher end,
      ref_token = case when r.has ? 'ref' then decode(r.ref_token, 'base64') else i.ref_token end,
      name_cipher = case when r.has ? 'name' then decode(r.name_cipher, 'base64') else i.name_cipher end,
      name_masked = case when r.has ? 'name' then r.name_masked else i.name_masked end,
      phone_cipher = case when r.has ? 'phone' then decode(r.phone_cipher, 'base64') else i.phone_cipher end,
      phone_last2 = case when r.has ? 'phone' then r.phone_last2 else i.phone_last2 end,
      email_cipher = case when r.has ? 'email' then decode(r.email_cipher, 'base64') else i.email_cipher end,
      email_masked = case when r.has ? 'email' then r.email_masked else i.email_masked end,
      birth_date_cipher = case when r.has ? 'birthDate' then decode(r.birth_date_cipher, 'base64') else i.birth_date_cipher end,
      birth_year = case when r.has ? 'birthDate' then r.birth_year else i.birth_year end,
      address_cipher = case when r.has ? 'address' then decode(r.address_cipher, 'base64') else i.address_cipher end,
      note_cipher = case when r.has ? 'note' then decode(r.note_cipher, 'base64') else i.note_cipher end
    from jsonb_to_recordset(p_rows) as r (
      person_id uuid, has jsonb, ref_cipher text, ref_token text, name_cipher text, name_masked text,
      phone_cipher text, phone_last2 text, email_cipher text, email_masked text,
      birth_date_cipher text, birth_year integer, address_cipher text, note_cipher text)
    where i.person_id = r.person_id;
    delete from identity.search_token t where t.person_id = any (v_ids) and t.kind = any (p_kinds);
  end if;
  insert into identity.search_token (person_id, investigation_id, kind, token)
  select t.person_id, c.investigation_id, t.kind, decode(t.token, 'base64')
  from jsonb_to_recordset(p_tokens) as t (person_id uuid, kind smallint, token text)
  where t.person_id = any (v_ids)
  on conflict do nothing;
  return cardinality(v_ids);
end $$;
