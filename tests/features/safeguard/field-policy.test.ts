import pg from "pg";
import { afterAll, afterEach, beforeAll, expect, test } from "vitest";
import type { FieldPolicy } from "../../../shared/contracts/safeguard.ts";
import { FIELDS } from "../../../shared/fields.ts";
import { ROLES } from "../../../shared/roles.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInEveryone } from "../../support/factories.ts";

let app: TestApp;
let everyone: Record<(typeof ROLES)[number], Member>;
let admin: pg.Client;
let undo: string[] = [];

beforeAll(async () => {
  app = await startTestApp();
  everyone = await signInEveryone(app, await buildInvestigation(app));
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
});

afterEach(async () => {
  for (const statement of undo) await admin.query(statement);
  undo = [];
});

afterAll(async () => {
  await admin?.end();
  await app?.close();
});

async function policy(): Promise<FieldPolicy> {
  const answer = await everyone.officer.client.get(`${everyone.officer.base}/field-policy`);
  expect(answer.status).toBe(200);
  return answer.body;
}

/** Changes the database behind the registry's back until the end of the test. */
async function tamper(statement: string, back: string): Promise<void> {
  await admin.query(statement);
  undo.push(back);
}

const row = (answer: FieldPolicy, table: string, column: string) =>
  answer.items.find((item) => item.table === table && item.column === column);

test("registry and catalogue agree on every column and role", async () => {
  const answer = await policy();
  expect(answer.items.filter((item) => !item.agrees)).toEqual([]);
  expect(answer.disagreements).toBe(0);
  expect(answer.items).toHaveLength(FIELDS.length);
  expect(row(answer, "identity.person", "phone_cipher")).toMatchObject({
    key: "phone",
    class: "direct",
    registry: { tracer: "full", supervisor: "full", epidemiologist: "none", officer: "masked" },
    catalogue: { tracer: "full", supervisor: "full", epidemiologist: "none", officer: "masked" },
  });
  expect(row(answer, "identity.person", "birth_date_cipher")?.catalogue.officer).toBe("coarse");
});

test.each([
  {
    what: "a column granted behind the registry's back",
    statement: "grant select (occupation) on core.person to strandline_officer",
    back: "revoke select (occupation) on core.person from strandline_officer",
    at: ["core.person", "occupation", "officer", "full"],
  },
  {
    what: "a right taken away",
    statement: "revoke select (onset_date) on core.person from strandline_tracer",
    back: "grant select (onset_date) on core.person to strandline_tracer",
    at: ["core.person", "onset_date", "tracer", "none"],
  },
  {
    what: "an identity table opened to a login",
    statement: "grant select (name_cipher) on identity.person to strandline_tracer",
    back: "revoke select (name_cipher) on identity.person from strandline_tracer",
    at: ["identity.person", "name_cipher", "tracer", "direct"],
  },
  {
    what: "the opening function taken away",
    statement:
      "revoke execute on function identity.open_people(uuid[], text[], text) from strandline_supervisor",
    back: "grant execute on function identity.open_people(uuid[], text[], text) to strandline_supervisor",
    at: ["identity.person", "name_cipher", "supervisor", "masked"],
  },
  {
    what: "a field right added by hand",
    statement: "insert into auth.field_right (role, field) values ('officer', 'phone')",
    back: "delete from auth.field_right where role = 'officer' and field = 'phone'",
    at: ["identity.person", "phone_cipher", "officer", "full"],
  },
  {
    what: "a new column nobody listed",
    statement: "alter table core.person add column nickname text",
    back: "alter table core.person drop column nickname",
    at: ["core.person", "nickname", "tracer", "none"],
  },
  {
    what: "a login made a superuser",
    statement: "alter role strandline_epidemiologist superuser",
    back: "alter role strandline_epidemiologist nosuperuser",
    at: ["identity.person", "name_cipher", "epidemiologist", "direct"],
  },
] as const)("$what shows at once as a disagreement", async ({ statement, back, at }) => {
  await tamper(statement, back);
  const [table, column, role, found] = at;
  const answer = await policy();
  const item = row(answer, table, column);
  expect(item?.agrees).toBe(false);
  expect(item?.catalogue[role]).toBe(found);
  expect(answer.disagreements).toBeGreaterThan(0);
});

test("only the officer reads it, and reading it is on record", async () => {
  for (const role of ROLES) {
    const answer = await everyone[role].client.get(`${everyone[role].base}/field-policy`);
    expect(answer.status).toBe(role === "officer" ? 200 : 403);
  }
  const events = await everyone.officer.client.get(`${everyone.officer.base}/access-events`, {
    action: "field_policy.read",
  });
  expect(events.body.items[0]).toMatchObject({
    accountId: everyone.officer.accountId,
    role: "officer",
    counts: { disagreements: 0 },
  });
});
