-- Occupations of people a file names: blanks are filled, nothing is read back, since a data officer
-- may import but not read them. p_rows: [{person_id, occupation}].
create or replace function core.fill_occupations(p_import uuid, p_rows jsonb) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.account_id is null or c.role not in ('supervisor', 'officer') or not exists (
    select 1 from core.import f where f.id = p_import and f.investigation_id = c.investigation_id
      and (f.state = 'committing' or exists (
        select 1 from identity.import_match m where m.import_id = f.id))) then
    raise insufficient_privilege using message = 'no context';
  end if;
  update core.person p set occupation = r.occupation
  from jsonb_to_recordset(p_rows) as r (person_id uuid, occupation text)
  where p.id = r.person_id and p.investigation_id = c.investigation_id and p.occupation is null;
end $$;

-- Checked rows nobody committed within a day are deleted; their import says so.
create or replace function core.sweep_import_stages() returns integer
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare v_ids uuid[];
begin
  select array_agg(id) into v_ids from core.import
  where state in ('ready', 'failed') and counts ? 'stagedAt'
    and to_timestamp((counts ->> 'stagedAt')::double precision) < now() - interval '1 day';
  if v_ids is null then return 0; end if;
  delete from identity.import_stage where import_id = any (v_ids);
  delete from identity.import_match where import_id = any (v_ids);
  update core.import set state = 'failed', counts = counts - 'stagedAt' where id = any (v_ids);
  return cardinality(v_ids);
end $$;
