import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { CORE_TABLES } from "../../server/db/access/policies.ts";
import { openableKeys, readableColumns } from "../../shared/fields.ts";
import { ROLES, type Role } from "../../shared/roles.ts";
import { asLogin } from "./support/as-login.ts";
import { HOSTILE } from "./support/hostile-sql.ts";
import { contextOf, makeWorld, NAMED, PEOPLE, type World } from "./support/world.ts";

let world: World;

beforeAll(async () => {
  world = await makeWorld();
});

afterAll(async () => {
  await world?.close();
});

const readable = (role: Role) =>
  CORE_TABLES.filter((table) => readableColumns(table, role).length > 0);
const own = (role: Role) => contextOf(world.app, world.everyone[role], role);

/** Rows a login counts in each table it may read, and in its view of identities. */
async function counts(role: Role, nonce: string | null): Promise<Record<string, number>> {
  return asLogin(world.app.pools[role], nonce, async (ask) => {
    const out: Record<string, number> = {};
    const tables: string[] = [...readable(role)];
    if (role !== "epidemiologist") tables.push(`views.person_${role}`);
    if (role === "officer") tables.push("audit.event", "views.field_right");
    if (role === "officer" || role === "supervisor") tables.push("views.member");
    for (const table of tables) {
      const answer = await ask(`select count(*)::int as n from ${table}`);
      expect(answer.state, `${role} ${table}`).toBeNull();
      out[table] = answer.rows[0]?.n as number;
    }
    return out;
  });
}

const nothing = (rows: Record<string, number>) =>
  Object.entries(rows).filter(([, count]) => count !== 0);

test.each(ROLES)("as %s: rows with one's own context, none with any other", async (role) => {
  const mine = await counts(role, await own(role));
  expect(mine["core.person"]).toBe(role === "tracer" ? 4 : 5);
  expect(mine["core.investigation"]).toBe(1);

  expect(nothing(await counts(role, null)), "no context").toEqual([]);
  expect(nothing(await counts(role, randomUUID())), "a forged context").toEqual([]);
  const late = await contextOf(world.app, world.everyone[role], role, -1);
  expect(nothing(await counts(role, late)), "an expired context").toEqual([]);
  for (const other of ROLES.filter((one) => one !== role)) {
    const stolen = await own(other);
    expect(nothing(await counts(role, stolen)), `the context of ${other}`).toEqual([]);
  }
  const never = { accountId: randomUUID(), investigationId: world.here };
  const stranger = await contextOf(world.app, never, role);
  expect(nothing(await counts(role, stranger)), "no membership").toEqual([]);
});

test.each(ROLES)("as %s: a context of another investigation shows that one alone", async (role) => {
  const nonce = await contextOf(world.app, world.others[role], role);
  await asLogin(world.app.pools[role], nonce, async (ask) => {
    for (const table of readable(role)) {
      const column = table === "core.investigation" ? "id" : "investigation_id";
      const answer = await ask(`select distinct ${column}::text as id from ${table}`);
      expect(answer.state, table).toBeNull();
      for (const row of answer.rows) expect(row.id, table).toBe(world.elsewhere);
    }
  });
});

test("an ended membership ends the context with it", async () => {
  const { tracer } = world.others;
  const nonce = await contextOf(world.app, tracer, "tracer");
  const seen = () => counts("tracer", nonce);
  expect((await seen())["core.investigation"]).toBe(1);
  await world.admin.query("update core.member set ended_at = now() where id = $1", [
    tracer.memberId,
  ]);
  expect(nothing(await seen())).toEqual([]);
  await world.admin.query("update core.member set ended_at = null where id = $1", [
    tracer.memberId,
  ]);
});

test.each(ROLES)(
  "as %s: tables of identity and accounts stay shut, row or no row",
  async (role) => {
    const found = await world.admin.query(
      `select schemaname || '.' || tablename as name from pg_tables
     where schemaname in ('identity', 'auth')`,
    );
    expect(found.rows.length).toBeGreaterThan(10);
    await asLogin(world.app.pools[role], await own(role), async (ask) => {
      for (const { name } of found.rows) {
        for (const statement of [
          `select * from ${name}`,
          `select count(*) from ${name}`,
          `select 1 from ${name} limit 1`,
          `delete from ${name}`,
          `insert into ${name} default values`,
          `lock table ${name} in access share mode`,
        ]) {
          expect((await ask(statement)).state, statement).toBe("42501");
        }
      }
    });
  },
);

test("the tracer's login opens people they hold or named, no case seen from a contact", async () => {
  const all = [...Object.values(world.people), world.foreign];
  await asLogin(world.app.pools.tracer, await own("tracer"), async (ask) => {
    const opened = await ask(
      "select distinct person_id::text as id from identity.open_people($1, '{name,phone,ref}', 'person.opened')",
      [all],
    );
    expect(opened.rows.map((row) => row.id).sort()).toEqual(
      NAMED.map((name) => world.people[name]).sort(),
    );
    for (const name of PEOPLE) {
      const one = await ask("select * from identity.open_people($1, '{name}', 'person.opened')", [
        [world.people[name]],
      ]);
      expect(one.rows.length, name).toBe(NAMED.includes(name) ? 1 : 0);
    }
    const masked = await ask("select person_id::text as id from views.person_tracer");
    expect(masked.rows.map((row) => row.id).sort()).toEqual(
      NAMED.map((name) => world.people[name]).sort(),
    );
    const rows = await ask("select id::text as id from core.person");
    const visible = rows.rows.map((row) => row.id);
    expect(visible).toContain(world.people.hiddenCase);
    expect(visible).not.toContain(world.people.stranger);
  });
});

test.each(ROLES)(
  "as %s: the opening gives the registry's fields and refuses others",
  async (role) => {
    const fields = ["ref", "name", "phone", "email", "birthDate", "address", "note"];
    const everyone = Object.values(world.people);
    await asLogin(world.app.pools[role], await own(role), async (ask) => {
      for (const field of fields) {
        const answer = await ask(
          "select * from identity.open_people($1, array[$2]::text[], 'person.opened')",
          [everyone, field],
        );
        const allowed = openableKeys(role).includes(field);
        expect(answer.state, field).toBe(allowed ? null : "42501");
        if (allowed) expect(answer.rows.length, field).toBeGreaterThan(0);
        const foreign = await ask(
          "select * from identity.open_people($1, array[$2]::text[], 'person.opened')",
          [[world.foreign], field],
        );
        expect(foreign.rows).toEqual([]);
      }
      const without = await ask("select set_config('app.ctx', '', true); select 1");
      expect(without.state).toBeNull();
    });
    await asLogin(world.app.pools[role], null, async (ask) => {
      const answer = await ask("select * from identity.open_people($1, '{name}', 'x')", [everyone]);
      expect(answer.state).toBe("42501");
    });
  },
);

test("every opening leaves an event, and an opening of nobody leaves none", async () => {
  const events = () =>
    world.admin
      .query("select count(*)::int as n from audit.event where action = 'probe.opened'")
      .then((found) => found.rows[0].n as number);
  const client = await world.app.pools.tracer.connect();
  try {
    for (const [name, expected] of [
      ["held", 1],
      ["stranger", 1],
      ["hiddenCase", 1],
    ] as const) {
      await client.query("begin");
      await client.query("select set_config('app.ctx', $1, true)", [await own("tracer")]);
      await client.query("select * from identity.open_people($1, '{name}', 'probe.opened')", [
        [world.people[name]],
      ]);
      await client.query("commit");
      expect(await events(), name).toBe(expected);
    }
  } finally {
    client.release();
  }
});

test.each(ROLES)("as %s: search by token finds nobody out of scope", async (role) => {
  const found = await world.admin.query(
    "select token, person_id::text as id from identity.search_token",
  );
  expect(found.rows.length).toBeGreaterThan(20);
  const scope = new Set(
    role === "tracer" ? NAMED.map((name) => world.people[name]) : Object.values(world.people),
  );
  const allowed = role === "tracer" || role === "supervisor";
  await asLogin(world.app.pools[role], await own(role), async (ask) => {
    const answer = await ask(
      "select person_id::text as id from identity.find_people('{}', $1, 500)",
      [found.rows.map((row) => row.token)],
    );
    expect(answer.state).toBe(allowed ? null : "42501");
    if (!allowed) return;
    const met = new Set(answer.rows.map((row) => row.id as string));
    expect([...met].filter((id) => !scope.has(id))).toEqual([]);
    for (const name of NAMED) expect(met.has(world.people[name])).toBe(true);
  });
});

test.each(ROLES)("as %s: hostile statements are refused or come to nothing", async (role) => {
  // A live context of another login: of one's own it would simply be that colleague.
  const another: Role = role === "officer" ? "supervisor" : "officer";
  const names = {
    person: world.people.stranger,
    hidden: world.people.hiddenCase,
    foreign: world.foreign,
    elsewhere: world.elsewhere,
    otherAccount: world.others.officer.accountId,
    otherNonce: await contextOf(world.app, world.others[another], another),
  };
  const nonce = await own(role);
  for (const { what, sql, harmless } of HOSTILE(names)) {
    await asLogin(world.app.pools[role], nonce, async (ask) => {
      const answer = await ask(sql);
      const came = answer.state ?? `${answer.count} rows: ${JSON.stringify(answer.rows)}`;
      const refused = answer.state !== null;
      expect(refused || harmless?.(answer.rows, answer.count) === true, `${what}: ${came}`).toBe(
        true,
      );
    });
  }
});

test("a leaking function in a condition sees only rows that pass the policy", async () => {
  const notices: string[] = [];
  const client = await world.app.pools.tracer.connect();
  const hear = (notice: { message?: string | undefined }) => notices.push(notice.message ?? "");
  client.on("notice", hear);
  try {
    await client.query("begin");
    await client.query("select set_config('app.ctx', $1, true)", [await own("tracer")]);
    // An error of the conversion would carry the value of a row that the policy hides.
    const numbers = await client
      .query("select study_number from core.person where cast(study_number as integer) > 0")
      .then(
        () => "",
        (error: Error) => error.message,
      );
    const hidden = await world.admin.query("select study_number from core.person where id = $1", [
      world.people.stranger,
    ]);
    expect(numbers).toMatch(/invalid input syntax/);
    expect(numbers).not.toContain(hidden.rows[0].study_number);
    await client.query("rollback");
  } finally {
    client.off("notice", hear);
    client.release(true);
  }
  expect(notices).toEqual([]);
});
