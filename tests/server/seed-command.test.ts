import { spawn } from "node:child_process";
import { once } from "node:events";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { readArguments } from "../../scripts/seed/read-arguments.ts";
import { seed } from "../../scripts/seed/seed.ts";
import { createKeyRing } from "../../server/identity/keys.ts";
import type { NetworkSummary } from "../../shared/contracts/network.ts";
import { startTestApp, type TestApp, TestClient } from "../support/app.ts";
import { TEST_PASSWORDS } from "../support/database.ts";
import { buildAccount, buildInvestigation, PASSWORD, signInAs } from "../support/factories.ts";
import { asAdmin, register } from "../support/field-work.ts";

const root = resolve(import.meta.dirname, "../..");
const folder = mkdtempSync(join(tmpdir(), "strandline-seed-"));
const masterKey = Buffer.alloc(32, 7);
let app: TestApp;
let account: { id: string; email: string };

beforeAll(async () => {
  app = await startTestApp();
  account = await buildAccount(app);
  writeFileSync(
    join(folder, "secrets.json"),
    JSON.stringify({
      masterKey: masterKey.toString("base64"),
      sessionSecrets: ["only for this test, thrown away after"],
      logins: TEST_PASSWORDS,
    }),
  );
  await app.pools.auth.query("insert into auth.meta (key, value) values ('key_check', $1)", [
    createKeyRing(masterKey).checkValue(),
  ]);
});

afterAll(async () => {
  await app?.close();
  rmSync(folder, { recursive: true, force: true });
});

/** Loads in this process; the line of trouble, or null. */
const load = (args: string[], data = folder) => seed(app.adminUrl, data, args, () => {});

/** Runs the command as npm does. */
async function run(args: string[], data = folder) {
  const child = spawn(process.execPath, ["scripts/seed.mjs", ...args], {
    cwd: root,
    env: { PATH: process.env.PATH, DATABASE_URL: app.adminUrl, STRANDLINE_DATA: data },
  });
  let out = "";
  let err = "";
  child.stdout.on("data", (text) => {
    out += text;
  });
  child.stderr.on("data", (text) => {
    err += text;
  });
  const [code] = await once(child, "close");
  return { code: code as number, out, err };
}

const wanted = (name: string, ...more: string[]) => [
  ...["--people", "300", "--investigation", name, "--last-day", "2026-05-20"],
  ...["--member", account.email, ...more],
];

/** Every count of an investigation that the seed could touch. */
async function countsOf(id: string): Promise<Record<string, unknown>> {
  const tables = ["person", "contact_pair", "exposure", "interview", "follow_check", "member"];
  const [row] = await asAdmin<Record<string, unknown>>(
    app,
    `select ${tables
      .map((t) => `(select count(*)::int from core.${t} where investigation_id = $1) as ${t}`)
      .join(", ")}, (select graph_version::int from core.investigation where id = $1) as version`,
    [id],
  );
  return row ?? {};
}

async function idOf(name: string): Promise<string> {
  const [row] = await asAdmin<{ id: string }>(
    app,
    "select id from core.investigation where name = $1",
    [name],
  );
  return row?.id ?? "";
}

/** The account's report as of the end of the story. */
async function reportOf(id: string): Promise<NetworkSummary> {
  const client = new TestClient(app);
  await client.signIn(account.email, PASSWORD);
  const acting = { actingRole: "epidemiologist", investigationId: id };
  expect((await client.call("patch", "/api/session", { body: acting })).status).toBe(200);
  const answer = await client.get(`/api/investigations/${id}/network/summary`, {
    asOf: "2026-05-20",
  });
  expect(answer.status).toBe(200);
  return answer.body;
}

// Three outbreaks and some processes: much for a busy machine.
describe("the command", { timeout: 180_000 }, () => {
  test("fills a new invented investigation for the account named, and touches no other", async () => {
    const other = await buildInvestigation(app);
    const supervisor = await signInAs(app, "supervisor", other);
    await register(supervisor);
    const before = await countsOf(other);
    const ran = await run(wanted("Drill one", "--teams", "2"));
    expect(ran.err).toBe("");
    expect(ran.code).toBe(0);
    expect(ran.out).toMatch(/Loaded \d+ people and \d+ contact pairs into "Drill one" in \d+ s\./);

    const id = await idOf("Drill one");
    const counts = await countsOf(id);
    expect(counts.person).toBeGreaterThan(270);
    expect(counts.person).toBeLessThan(340);
    expect(ran.out).toContain(`${counts.person} people and ${counts.contact_pair} contact pairs`);
    for (const table of ["contact_pair", "exposure", "interview", "follow_check"]) {
      expect(counts[table], table).toBeGreaterThan(20);
    }
    expect(counts.member).toBe(4);
    // A role that is given stands in the access record, also when a command gave it.
    const given = await asAdmin<{ fields: string[]; account_id: string | null }>(
      app,
      "select fields, account_id from audit.event where investigation_id = $1 and action = 'member.added'",
      [id],
    );
    expect(given.flatMap((event) => event.fields).sort()).toEqual(
      ["epidemiologist", "officer", "supervisor", "tracer"].map((role) => `role:${role}`),
    );
    expect(given.every((event) => event.account_id === null)).toBe(true);
    expect(await countsOf(other)).toEqual(before);
    const [shape] = await asAdmin(
      app,
      `select invented, (select count(*)::int from core.team where investigation_id = $1) as teams,
        (select count(*)::int from core.person where investigation_id = $1
          and assigned_team_id is not null) as in_teams,
        (select count(*)::int from identity.person where investigation_id = $1
          and name_cipher is not null) as sealed
       from core.investigation where id = $1`,
      [id],
    );
    expect(shape).toMatchObject({ invented: true, teams: 2 });
    expect(shape?.in_teams).toBeGreaterThan(200);
    expect(shape?.sealed).toBe(counts.person);
    // Sealed as the application seals: its own key opens a name.
    const [row] = await asAdmin<{ wrapped_key: Buffer }>(
      app,
      "select wrapped_key from identity.data_key where investigation_id = $1",
      [id],
    );
    expect(() =>
      createKeyRing(masterKey).unwrap(id, row?.wrapped_key ?? Buffer.alloc(0)),
    ).not.toThrow();
  });

  test("gives equal reports for an equal seed and others for another", async () => {
    for (const name of ["Same A", "Same B"]) {
      expect(await load(wanted(name, "--seed", "5")), name).toBeNull();
    }
    const [a, b, other] = await Promise.all(
      ["Same A", "Same B", "Drill one"].map(async (name) => reportOf(await idOf(name))),
    );
    const figures = (report: NetworkSummary | undefined) => {
      const { graphVersion: _version, ...rest } = report as NetworkSummary;
      return JSON.parse(
        JSON.stringify(rest, (key, value) =>
          /^(computedAt|investigationId|id|studyNumber|name)$/.test(key) ? undefined : value,
        ),
      );
    };
    expect(figures(a)).toEqual(figures(b));
    expect(figures(a)).not.toEqual(figures(other));
  });

  test("refuses a name that is taken, in any case, and leaves nothing behind", async () => {
    await buildInvestigation(app, { name: "Taken" });
    expect(await load(wanted("tAKEN"))).toBe(
      "there is an investigation of this name already; choose another name",
    );
    const rows = await asAdmin(app, "select 1 from core.investigation where lower(name) = 'taken'");
    expect(rows).toHaveLength(1);
  });

  test("says in one line what is wrong with its options, its folder or its key", async () => {
    const cases: [string[], RegExp][] = [
      [[], /--people: is needed/],
      [
        ["--people", "12", "--investigation", "X"],
        /--people: must be a whole number, 300 to 200000/,
      ],
      [["--people", "1e4", "--investigation", "X"], /--people: must be/],
      [["--people", "300"], /--investigation: a name of 1 to 120 characters/],
      [["--people", "300", "--investigation", "  "], /--investigation:/],
      [["--people", "300", "--people", "400", "--investigation", "X"], /more than once/],
      [["--people", "300", "--investigation", "X", "--days", "3"], /--days: must be/],
      [["--people", "300", "--investigation", "X", "--teams", "-1"], /--teams/],
      [["--people", "300", "--investigation", "X", "--last-day", "2026-02-30"], /--last-day/],
      [["--people", "300", "--investigation", "X", "--last-day", "2099-01-01"], /before today/],
      [["--size", "300"], /Unknown option '--size'/],
      [["--people", "300", "--investigation", "X", "extra"], /extra/],
    ];
    for (const [args, words] of cases) {
      expect(() => readArguments(args), args.join(" ")).toThrow(words);
    }
    const ran = await run(["--size", "300"]);
    expect([ran.code, ran.out]).toEqual([1, ""]);
    expect(ran.err).toMatch(/^strandline: Unknown option '--size'[^\n]*\n$/);
    expect(await load(wanted("X").with(-1, "nobody@test.example"))).toMatch(/no account with this/);
    expect(await load(wanted("X").slice(0, -2))).toMatch(/no demo accounts here/);
    const empty = mkdtempSync(join(tmpdir(), "strandline-none-"));
    expect((await run(wanted("X"), empty)).err).toMatch(
      /holds no installation; run npm start once/,
    );
    const secrets = { masterKey: Buffer.alloc(32, 9).toString("base64") };
    writeFileSync(
      join(empty, "secrets.json"),
      JSON.stringify({ ...secrets, sessionSecrets: ["x".repeat(32)], logins: TEST_PASSWORDS }),
    );
    expect(await load(wanted("X"), empty)).toMatch(/master key does not open this database/);
    rmSync(empty, { recursive: true, force: true });
    await asAdmin(
      app,
      "insert into drizzle.__drizzle_migrations (hash, created_at) values ('x', 1)",
    );
    expect(await load(wanted("X"))).toMatch(/of another version; start this version once/);
    await asAdmin(app, "delete from drizzle.__drizzle_migrations where hash = 'x'");
    expect(await idOf("X")).toBe("");
    const help = await run(["--help"]);
    expect([help.code, help.err]).toEqual([0, ""]);
    expect(help.out).toContain("--investigation NAME");
  });
});
