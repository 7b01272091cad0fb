import pg from "pg";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { applyAccess } from "../../server/db/access/apply-access.ts";
import { ALL_TABLES, loginOf } from "../../server/db/access/policies.ts";
import { createPools, endPools, type Pools } from "../../server/db/pools.ts";
import { LOGIN_NAMES } from "../../server/db/roles.ts";
import { FIELDS, readableColumns } from "../../shared/fields.ts";
import { ROLES } from "../../shared/roles.ts";
import { createTestDatabase, TEST_PASSWORDS, type TestDatabase } from "../support/database.ts";

let database: TestDatabase;
let admin: pg.Client;
let pools: Pools;

beforeAll(async () => {
  database = await createTestDatabase(inject("adminUrl"));
  admin = new pg.Client({ connectionString: database.adminUrl });
  await admin.connect();
  pools = createPools(database.adminUrl, TEST_PASSWORDS, () => {});
});

afterAll(async () => {
  await endPools(pools);
  await admin?.end();
  await database?.drop();
});

const SCHEMAS = ["core", "identity", "auth", "audit"];

async function columns(): Promise<{ table: string; column: string }[]> {
  const found = await admin.query(
    `select table_schema || '.' || table_name as table, column_name as column
     from information_schema.columns where table_schema = any ($1) order by 1, ordinal_position`,
    [SCHEMAS],
  );
  return found.rows;
}

test("every column of core and identity is in the registry, and the registry names no other", async () => {
  const stored = (await columns())
    .filter(({ table }) => /^(core|identity)\./.test(table))
    .map(({ table, column }) => `${table}.${column}`);
  const listed = FIELDS.map(({ table, column }) => `${table}.${column}`);
  expect(new Set(listed).size).toBe(listed.length);
  expect([...listed].sort()).toEqual([...stored].sort());
});

test("every table is listed, has row security on and forced, and belongs to the owner", async () => {
  const found = await admin.query(
    `select n.nspname || '.' || c.relname as name, c.relrowsecurity as on, c.relforcerowsecurity as forced,
       pg_get_userbyid(c.relowner) as owner
     from pg_class c join pg_namespace n on n.oid = c.relnamespace
     where n.nspname = any ($1) and c.relkind in ('r', 'p') order by 1`,
    [SCHEMAS],
  );
  expect(found.rows.map((row) => row.name).sort()).toEqual([...ALL_TABLES].sort());
  for (const row of found.rows) {
    expect(row).toMatchObject({ on: true, forced: true, owner: "strandline_owner" });
  }
});

test("no policy lets a role login through without a context", async () => {
  const found = await admin.query(
    `select schemaname || '.' || tablename as table, policyname, roles::text[] as roles,
       coalesce(qual, '') || ' ' || coalesce(with_check, '') as says from pg_policies
     where schemaname = any ($1)`,
    [SCHEMAS],
  );
  const roleLogins = new Set<string>(ROLES.map(loginOf));
  const open = found.rows.filter(
    (row) =>
      row.roles.some((role: string) => roleLogins.has(role) || role === "public") &&
      !row.says.includes("ctx_") &&
      row.says.trim() !== "false",
  );
  expect(open).toEqual([]);
});

test("logins are nobody's members and nobody's masters, and can bypass nothing", async () => {
  const found = await admin.query(
    `select rolname, rolsuper, rolbypassrls, rolinherit, rolcreaterole, rolcreatedb, rolreplication,
       (select count(*)::int from pg_auth_members m where m.member = r.oid or m.roleid = r.oid) as ties
     from pg_roles r where rolname = any ($1)`,
    [LOGIN_NAMES.map(loginOf)],
  );
  expect(found.rows).toHaveLength(LOGIN_NAMES.length);
  for (const row of found.rows) {
    expect(row, row.rolname).toMatchObject({
      rolsuper: false,
      rolbypassrls: false,
      rolinherit: false,
      rolcreaterole: false,
      rolcreatedb: false,
      rolreplication: false,
      ties: 0,
    });
  }
});

test("functions of the owner pin their search path, temporary objects last, and are nobody's by default", async () => {
  const found = await admin.query(
    `select p.oid::regprocedure::text as name, p.prosecdef as definer, p.proconfig as config,
       pg_get_userbyid(p.proowner) as owner,
       exists (select 1 from unnest($2::name[]) as l (login)
         where has_function_privilege(l.login, p.oid, 'execute')) as called,
       coalesce(exists (select 1 from aclexplode(coalesce(p.proacl, acldefault('f', p.proowner))) a
         where a.grantee = 0), false) as public
     from pg_proc p join pg_namespace n on n.oid = p.pronamespace where n.nspname = any ($1)`,
    [SCHEMAS, LOGIN_NAMES.map(loginOf)],
  );
  expect(found.rows.length).toBeGreaterThan(20);
  for (const row of found.rows) {
    expect(row, row.name).toMatchObject({ owner: "strandline_owner", public: false });
    if (row.called) expect(row.definer, row.name).toBe(true);
    expect(row.config, row.name).toContain("search_path=pg_catalog, pg_temp");
  }
});

test("nobody but the administrator may make temporary objects or new ones in any schema", async () => {
  const found = await admin.query(
    `select l.login, has_database_privilege(l.login, current_database(), 'temporary') as temporary,
       has_database_privilege(l.login, current_database(), 'create') as schemas,
       array(select n.nspname::text from pg_namespace n where has_schema_privilege(l.login, n.oid, 'create')) as create
     from unnest($1::name[]) as l (login)`,
    [LOGIN_NAMES.map(loginOf)],
  );
  for (const row of found.rows) {
    expect(row, row.login).toMatchObject({ temporary: false, schemas: false, create: [] });
  }
});

test("a login may select exactly the columns the registry gives its role in full", async () => {
  for (const role of ROLES) {
    const client = await pools[role].connect();
    try {
      const allowed = new Set<string>(
        role === "officer"
          ? (await columns()).filter(({ table }) => table === "audit.event").map(name)
          : [],
      );
      for (const table of new Set(FIELDS.map((field) => field.table))) {
        if (!table.startsWith("core.")) continue;
        for (const column of readableColumns(table, role)) allowed.add(`${table}.${column}`);
      }
      const opened: string[] = [];
      for (const { table, column } of await columns()) {
        const state = await client.query(`select "${column}" from ${table} limit 1`).then(
          () => null,
          (error: { code: string }) => error.code,
        );
        if (state === null) opened.push(`${table}.${column}`);
        else expect([state, table, column]).toEqual(["42501", table, column]);
      }
      expect(opened.sort(), role).toEqual([...allowed].sort());
    } finally {
      client.release();
    }
  }
});

test("the logins of accounts and of background work reach no identity either", async () => {
  const readable = async (login: string) => {
    const found = await admin.query(
      `select distinct table_schema || '.' || table_name as name from information_schema.columns c
       where table_schema in ('identity', 'auth', 'views', 'audit')
         and has_column_privilege($1, format('%I.%I', table_schema, table_name), column_name, 'select')
       order by 1`,
      [login],
    );
    return found.rows.map((row) => row.name);
  };
  expect(await readable(loginOf("system"))).toEqual([]);
  // Wrapped data keys only: the accounts login makes one with each investigation.
  const accounts = (await readable(loginOf("auth"))).filter((one) => !one.startsWith("auth."));
  expect(accounts).toEqual(["identity.data_key"]);
});

function name({ table, column }: { table: string; column: string }): string {
  return `${table}.${column}`;
}

test("a start takes back what was granted, opened or switched off behind the registry's back", async () => {
  await admin.query(`grant select (name_cipher) on identity.person to strandline_tracer, public;
    grant select on core.outbox to strandline_officer;
    grant execute on function identity.open_people(uuid[], text[], text) to strandline_epidemiologist;
    create policy wide on core.person for select to strandline_tracer using (true);
    alter table audit.event no force row level security;
    insert into auth.field_right (role, field) values ('officer', 'note')`);
  await applyAccess(admin);
  const found = await admin.query(`select
    has_column_privilege('strandline_tracer', 'identity.person', 'name_cipher', 'select') as cipher,
    has_any_column_privilege('strandline_officer', 'core.outbox', 'select') as outbox,
    has_function_privilege('strandline_epidemiologist',
      'identity.open_people(uuid[], text[], text)', 'execute') as opening,
    exists (select 1 from pg_policies where policyname = 'wide') as wide,
    not (select relforcerowsecurity from pg_class where oid = 'audit.event'::regclass) as unforced,
    exists (select 1 from auth.field_right where role = 'officer' and field = 'note') as note`);
  expect(found.rows[0]).toEqual({
    cipher: false,
    outbox: false,
    opening: false,
    wide: false,
    unforced: false,
    note: false,
  });
});

test("views belong to one role each and keep a barrier against leaking functions", async () => {
  const found = await admin.query(
    `select c.relname as name, c.reloptions as options,
       array(select l.login::text from unnest($1::name[]) as l (login)
         where has_table_privilege(l.login, c.oid, 'select') or has_any_column_privilege(l.login, c.oid, 'select')
         order by 1) as readers
     from pg_class c join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'views'
     where c.relkind = 'v' order by 1`,
    [LOGIN_NAMES.map(loginOf)],
  );
  const readers = Object.fromEntries(found.rows.map((row) => [row.name, row.readers]));
  expect(readers).toEqual({
    field_right: ["strandline_officer"],
    invitation: ["strandline_officer", "strandline_supervisor"],
    member: ["strandline_officer", "strandline_supervisor"],
    person_officer: ["strandline_officer"],
    person_supervisor: ["strandline_supervisor"],
    person_tracer: ["strandline_tracer"],
  });
  for (const row of found.rows) expect(row.options, row.name).toEqual(["security_barrier=true"]);
});
