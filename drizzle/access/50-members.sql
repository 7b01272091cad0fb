-- The account of one e-mail, to make it a member. A function and not a view: a login that could list
-- accounts would learn who works in other investigations.
create or replace function core.account_of_email(p_email text)
returns table (id uuid, demo boolean)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select a.id, a.demo from auth.account a
  where lower(a.email) = lower(p_email) and a.disabled_at is null
    and (select core.ctx_role()) in ('supervisor', 'officer')
$$;

-- Teams of the acting investigation and what hangs on each: live members, open invitations and
-- people. Invitations lie where no role login can read them.
create or replace function core.team_use()
returns table (team_id uuid, members integer, invitations integer, people integer)
language plpgsql stable security definer set search_path = pg_catalog, pg_temp as $$
declare c record;
begin
  select x.investigation_id, x.role, v.time_zone into c from core.ctx() x
  join core.investigation v on v.id = x.investigation_id;
  if c.role is null or c.role not in ('supervisor', 'officer') then
    raise insufficient_privilege;
  end if;
  return query select t.id,
    (select count(*)::int from core.member m where m.team_id = t.id and m.ended_at is null
      and core.day_lasts(m.ends_on, c.time_zone)),
    (select count(*)::int from auth.invitation i where i.team_id = t.id and i.kind = 'invitation'
      and i.investigation_id = c.investigation_id and i.used_at is null and i.expires_at > now()
      and core.day_lasts(i.ends_on, c.time_zone)),
    (select count(*)::int from core.person p where p.assigned_team_id = t.id
      and p.withdrawn_at is null)
  from core.team t where t.investigation_id = c.investigation_id and t.removed_at is null;
end $$;
