-- Parts of a made file. They are encrypted under the investigation's key, which only the application
-- holds; a login without any right on identity (the epidemiologist's) makes files of study numbers
-- and has its own of them back through these functions.
create or replace function core.keep_export_part(p_export uuid, p_part integer, p_body bytea)
returns void language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or not exists (
    select 1 from core.export e where e.id = p_export and e.investigation_id = c.investigation_id
      and e.recorded_by = c.account_id and e.role = c.role and e.state = 'building') then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.export_part (export_id, investigation_id, part, body_cipher)
  values (p_export, c.investigation_id, p_part, p_body);
end $$;

-- One part, for whoever made the file and in the role it was made in; null when it is gone.
create or replace function core.read_export_part(p_export uuid, p_part integer) returns bytea
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  return (
    select p.body_cipher from core.export e
    join identity.export_part p on p.export_id = e.id and p.part = p_part
    where e.id = p_export and e.investigation_id = c.investigation_id
      and e.recorded_by = c.account_id and e.role = c.role and e.state = 'ready'
      and e.expires_at > now());
end $$;

-- Deletes the bytes of a file; its row stays. The maker may, and any data officer.
create or replace function core.drop_export_parts(p_export uuid) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  delete from identity.export_part p using core.export e
  where e.id = p_export and p.export_id = e.id and e.investigation_id = c.investigation_id
    and (e.recorded_by = c.account_id or c.role = 'officer');
end $$;

-- Files a day old are deleted, and so is what a failed or cancelled one left.
create or replace function core.sweep_exports() returns integer
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare v_count integer;
begin
  update core.export set state = 'expired' where state = 'ready' and expires_at <= now();
  get diagnostics v_count = row_count;
  delete from identity.export_part p using core.export e
  where e.id = p.export_id and e.state not in ('building', 'ready');
  return v_count;
end $$;

-- Says, before anything is read, whose identity an export opens and which fields: one event, on
-- record in the transaction of the opening. A field the acting role may not open is refused.
create or replace function identity.begin_export_opening(
  p_export uuid, p_people uuid[], p_fields text[]) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_people uuid[];
begin
  select * into c from core.ctx();
  if c.account_id is null or not exists (
    select 1 from core.export e where e.id = p_export and e.investigation_id = c.investigation_id
      and e.recorded_by = c.account_id and e.role = c.role and e.identified
      and e.state = 'building') then
    raise insufficient_privilege using message = 'no context';
  end if;
  if exists (
    select 1 from unnest(p_fields) f (field)
    where not exists (select 1 from auth.field_right r where r.role = c.role and r.field = f.field)
      and (f.field <> 'household' or c.role <> 'supervisor')) then
    raise insufficient_privilege using message = 'field not readable by this role';
  end if;
  select coalesce(array_agg(p.id order by u.place), '{}') into v_people
  from unnest(p_people) with ordinality as u (id, place)
  join core.person p on p.id = u.id and p.investigation_id = c.investigation_id;
  insert into audit.event (investigation_id, account_id, role, action, person_ids, fields, counts)
  values (c.investigation_id, c.account_id, c.role, 'export.opened', v_people, p_fields,
    jsonb_build_object('export', p_export));
end $$;

-- Ciphertexts of a slice of the people whom this transaction's own event lists (places p_from to
-- p_to, counted from 1), of those fields asked for that it lists; of households also which place it is. A login may
-- write events of its own, so what one lists is cut again to what the role may open.
create or replace function identity.open_for_export(
  p_export uuid, p_from integer, p_to integer, p_fields text[])
returns table (person_id uuid, field text, place_id uuid, cipher bytea)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v record;
  v_fields text[];
begin
  select * into c from core.ctx();
  select e.person_ids[p_from:p_to] as people, e.fields into v from audit.event e
  where e.investigation_id = c.investigation_id and e.account_id = c.account_id and e.at = now()
    and e.role = c.role and e.action = 'export.opened' and e.counts ->> 'export' = p_export::text
  limit 1;
  if not found or not exists (
    select 1 from core.export e where e.id = p_export and e.investigation_id = c.investigation_id
      and e.recorded_by = c.account_id and e.role = c.role and e.identified
      and e.state = 'building') then
    raise insufficient_privilege using message = 'no context';
  end if;
  select coalesce(array_agg(r.field), '{}') into v_fields
  from auth.field_right r where r.role = c.role and r.field = any (v.fields)
    and r.field = any (p_fields);
  return query
    select i.person_id, f.field, null::uuid, f.cipher
    from identity.person i
    cross join lateral (values
      ('ref', i.ref_cipher), ('name', i.name_cipher), ('phone', i.phone_cipher),
      ('email', i.email_cipher), ('birthDate', i.birth_date_cipher),
      ('address', i.address_cipher)) as f (field, cipher)
    where i.person_id = any (v.people) and i.investigation_id = c.investigation_id
      and f.field = any (v_fields) and f.cipher is not null
    union all
    select p.id, 'household', h.place_id, h.name_cipher
    from core.person p join identity.place h on h.place_id = p.household_id
    where c.role = 'supervisor' and 'household' = any (v.fields)
      and 'household' = any (p_fields) and p.id = any (v.people)
      and p.investigation_id = c.investigation_id;
end $$;

-- Names of households in which people met; recorded like the names of people.
create or replace function identity.open_export_places(p_export uuid, p_places uuid[])
returns table (place_id uuid, cipher bytea)
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role <> 'supervisor' or not exists (
    select 1 from core.export e where e.id = p_export and e.investigation_id = c.investigation_id
      and e.recorded_by = c.account_id and e.role = c.role and e.identified
      and e.state = 'building') then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into audit.event (investigation_id, account_id, role, action, fields, counts)
  values (c.investigation_id, c.account_id, c.role, 'places.opened', '{household}',
    jsonb_build_object('places', cardinality(p_places)));
  return query select i.place_id, i.name_cipher from identity.place i
    where i.place_id = any (p_places) and i.investigation_id = c.investigation_id;
end $$;
