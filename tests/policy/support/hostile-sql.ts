interface Names {
  person: string;
  hidden: string;
  foreign: string;
  elsewhere: string;
  otherAccount: string;
  otherNonce: string;
}

interface Hostile {
  what: string;
  sql: string;
  /** What may come of it when it is not refused; left out, it must be refused. */
  harmless?: (rows: readonly Record<string, unknown>[], count: number) => boolean;
}

const noRows = (rows: readonly unknown[]) => rows.length === 0;
const noChange = (_rows: readonly unknown[], count: number) => count === 0;

/** What an injected statement might try, as whichever role login it runs. */
export function HOSTILE(names: Names): Hostile[] {
  const login = (role: string) => `strandline_${role}`;
  const become = ["tracer", "supervisor", "epidemiologist", "officer", "auth", "system", "owner"];
  return [
    ...become.flatMap((role) => [
      {
        what: `becoming ${role}`,
        sql: `set local role ${login(role)}; select current_user as who, count(*)::int as n from identity.person`,
      },
      {
        what: `a session as ${role}`,
        sql: `set session authorization ${login(role)}; select count(*)::int as n from identity.person`,
      },
      {
        what: `${role} by set_config`,
        sql: `select set_config('role', '${login(role)}', true); select count(*)::int as n from identity.person`,
      },
    ]),
    {
      what: "a context of somebody else's login",
      sql: `select set_config('app.ctx', '${names.otherNonce}', true); select id from core.person`,
      harmless: noRows,
    },
    {
      what: "a context that is no id",
      sql: "select set_config('app.ctx', $$' or true --$$, true); select id from core.person",
      harmless: noRows,
    },
    { what: "reading contexts", sql: "select nonce from auth.ctx_live" },
    { what: "reading passwords", sql: "select password_hash from auth.account" },
    { what: "reading the server's passwords", sql: "select rolpassword from pg_authid" },
    {
      what: "switching row security off",
      sql: `set local row_security = off; select id from core.person where id = '${names.foreign}'`,
    },
    {
      what: "another investigation by condition",
      sql: `select id from core.person where investigation_id = '${names.elsewhere}'`,
      harmless: noRows,
    },
    {
      what: "another investigation by union",
      sql: `select id from core.person where false union all
            select id from core.person where id = '${names.foreign}'`,
      harmless: noRows,
    },
    { what: "copying identity out", sql: "copy identity.person to stdout" },
    { what: "a program of the server", sql: "copy (select 1) to program 'true'" },
    { what: "a file of the server", sql: "select pg_read_file('postgresql.conf')" },
    { what: "a listing of the server", sql: "select pg_ls_dir('.')" },
    { what: "a file by large object", sql: "select lo_import('/etc/hostname')" },
    {
      what: "statistics of identity",
      sql: "select * from pg_stats where schemaname in ('identity', 'auth')",
      harmless: noRows,
    },
    { what: "raw statistics", sql: "select * from pg_statistic" },
    {
      what: "statements of others",
      sql: `select query from pg_stat_activity where usename <> current_user and usename is not null
            and query not in ('<insufficient privilege>', '')`,
      harmless: noRows,
    },
    { what: "the settings' file", sql: "select * from pg_hba_file_rules" },
    { what: "a table of one's own", sql: "create table core.mine (id int)" },
    { what: "a temporary table", sql: "create temporary table mine (id int)" },
    {
      what: "a type under the owner's feet",
      sql: "create domain pg_temp.uuid as pg_catalog.uuid check (true)",
    },
    {
      what: "a temporary function",
      sql: "create function pg_temp.f() returns int language sql as 'select 1'",
    },
    {
      what: "a function in public",
      sql: "create function public.f() returns int language sql as 'select 1'",
    },
    { what: "a schema", sql: "create schema mine" },
    { what: "an extension", sql: "create extension if not exists dblink" },
    { what: "a view around the policy", sql: "create view core.v as select * from core.person" },
    { what: "dropping a policy", sql: "drop policy read_tracer on core.person" },
    {
      what: "switching the policy off",
      sql: "alter table core.person disable row level security",
    },
    {
      what: "taking the table",
      sql: "alter table core.person owner to current_user",
    },
    {
      what: "granting oneself",
      sql: "grant select on identity.person to current_user",
      // PostgreSQL answers a grant of nothing with a warning only.
      harmless: () => false,
    },
    { what: "joining the owner", sql: `grant ${login("owner")} to current_user` },
    { what: "a login of one's own", sql: "create role mine superuser login" },
    {
      what: "lifting oneself",
      sql: "do $$ begin execute format('alter role %I superuser', current_user); end $$",
    },
    {
      what: "a block that swallows refusals",
      sql: `do $$ begin execute 'set local role ${login("owner")}'; exception when others then null; end $$;
            select count(*)::int as n from identity.person`,
    },
    {
      what: "giving oneself a field",
      sql: "insert into auth.field_right (role, field) values ('epidemiologist', 'name')",
    },
    {
      what: "joining another investigation",
      sql: `insert into core.member (id, investigation_id, account_id, role)
            values (gen_random_uuid(), '${names.elsewhere}', '${names.otherAccount}', 'officer')`,
    },
    {
      what: "a person of another investigation",
      sql: `insert into core.person (id, investigation_id, study_number, recorded_by)
            values (gen_random_uuid(), '${names.elsewhere}', 'X-1', core.ctx_user())`,
    },
    {
      what: "changing a person of another investigation",
      sql: `update core.person set area = 'X' where id = '${names.foreign}'`,
      harmless: noChange,
    },
    {
      what: "moving people to another investigation",
      sql: `update core.person set investigation_id = '${names.elsewhere}'`,
    },
    {
      what: "clearing the line list",
      sql: "delete from core.person",
    },
    { what: "emptying a table", sql: "truncate core.person cascade" },
    { what: "emptying the access record", sql: "truncate audit.event" },
    { what: "rewriting the access record", sql: "update audit.event set account_id = null" },
    { what: "deleting from the access record", sql: "delete from audit.event" },
    {
      what: "an event in another's name",
      sql: `insert into audit.event (investigation_id, account_id, role, action)
            values (core.ctx_investigation(), '${names.otherAccount}', 'officer', 'person.opened')`,
    },
    {
      what: "an event in another investigation",
      sql: `insert into audit.event (investigation_id, account_id, role, action)
            values ('${names.elsewhere}', core.ctx_user(), 'officer', 'person.opened')`,
    },
    {
      what: "opening a person of another investigation",
      sql: `select * from identity.open_people(array['${names.foreign}']::uuid[], '{ref}', 'x')`,
      harmless: noRows,
    },
    {
      what: "writing identity in another investigation",
      sql: `select identity.put_people('[{"person_id":"${names.foreign}","has":["name"],"name_cipher":"AAAA"}]', '[]', '{}')`,
    },
    {
      what: "adding identity in another investigation",
      sql: `select identity.add_people(array['${names.foreign}']::uuid[], '{NULL}', '{NULL}', '{AAAA}',
              '{X}', '{NULL}', '{NULL}', '{NULL}', '{NULL}', '{NULL}', '{NULL}', '{NULL}', '{NULL}',
              '{}', '{}', '{}')`,
    },
    {
      what: "a search token for nobody of the batch",
      sql: `select identity.add_people('{}', '{}', '{}', '{}', '{}', '{}', '{}', '{}', '{}', '{}', '{}',
              '{}', '{}', '{1}', '{1}', '{AAAA}')`,
    },
    {
      what: "naming a household of another investigation",
      sql: `select identity.put_places((select array_agg(id) from (
              values ('${names.foreign}'::uuid)) as v (id)), '{AAAA}', '{AAAA}')`,
    },
    {
      what: "the data key of another investigation",
      sql: `select wrapped_key from identity.data_key where investigation_id = '${names.elsewhere}'`,
    },
    {
      what: "a household's name of another investigation",
      sql: `select * from identity.open_places(
              (select array_agg(id) from core.place where investigation_id = '${names.elsewhere}'))`,
      harmless: noRows,
    },
    {
      what: "another login's connection ended",
      sql: `select pg_terminate_backend(pid) from pg_stat_activity where usename <> current_user`,
    },
    { what: "a setting of the server", sql: "alter system set log_statement = 'all'" },
    { what: "statements into the log", sql: "set local log_statement = 'all'" },
    { what: "parameters into the log", sql: "set local log_min_error_statement = 'error'" },
  ];
}
