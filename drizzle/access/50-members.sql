-- The account of one e-mail, to make it a member. A function and not a view: a login that could list
-- accounts would learn who works in other investigations.
create or replace function core.account_of_email(p_email text)
returns table (id uuid, demo boolean)
language sql stable security definer set search_path = pg_catalog, pg_temp as $$
  select a.id, a.demo from auth.account a
  where lower(a.email) = lower(p_email) and a.disabled_at is null
    and (select core.ctx_role()) in ('supervisor', 'officer')
$$;
