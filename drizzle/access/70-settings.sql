-- Is somebody of the demo a member here? They work in invented investigations only, so the mark stays
-- while they do.
create or replace function core.has_demo_members() returns boolean
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select exists (
    select 1 from core.member m join auth.account a on a.id = m.account_id
    where m.investigation_id = core.ctx_investigation() and m.ended_at is null and a.demo)
$$;

-- Empties the acting investigation, which must be one for practice: everything that was recorded in
-- it. Its settings and their history, case definitions, teams, members, key and access record stay.
-- The graph version goes on, so that live graphs notice. Serialised with filling by a lock.
create or replace function core.empty_practice() returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp as $$
declare
  c record;
  v_id uuid;
begin
  select * into c from core.ctx();
  if c.role is distinct from 'supervisor' then
    raise insufficient_privilege using message = 'no context';
  end if;
  select i.id into v_id from core.investigation i
  where i.id = c.investigation_id and i.practice and i.invented for update;
  if v_id is null then
    raise insufficient_privilege using message = 'not for practice';
  end if;
  delete from identity.follow_check t where t.investigation_id = v_id;
  delete from identity.interview_draft t where t.investigation_id = v_id;
  delete from identity.import_stage t where t.investigation_id = v_id;
  delete from identity.import_match t where t.investigation_id = v_id;
  delete from identity.ref_alias t where t.investigation_id = v_id;
  delete from identity.export_part t where t.investigation_id = v_id;
  delete from core.export t where t.investigation_id = v_id;
  delete from core.compare_run t where t.investigation_id = v_id;
  delete from identity.search_token t where t.investigation_id = v_id;
  delete from identity.person t where t.investigation_id = v_id;
  delete from core.follow_check t where t.investigation_id = v_id;
  delete from core.follow_end t where t.investigation_id = v_id;
  delete from core.follow_up t where t.investigation_id = v_id;
  delete from core.match_review t where t.investigation_id = v_id;
  delete from core.classification t where t.investigation_id = v_id;
  delete from core.test_result t where t.investigation_id = v_id;
  delete from core.group_exposure t where t.investigation_id = v_id;
  delete from core.exposure t where t.investigation_id = v_id;
  delete from core.contact_pair t where t.investigation_id = v_id;
  delete from core.interview t where t.investigation_id = v_id;
  delete from core.import t where t.investigation_id = v_id;
  delete from core.person t where t.investigation_id = v_id;
  delete from identity.place t where t.investigation_id = v_id;
  delete from core.place t where t.investigation_id = v_id;
  update core.investigation i set next_number = 1 where i.id = v_id;
end $$;
