-- What the due list needs of everyone under follow-up stands in core.follow_up. It is derived, and
-- kept in the transaction of whatever it is derived from by triggers, whoever writes: forms, files,
-- seeds, a merge. All of it is set-based. The planner is held to indexes and to the order in which the
-- joins are written: statistics know nothing of tables that a long import is still filling. People
-- are asked by id whether they are withdrawn in a form that the partial indexes of the line list do
-- not answer to, since one of those read whole looks as cheap as the key.

-- Day 0 of these people: the latest last exposure day to a case (or to someone not yet classified)
-- over all their pairs, because one contact has one follow-up whoever named them. Partial and missing
-- days give no day 0. A person not yet classified counts as a contact once a case has named them.
-- Contacts who became a case, or were found to be none, keep their day 0 and with it their history;
-- what they themselves told does not move it. Who is no contact is left out.
create or replace function core.day_zero_of(p_people uuid[])
returns table (person_id uuid, day_zero text)
language plpgsql stable set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
begin
  return query
    with who as (
      select distinct p.id, p.classification from unnest(p_people) u (id)
      join core.person p on p.id = u.id and coalesce(p.withdrawn_at, 'infinity') = 'infinity'
      where p.classification = 'contact' or p.classification is null or p.became_case
        or p.classification = 'not_a_case' and exists (select 1 from core.classification k
          where k.person_id = p.id and k.classification = 'contact'))
    select w.id, t.day_zero from who w
    cross join lateral (
      select count(*) as told,
        max(e.last_exposure) filter (where e.last_exposure ~ '^\d{4}-\d{2}-\d{2}$') as day_zero
      from (
        select cp.id, cp.person_b as source from core.contact_pair cp
        where cp.person_a = w.id and cp.withdrawn_at is null
        union all
        select cp.id, cp.person_a from core.contact_pair cp
        where cp.person_b = w.id and cp.withdrawn_at is null) s
      join core.person q on q.id = s.source and coalesce(q.withdrawn_at, 'infinity') = 'infinity'
      join core.exposure e on e.pair_id = s.id and e.withdrawn_at is null
      where q.classification in ('confirmed', 'probable', 'suspected')
          and (w.classification = 'contact' or e.named_by = q.id
            or w.classification is not null and e.named_by is distinct from w.id)
        or q.classification is null and w.classification = 'contact') t
    where w.classification = 'contact' or t.told > 0;
end $$;

-- Who stands with whom: people of a household, and people who share a telephone number; the latter
-- with the household of one of them, where any has one. Brings the words of these people, and of
-- whoever shares a number with them, up to date.
create or replace function core.refresh_together(p_people uuid[]) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
begin
  -- No two of these parts are joined with each other: of a whole investigation that would not end.
  with tokens as (
    select distinct t.investigation_id, t.token from unnest(p_people) u (id)
    join identity.search_token t on t.person_id = u.id and t.kind = 1),
  members as (
    select f.person_id, count(*) over k as holders, min(h.number) over k as home,
      min(f.person_id::text) over k as first
    from tokens k
    join identity.search_token t on t.investigation_id = k.investigation_id and t.token = k.token
      and t.kind = 1
    join core.follow_up f on f.person_id = t.person_id
    join core.person p on p.id = f.person_id
    left join core.place h on h.id = p.household_id
    window k as (partition by k.investigation_id, k.token)),
  touched as (
    select x.person_id, min(x.home) as home, min(x.first) as first from (
      select u.id as person_id, null::integer as home, null::text as first
      from unnest(p_people) u (id)
      union all
      select m.person_id, case when m.holders > 1 then m.home end,
        case when m.holders > 1 then m.first end
      from members m) x
    group by x.person_id),
  worded as (
    select f.person_id, case
        when t.home is not null or h.number is not null
          then 'household-' || coalesce(t.home, h.number)
        when t.first is not null then 'phone-' || t.first end as word
    from touched t
    join core.follow_up f on f.person_id = t.person_id
    join core.person p on p.id = f.person_id
    left join core.place h on h.id = p.household_id)
  update core.follow_up f set together = w.word from worded w
  where f.person_id = w.person_id and f.together is distinct from w.word;
end $$;

-- Derives the rows of these people anew. The rows are locked first and read in a statement of its
-- own afterwards, so that of two who change one contact at once the second sees what the first did.
create or replace function core.refresh_follow_up(p_people uuid[]) returns void
language plpgsql volatile security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
declare
  v_gone uuid[];
  v_new uuid[];
begin
  perform 1 from core.follow_up f where f.person_id = any (p_people) order by f.person_id for update;
  with due as materialized (select d.person_id, d.day_zero from core.day_zero_of(p_people) d),
  facts as materialized (
    select p.id, p.investigation_id, d.day_zero,
      (p.classification is null or p.classification = 'contact') and not exists (
        select 1 from core.follow_end e
        where e.person_id = p.id and e.withdrawn_at is null) as open,
      exists (select 1 from core.follow_check y
        where y.person_id = p.id and y.symptoms = 'yes' and y.withdrawn_at is null and not exists (
          select 1 from core.follow_check n where n.person_id = y.person_id
            and n.day > y.day and n.symptoms = 'no' and n.withdrawn_at is null)) as symptomatic
    from due d join core.person p on p.id = d.person_id),
  gone as (
    delete from core.follow_up f using (
      select u.id from unnest(p_people) u (id) except select x.id from facts x) o
    where f.person_id = o.id returning f.person_id),
  put as (
    insert into core.follow_up as f (person_id, investigation_id, day_zero, open, symptomatic)
    select x.id, x.investigation_id, x.day_zero, x.open, x.symptomatic from facts x
    on conflict (person_id) do update set day_zero = excluded.day_zero, open = excluded.open,
        symptomatic = excluded.symptomatic
      where (f.day_zero, f.open, f.symptomatic)
        is distinct from (excluded.day_zero, excluded.open, excluded.symptomatic)
    returning f.person_id, f.together)
  select (select array_agg(g.person_id) from gone g),
    (select array_agg(n.person_id) from put n where n.together is null) into v_gone, v_new;
  if v_gone is not null or v_new is not null then
    perform core.refresh_together(v_gone || v_new);
  end if;
end $$;

-- New tellings can only bring a contact in or move day 0 forward, so the others need not be read.
create or replace function core.exposures_added() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
declare v_missing uuid[];
begin
  with told as materialized (
    select p.id,
      max(e.last_exposure) filter (where e.last_exposure ~ '^\d{4}-\d{2}-\d{2}$') as day_zero
    from fresh e
    join core.contact_pair cp on cp.id = e.pair_id and cp.withdrawn_at is null
    cross join lateral (values (cp.person_a, cp.person_b), (cp.person_b, cp.person_a))
      s (contact, source)
    join core.person p on p.id = s.contact and coalesce(p.withdrawn_at, 'infinity') = 'infinity'
      and (p.classification is null or p.classification in ('contact', 'not_a_case')
        or p.became_case)
    join core.person q on q.id = s.source and coalesce(q.withdrawn_at, 'infinity') = 'infinity'
    where e.withdrawn_at is null and (
      q.classification in ('confirmed', 'probable', 'suspected')
        and (p.classification = 'contact' or e.named_by = q.id
          or p.classification is not null and e.named_by is distinct from p.id)
      or q.classification is null and p.classification = 'contact')
    group by p.id),
  moved as (
    update core.follow_up f set day_zero = greatest(f.day_zero, t.day_zero) from told t
    where f.person_id = t.id and t.day_zero > coalesce(f.day_zero, ''))
  select array_agg(t.id) into v_missing from told t
  where not exists (select 1 from core.follow_up f where f.person_id = t.id);
  if v_missing is not null then perform core.refresh_follow_up(v_missing); end if;
  return null;
end $$;

create or replace function core.exposures_changed() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
declare v_people uuid[];
begin
  with changed as (
    select o.pair_id as was, n.pair_id as now from before o join after n on n.id = o.id
    where (o.withdrawn_at is null, o.last_exposure, o.named_by, o.pair_id)
      is distinct from (n.withdrawn_at is null, n.last_exposure, n.named_by, n.pair_id))
  select array_agg(distinct s.id) into v_people from changed c
  join core.contact_pair cp on cp.id in (c.was, c.now)
  cross join lateral (values (cp.person_a), (cp.person_b)) s (id);
  if v_people is not null then perform core.refresh_follow_up(v_people); end if;
  return null;
end $$;

create or replace function core.pairs_changed() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
declare v_people uuid[];
begin
  select array_agg(distinct s.id) into v_people
  from before o join after n on n.id = o.id
  cross join lateral (values (n.person_a), (n.person_b), (o.person_a), (o.person_b)) s (id)
  where (o.withdrawn_at is null, o.person_a, o.person_b)
    is distinct from (n.withdrawn_at is null, n.person_a, n.person_b);
  if v_people is not null then perform core.refresh_follow_up(v_people); end if;
  return null;
end $$;

-- Nobody new has been named yet, nor has a number.
create or replace function core.people_added() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
begin
  insert into core.follow_up (person_id, investigation_id, together)
  select n.id, n.investigation_id, 'household-' || h.number
  from fresh n left join core.place h on h.id = n.household_id
  where n.classification = 'contact' and n.withdrawn_at is null
  on conflict do nothing;
  return null;
end $$;

create or replace function core.people_changed() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
declare
  v_own uuid[];
  v_near uuid[];
  v_moved uuid[];
begin
  with changed as materialized (
    select n.id,
      (o.classification, o.became_case, o.withdrawn_at is null)
        is distinct from (n.classification, n.became_case, n.withdrawn_at is null) as own,
      -- To those met it matters only whether this is a case, may be one, or is none.
      (o.classification in ('confirmed', 'probable', 'suspected'), o.withdrawn_at is null)
        is distinct from
        (n.classification in ('confirmed', 'probable', 'suspected'), n.withdrawn_at is null)
        as near,
      o.household_id is distinct from n.household_id as moved
    from before o join after n on n.id = o.id)
  select array_agg(c.id) filter (where c.own), array_agg(c.id) filter (where c.near),
    array_agg(c.id) filter (where c.moved) into v_own, v_near, v_moved from changed c;
  if v_near is not null then
    select array_agg(s.id) into v_near from (
      select cp.person_b as id from unnest(v_near) u (id)
      join core.contact_pair cp on cp.person_a = u.id
      union
      select cp.person_a from unnest(v_near) u (id)
      join core.contact_pair cp on cp.person_b = u.id) s;
  end if;
  if v_own is not null or v_near is not null then
    perform core.refresh_follow_up(v_own || v_near);
  end if;
  if v_moved is not null then perform core.refresh_together(v_moved); end if;
  return null;
end $$;

-- Only of somebody found to be no case does the history decide whether they were a contact.
create or replace function core.classifications_added() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
declare v_people uuid[];
begin
  select array_agg(distinct p.id) into v_people from fresh n
  join core.person p on p.id = n.person_id and p.classification = 'not_a_case'
  where n.classification = 'contact'
    and not exists (select 1 from core.follow_up f where f.person_id = p.id);
  if v_people is not null then perform core.refresh_follow_up(v_people); end if;
  return null;
end $$;

create or replace function core.checks_written() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
declare v_people uuid[];
begin
  select array_agg(distinct n.person_id) into v_people from fresh n
  where n.symptoms in ('yes', 'no');
  if v_people is null then return null; end if;
  perform 1 from core.follow_up f where f.person_id = any (v_people) order by f.person_id for update;
  update core.follow_up f set symptomatic = s.now
  from unnest(v_people) u (id)
  cross join lateral (
    select exists (select 1 from core.follow_check y
      where y.person_id = u.id and y.symptoms = 'yes' and y.withdrawn_at is null and not exists (
        select 1 from core.follow_check n where n.person_id = y.person_id
          and n.day > y.day and n.symptoms = 'no' and n.withdrawn_at is null)) as now) s
  where f.person_id = u.id and f.symptomatic <> s.now;
  return null;
end $$;

create or replace function core.ends_written() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
begin
  perform core.refresh_follow_up(array(select distinct n.person_id from fresh n));
  return null;
end $$;

-- A number that nobody else has changes nothing for anybody.
create or replace function identity.tokens_added() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
declare v_people uuid[];
begin
  select array_agg(distinct n.person_id) into v_people from fresh n
  where n.kind = 1 and exists (select 1 from identity.search_token o
    where o.investigation_id = n.investigation_id and o.token = n.token and o.kind = 1
      and o.person_id <> n.person_id);
  if v_people is not null then perform core.refresh_together(v_people); end if;
  return null;
end $$;

create or replace function identity.tokens_dropped() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp
set enable_seqscan = off set enable_hashjoin = off set enable_mergejoin = off
set join_collapse_limit = 1 as $$
declare v_people uuid[];
begin
  select array_agg(s.id) into v_people from (
    select d.person_id as id from dropped d where d.kind = 1
    union
    select o.person_id from dropped d join identity.search_token o
      on o.investigation_id = d.investigation_id and o.token = d.token and o.kind = 1
    where d.kind = 1) s;
  if v_people is not null then perform core.refresh_together(v_people); end if;
  return null;
end $$;

create or replace trigger follow_up_added after insert on core.exposure
  referencing new table as fresh for each statement execute function core.exposures_added();
create or replace trigger follow_up_changed after update on core.exposure
  referencing old table as before new table as after
  for each statement execute function core.exposures_changed();
create or replace trigger follow_up_changed after update on core.contact_pair
  referencing old table as before new table as after
  for each statement execute function core.pairs_changed();
create or replace trigger follow_up_added after insert on core.person
  referencing new table as fresh for each statement execute function core.people_added();
create or replace trigger follow_up_changed after update on core.person
  referencing old table as before new table as after
  for each statement execute function core.people_changed();
create or replace trigger follow_up_added after insert on core.classification
  referencing new table as fresh for each statement execute function core.classifications_added();
create or replace trigger follow_up_added after insert on core.follow_check
  referencing new table as fresh for each statement execute function core.checks_written();
create or replace trigger follow_up_changed after update on core.follow_check
  referencing new table as fresh for each statement execute function core.checks_written();
create or replace trigger follow_up_added after insert on core.follow_end
  referencing new table as fresh for each statement execute function core.ends_written();
create or replace trigger follow_up_changed after update on core.follow_end
  referencing new table as fresh for each statement execute function core.ends_written();
create or replace trigger follow_up_added after insert on identity.search_token
  referencing new table as fresh for each statement execute function identity.tokens_added();
create or replace trigger follow_up_dropped after delete on identity.search_token
  referencing old table as dropped for each statement execute function identity.tokens_dropped();

-- What was on record before there was this table, once.
do $$ begin
  if not exists (select 1 from core.follow_up) then
    perform core.refresh_follow_up(array(select p.id from core.person p));
  end if;
end $$;
