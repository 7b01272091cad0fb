-- Keeps an invitation into the acting investigation and the sealed letter that carries its token. An
-- earlier one for the same address and role ends with it: one live link each. False when too many
-- were sent in the last hour, so that a stolen session cannot flood other people's mailboxes.
create or replace function auth.invite(
  p_id uuid, p_email text, p_role text, p_team uuid, p_token_hash text, p_mail uuid, p_sealed bytea)
returns boolean
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.role is null or c.role not in ('supervisor', 'officer')
     or p_role not in ('tracer', 'supervisor', 'epidemiologist', 'officer')
     or (p_team is not null and not exists (
       select 1 from core.team t where t.id = p_team and t.investigation_id = c.investigation_id))
     -- What is for practice sends nothing.
     or exists (select 1 from core.investigation v where v.id = c.investigation_id and v.practice) then
    raise insufficient_privilege;
  end if;
  if (select count(*) from auth.invitation i
      where i.recorded_by = c.account_id and i.recorded_at > now() - interval '1 hour') >= 100 then
    return false;
  end if;
  delete from auth.invitation i
  where i.kind = 'invitation' and i.investigation_id = c.investigation_id and i.role = p_role
    and lower(i.email) = lower(p_email) and i.used_at is null;
  insert into auth.invitation
    (id, token_hash, kind, email, investigation_id, role, team_id, expires_at, recorded_by)
  values (p_id, p_token_hash, 'invitation', p_email, c.investigation_id, p_role, p_team,
    now() + interval '72 hours', c.account_id);
  insert into auth.mail (id, sealed, expires_at) values (p_mail, p_sealed, now() + interval '72 hours');
  return true;
end $$;

-- Takes back an open invitation of the acting investigation: its link opens nothing from now on.
-- False when there is none.
create or replace function auth.withdraw_invitation(p_id uuid) returns boolean
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select * into c from core.ctx();
  if c.role is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege;
  end if;
  delete from auth.invitation i
  where i.id = p_id and i.kind = 'invitation' and i.investigation_id = c.investigation_id
    and i.used_at is null and i.expires_at > now();
  return found;
end $$;
