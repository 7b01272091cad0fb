-- What an import stores of identity, thousands of rows at a time: a column is an array, so that
-- nothing is quoted and parsed on the way. Supervisor and officer only, as imports are.

-- Writes identity of people who were recorded in core just now and have none yet. A token names its
-- person by place in p_people.
create or replace function identity.add_people(
  p_people uuid[], p_ref_ciphers bytea[], p_ref_tokens bytea[], p_name_ciphers bytea[],
  p_names_masked text[], p_phone_ciphers bytea[], p_phones_last2 text[], p_email_ciphers bytea[],
  p_emails_masked text[], p_birth_date_ciphers bytea[], p_birth_years integer[],
  p_address_ciphers bytea[], p_note_ciphers bytea[],
  p_token_owners integer[], p_token_kinds smallint[], p_tokens bytea[])
returns void language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  if exists (
    select 1 from unnest(p_people) u (id)
    left join core.person p on p.id = u.id and p.investigation_id = c.investigation_id
    where p.id is null) then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.person (
    person_id, investigation_id, ref_cipher, ref_token, name_cipher, name_masked, phone_cipher,
    phone_last2, email_cipher, email_masked, birth_date_cipher, birth_year, address_cipher, note_cipher)
  select u.person_id, c.investigation_id, u.ref_cipher, u.ref_token, u.name_cipher, u.name_masked,
    u.phone_cipher, u.phone_last2, u.email_cipher, u.email_masked, u.birth_date_cipher, u.birth_year,
    u.address_cipher, u.note_cipher
  from unnest(p_people, p_ref_ciphers, p_ref_tokens, p_name_ciphers, p_names_masked, p_phone_ciphers,
    p_phones_last2, p_email_ciphers, p_emails_masked, p_birth_date_ciphers, p_birth_years,
    p_address_ciphers, p_note_ciphers) as u (
    person_id, ref_cipher, ref_token, name_cipher, name_masked, phone_cipher, phone_last2,
    email_cipher, email_masked, birth_date_cipher, birth_year, address_cipher, note_cipher);
  insert into identity.search_token (person_id, investigation_id, kind, token)
  select p_people[t.owner], c.investigation_id, t.kind, t.token
  from unnest(p_token_owners, p_token_kinds, p_tokens) as t (owner, kind, token)
  on conflict do nothing;
end $$;

-- Names of households that were recorded just now, many at a time.
create or replace function identity.put_places(p_places uuid[], p_ciphers bytea[], p_tokens bytea[])
returns void language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_count integer;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege using message = 'no context';
  end if;
  insert into identity.place (place_id, investigation_id, name_cipher, name_token)
  select p.id, p.investigation_id, u.cipher, u.token
  from unnest(p_places, p_ciphers, p_tokens) as u (id, cipher, token)
  join core.place p on p.id = u.id and p.investigation_id = c.investigation_id;
  get diagnostics v_count = row_count;
  if v_count < cardinality(p_places) then
    raise insufficient_privilege using message = 'no context';
  end if;
end $$;
