import { randomUUID } from "node:crypto";
import { parse } from "csv-parse/sync";
import { sql } from "drizzle-orm";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { withTx } from "../../../server/db/with-tx.ts";
import { endInterrupted, sweepExports } from "../../../server/features/exports/upkeep.ts";
import { type Export, exportList } from "../../../shared/contracts/exports.ts";
import { PAIR_COLUMNS, PEOPLE_COLUMNS } from "../../../shared/contracts/imports.ts";
import type { AccessEvent } from "../../../shared/contracts/safeguard.ts";
import type { Role } from "../../../shared/roles.ts";
import { contextOf } from "../../policy/support/world.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { fileOf, settled, takeOut } from "../../support/exports.ts";
import {
  buildInvestigation,
  buildMember,
  type Member,
  signInEveryone,
} from "../../support/factories.ts";
import { asAdmin, contactRow, register, submit } from "../../support/field-work.ts";

const IDENTITY = {
  ref: "REF-1",
  name: "=HYPERLINK(Name)",
  phone: "+44 7700 900123",
  email: "jo@export.example",
  birthDate: "1980-05-06",
  address: "5 Secret Quay",
};
let app: TestApp;
let everyone: Record<Role, Member>;
let caseId: string;

beforeAll(async () => {
  app = await startTestApp();
  everyone = await signInEveryone(app, await buildInvestigation(app));
  const { supervisor } = everyone;
  caseId = await register(supervisor, {
    ...IDENTITY,
    occupation: "Rope maker",
    household: "Hidden House",
    area: "North",
    onsetDate: "2026-03-01",
  });
  const contacts = [
    contactRow({ name: "Named Contact", setting: "household", place: "Hidden House" }),
    contactRow({ name: "Other Contact", setting: "workplace", place: "Rope walk", minutes: 30 }),
  ];
  expect((await submit(supervisor, caseId, { contacts })).status).toBe(201);
});

afterAll(async () => {
  await app?.close();
});

type Line = Record<string, string>;
const linesOf = (text: string) => parse(text, { columns: true, bom: false }) as Line[];
const ask = (member: Member, body: Record<string, unknown>) =>
  member.client.post(`${member.base}/exports`, { purpose: "analysis", ...body });
const filled = (lines: Line[]) =>
  Object.keys(lines[0] ?? {}).filter((column) => lines.some((line) => line[column] !== ""));
const secrets = [...Object.values(IDENTITY), "Named Contact", "Hidden House"];

async function eventsOf(action: string): Promise<AccessEvent[]> {
  const { officer } = everyone;
  const answer = await officer.client.get(`${officer.base}/access-events`, { action });
  expect(answer.status).toBe(200);
  return answer.body.items;
}

describe("what a file holds follows from the registry", () => {
  test("the headings are those of the import, every cell quoted, lines ended by CRLF", async () => {
    for (const [kind, columns] of [
      ["people", PEOPLE_COLUMNS],
      ["pairs", PAIR_COLUMNS],
    ] as const) {
      const text = await fileOf(
        everyone.supervisor,
        await takeOut(everyone.supervisor, { kind, identified: true }),
      );
      expect(text.split("\r\n")[0]).toBe(columns.map((one) => `"${one}"`).join(","));
      expect(text.endsWith('"\r\n')).toBe(true);
      for (const line of text.trimEnd().split("\r\n")) expect(line).toMatch(/^"[^\n]*"$/);
    }
  });

  test("a supervisor's with identity holds it, guarded against being run as a formula", async () => {
    const one = await takeOut(everyone.supervisor, { kind: "people", identified: true });
    const line = linesOf(await fileOf(everyone.supervisor, one)).find(
      ({ ref }) => ref === IDENTITY.ref,
    );
    expect(line).toMatchObject({
      name: "'=HYPERLINK(Name)",
      phone: "'+44 7700 900123",
      email: IDENTITY.email,
      birth_date: IDENTITY.birthDate,
      address: IDENTITY.address,
      household: "Hidden House",
      occupation: "Rope maker",
      interviewed: "yes",
    });
  });

  test.each(["supervisor", "epidemiologist", "officer"] as const)(
    "a %s's without identity has study numbers and household numbers only",
    async (role) => {
      const member = everyone[role];
      const people = await fileOf(member, await takeOut(member, { kind: "people" }));
      const pairs = await fileOf(member, await takeOut(member, { kind: "pairs" }));
      for (const secret of secrets) expect(people + pairs).not.toContain(secret);
      const lines = linesOf(people);
      expect(lines).toHaveLength(3);
      for (const { ref } of lines) expect(ref).toMatch(/^[0-9A-Z]{3}-[0-9A-Z]{4}$/);
      const refs = new Set(lines.map(({ ref }) => ref));
      const told = linesOf(pairs);
      expect(told).toHaveLength(2);
      for (const line of told) {
        for (const key of ["ref_a", "ref_b", "named_by"] as const) {
          expect(refs.has(line[key] ?? "")).toBe(true);
        }
      }
      const home = told.find(({ setting }) => setting === "household");
      expect(home?.place).toMatch(/^\d+$/);
      expect(lines.some(({ household }) => household === home?.place)).toBe(true);
      expect(told.some(({ place }) => place === "Rope walk")).toBe(true);
      const wanted = ["ref", "area", "household", "classification", "onset_date"];
      if (role !== "officer") wanted.push("occupation");
      expect(filled(lines)).toEqual(expect.arrayContaining(wanted));
      expect(filled(lines).includes("occupation")).toBe(role !== "officer");
    },
  );

  test("an officer's with identity has references and none of the rest", async () => {
    const { officer } = everyone;
    const one = await takeOut(officer, { kind: "people", identified: true });
    const text = await fileOf(officer, one);
    expect(text).toContain(IDENTITY.ref);
    for (const secret of secrets.slice(1)) expect(text).not.toContain(secret);
    expect(one.columns).not.toContain("name");
    const pairs = await takeOut(officer, { kind: "pairs", identified: true });
    const told = await fileOf(officer, pairs);
    expect(told).toContain(IDENTITY.ref);
    expect(told).not.toContain("Hidden House");
  });

  test("an epidemiologist has none with identity, a tracer none at all", async () => {
    const refused = await ask(everyone.epidemiologist, { kind: "people", identified: true });
    expect([refused.status, refused.body.errors]).toEqual([
      422,
      [{ path: "identified", code: "not_for_role" }],
    ]);
    expect((await ask(everyone.tracer, { kind: "people" })).status).toBe(403);
    const list = await everyone.tracer.client.get(`${everyone.tracer.base}/exports`);
    expect(list.status).toBe(403);
  });

  test("a filter narrows a list of people down, by what the role may read", async () => {
    const { supervisor, epidemiologist } = everyone;
    const one = await takeOut(supervisor, { kind: "people", filter: { classification: "case" } });
    expect(linesOf(await fileOf(supervisor, one))).toHaveLength(1);
    expect(one).toMatchObject({ rows: 1, filter: { classification: "case" } });
    const north = await takeOut(epidemiologist, { kind: "people", filter: { area: "North" } });
    expect(north.rows).toBe(1);
    const none = await takeOut(supervisor, { kind: "people", filter: { area: "Nowhere" } });
    expect(linesOf(await fileOf(supervisor, none))).toEqual([]);
    const hidden = await ask(epidemiologist, { kind: "people", filter: { assigned: "none" } });
    expect(hidden.body.errors).toEqual([{ path: "filter.assigned", code: "not_in_list" }]);
  });
});

test("bad input is refused beside its field, and nothing is made", async () => {
  const { supervisor } = everyone;
  const count = async () => (await supervisor.client.get(`${supervisor.base}/exports`)).body.total;
  const before = await count();
  const wrong: [Record<string, unknown>, { path: string; code: string }][] = [
    [{}, { path: "kind", code: "not_in_list" }],
    [{ kind: "groups" }, { path: "kind", code: "not_in_list" }],
    [
      { kind: "people", purpose: "curiosity" },
      { path: "purpose", code: "not_in_list" },
    ],
    [
      { kind: "people", purpose: "other" },
      { path: "reason", code: "required" },
    ],
    [
      { kind: "people", reason: "x".repeat(121) },
      { path: "reason", code: "too_long" },
    ],
    [
      { kind: "people", identified: "yes" },
      { path: "identified", code: "wrong_type" },
    ],
    [
      { kind: "pairs", filter: { area: "North" } },
      { path: "filter", code: "only_for_people" },
    ],
    [
      { kind: "people", filter: { q: "Jo" } },
      { path: "filter", code: "unknown_key" },
    ],
    [
      { kind: "people", state: "ready" },
      { path: "", code: "unknown_key" },
    ],
  ];
  for (const [body, error] of wrong) {
    const answer = await ask(supervisor, body);
    expect([answer.status, answer.body.errors?.[0]?.code], JSON.stringify(body)).toEqual([
      422,
      error.code,
    ]);
  }
  expect(await count()).toBe(before);
});

describe("who gets a file", () => {
  let one: Export;
  beforeAll(async () => {
    one = await takeOut(everyone.supervisor, { kind: "people", identified: true });
  });
  const fileAs = (member: Member) => member.client.get(`${member.base}/exports/${one.id}/file`);

  test("its maker, as an attachment that nobody keeps", async () => {
    const answer = await fileAs(everyone.supervisor).buffer(true);
    expect(answer.status).toBe(200);
    expect(answer.headers).toMatchObject({
      "content-type": "text/csv; charset=utf-8",
      "content-disposition": `attachment; filename="${one.fileName}"`,
      "content-length": String(one.bytes),
      "cache-control": "no-store",
      "x-content-type-options": "nosniff",
    });
    expect(one.fileName).toMatch(/^strandline-people-[0-9a-f]{8}\.csv$/);
    const entry = await everyone.supervisor.client.get(
      `${everyone.supervisor.base}/exports/${one.id}`,
    );
    expect(entry.body.downloads).toBeGreaterThan(0);
  });

  test("a data officer sees its entry and not its bytes; others not even the entry", async () => {
    const { officer, epidemiologist } = everyone;
    const list = exportList.parse((await officer.client.get(`${officer.base}/exports`)).body);
    expect(list.items.find(({ id }) => id === one.id)).toMatchObject({
      role: "supervisor",
      sha256: one.sha256,
      displayName: expect.stringContaining("Account"),
      can: { download: false, remove: true },
    });
    expect((await fileAs(officer)).status).toBe(404);
    expect((await fileAs(epidemiologist)).status).toBe(404);
    const entry = await epidemiologist.client.get(`${epidemiologist.base}/exports/${one.id}`);
    expect(entry.status).toBe(404);
    const gone = await epidemiologist.client.call(
      "delete",
      `${epidemiologist.base}/exports/${one.id}`,
    );
    expect(gone.status).toBe(404);
  });

  test("not its maker in another role, neither by the API nor by the database", async () => {
    const { supervisor } = everyone;
    await buildMember(app, supervisor.investigationId, supervisor.accountId, "epidemiologist");
    const nonce = await contextOf(app, supervisor, "epidemiologist");
    const part = await withTx({ pool: app.pools.epidemiologist, nonce }, async (tx) => {
      const found = await tx.execute<{ body: Buffer | null }>(
        sql`select core.read_export_part(${one.id}::uuid, 0) as body`,
      );
      return found.rows[0]?.body;
    });
    expect(part).toBeNull();
    const own = await contextOf(app, supervisor, "supervisor");
    const sealed = await withTx({ pool: app.pools.supervisor, nonce: own }, async (tx) => {
      const found = await tx.execute<{ body: Buffer | null }>(
        sql`select core.read_export_part(${one.id}::uuid, 0) as body`,
      );
      return found.rows[0]?.body;
    });
    expect(sealed?.includes(Buffer.from(IDENTITY.address))).toBe(false);
    expect(sealed?.length).toBeGreaterThan(100);
  });

  test("a download that cannot be finished is cut off in sight", async () => {
    const { supervisor } = everyone;
    const broken = await takeOut(supervisor, { kind: "pairs" });
    await asAdmin(app, "delete from identity.export_part where export_id = $1", [broken.id]);
    const answer = supervisor.client.get(`${supervisor.base}/exports/${broken.id}/file`);
    await expect(answer).rejects.toThrow(/aborted|hang up|ECONNRESET/);
    expect(app.logs.some((line) => line.includes("download broke off"))).toBe(true);
  });

  test("nobody a day later; the entry stays and the bytes are gone", async () => {
    const { supervisor } = everyone;
    const old = await takeOut(supervisor, { kind: "people" });
    const hours = (Date.parse(old.expiresAt ?? "") - Date.parse(old.finishedAt ?? "")) / 3_600_000;
    expect(hours).toBeCloseTo(24, 5);
    await asAdmin(app, "update core.export set expires_at = now() where id = $1", [old.id]);
    const path = `${supervisor.base}/exports/${old.id}`;
    expect((await supervisor.client.get(`${path}/file`)).status).toBe(404);
    expect(await sweepExports(app.pools)).toBeGreaterThanOrEqual(1);
    const entry = (await supervisor.client.get(path)).body;
    expect([entry.state, entry.can, entry.sha256]).toEqual([
      "expired",
      { download: false, remove: false },
      old.sha256,
    ]);
    expect(await partsOf(old.id)).toBe(0);
  });

  test("nobody after it was deleted, by its maker or by a data officer", async () => {
    for (const by of [everyone.epidemiologist, everyone.officer]) {
      const maker = everyone.epidemiologist;
      const made = await takeOut(maker, { kind: "people" });
      const path = `${maker.base}/exports/${made.id}`;
      const answer = await by.client.call("delete", path);
      expect([answer.status, answer.body.state]).toEqual([200, "deleted"]);
      expect(await partsOf(made.id)).toBe(0);
      expect((await maker.client.get(`${path}/file`)).status).toBe(404);
      // Again: nothing more to end.
      expect((await by.client.call("delete", path)).body.state).toBe("deleted");
    }
    expect((await eventsOf("export.deleted")).length).toBe(2);
  });
});

async function partsOf(id: string): Promise<number> {
  const [row] = await asAdmin<{ count: number }>(
    app,
    "select count(*)::int as count from identity.export_part where export_id = $1",
    [id],
  );
  return row?.count ?? -1;
}

/** Holds back whatever reads people until `work` is done. */
async function withPeopleLocked<T>(work: () => Promise<T>): Promise<T> {
  const admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  try {
    await admin.query("begin");
    await admin.query("lock table core.person in access exclusive mode");
    return await work();
  } finally {
    await admin.query("rollback");
    await admin.end();
  }
}

describe("while a file is being made", () => {
  test("it can be cancelled, and nothing of it is kept", async () => {
    const { epidemiologist } = everyone;
    const id = await withPeopleLocked(async () => {
      const asked = await ask(epidemiologist, { kind: "people" });
      expect(Object.keys(asked.body)).toEqual(["id"]);
      const path = `${epidemiologist.base}/exports/${asked.body.id}`;
      const entry = (await epidemiologist.client.get(path)).body;
      expect([entry.state, entry.can]).toEqual(["building", { download: false, remove: true }]);
      expect((await epidemiologist.client.get(`${path}/file`)).status).toBe(404);
      const answer = await epidemiologist.client.call("delete", path);
      expect(answer.body.state).toBe("cancelled");
      return asked.body.id as string;
    });
    // One asked for later is made after it: by then it has ended.
    const next = await takeOut(epidemiologist, { kind: "people" });
    expect(next.state).toBe("ready");
    expect((await settled(epidemiologist, id)).state).toBe("cancelled");
    expect(await partsOf(id)).toBe(0);
  });

  test("five may wait for one person, a sixth is refused", async () => {
    const { officer } = everyone;
    await withPeopleLocked(async () => {
      for (let one = 0; one < 5; one++) {
        expect((await ask(officer, { kind: "people" })).status).toBe(201);
      }
      const sixth = await ask(officer, { kind: "people" });
      expect([sixth.status, sixth.body.code]).toEqual([409, "conflict"]);
    });
    const list = exportList.parse((await officer.client.get(`${officer.base}/exports`)).body);
    for (const { id, state } of list.items) {
      if (state === "building") expect((await settled(officer, id)).state).toBe("ready");
    }
  });

  test("the same key asks once", async () => {
    const { epidemiologist } = everyone;
    const key = randomUUID();
    const path = `${epidemiologist.base}/exports`;
    const body = { kind: "people", purpose: "analysis" };
    const first = await epidemiologist.client.post(path, body, key);
    const second = await epidemiologist.client.post(path, body, key);
    expect(second.body).toEqual(first.body);
    await settled(epidemiologist, first.body.id);
  });

  test("who signs out meanwhile gets none, and the entry says why", async () => {
    const { supervisor, officer } = everyone;
    const leaving = await signInEveryone(app, supervisor.investigationId);
    const id = await withPeopleLocked(async () => {
      const asked = await ask(leaving.supervisor, { kind: "people", identified: true });
      expect((await leaving.supervisor.client.call("delete", "/api/session")).status).toBe(204);
      return asked.body.id as string;
    });
    const ended = await settled(officer, id);
    expect([ended.state, ended.failure]).toEqual(["failed", "export_no_access"]);
    expect(ended.can).toEqual({ download: false, remove: false });
    await expect.poll(() => partsOf(id)).toBe(0);
  });

  test("a process that ends leaves an entry that says so", async () => {
    const { epidemiologist } = everyone;
    const one = await takeOut(epidemiologist, { kind: "people" });
    await asAdmin(app, "update core.export set state = 'building' where id = $1", [one.id]);
    expect(await endInterrupted(app.pools)).toBe(1);
    const entry = await settled(epidemiologist, one.id);
    expect([entry.state, entry.failure]).toEqual(["failed", "export_failed"]);
    await sweepExports(app.pools);
    expect(await partsOf(one.id)).toBe(0);
  });
});

describe("the access record", () => {
  test("tells of whom what was opened, what was made, and who took it", async () => {
    const { supervisor } = everyone;
    const one = await takeOut(supervisor, {
      kind: "people",
      identified: true,
      purpose: "handover",
      reason: "Harbour authority",
    });
    await fileOf(supervisor, one);
    const [opened] = (await eventsOf("export.opened")).filter((e) => e.counts.export === one.id);
    expect(opened?.personIds).toContain(caseId);
    expect(opened?.personIds).toHaveLength(3);
    expect([...(opened?.fields ?? [])].sort()).toEqual(
      ["address", "birthDate", "email", "household", "name", "phone", "ref"].sort(),
    );
    const [made] = (await eventsOf("export.made")).filter((e) => e.counts.export === one.id);
    expect(made).toMatchObject({
      role: "supervisor",
      accountId: supervisor.accountId,
      fields: one.columns,
      counts: {
        of: "people",
        identity: "with",
        purpose: "handover",
        rows: 3,
        people: 3,
        sha256: one.sha256,
      },
    });
    for (const action of ["export.requested", "export.downloaded"]) {
      expect((await eventsOf(action)).some((e) => e.counts.export === one.id)).toBe(true);
    }
    // What was typed stands at the export alone.
    expect(JSON.stringify(await eventsOf("export.made"))).not.toContain("Harbour");
  });

  test("a file without identity opens nobody", async () => {
    const one = await takeOut(everyone.supervisor, { kind: "pairs" });
    const opened = (await eventsOf("export.opened")).filter((e) => e.counts.export === one.id);
    expect(opened).toEqual([]);
  });

  test("an event written by a login itself opens no field its role may not read", async () => {
    const { officer } = everyone;
    const nonce = await contextOf(app, officer, "officer");
    const id = randomUUID();
    const fields = await withTx({ pool: app.pools.officer, nonce }, async (tx) => {
      await tx.execute(
        sql`insert into core.export (id, investigation_id, kind, identified, purpose, role, columns,
              state, recorded_by)
            values (${id}, ${officer.investigationId}, 'people', true, 'analysis', 'officer', '{}',
              'building', ${officer.accountId})`,
      );
      await tx.execute(
        sql`insert into audit.event (investigation_id, account_id, role, action, person_ids, fields, counts)
            values (${officer.investigationId}, ${officer.accountId}, 'officer', 'export.opened',
              array[${caseId}::uuid], '{ref,name,address,household}',
              jsonb_build_object('export', ${id}::text))`,
      );
      const found = await tx.execute<{ field: string }>(
        sql`select field from identity.open_for_export(${id}::uuid, 1, 10, '{ref,name,address,household}')`,
      );
      await tx.execute(sql`update core.export set state = 'cancelled' where id = ${id}`);
      return found.rows.map((row) => row.field);
    });
    expect(fields).toEqual(["ref"]);
    const begin = withTx({ pool: app.pools.officer, nonce }, (tx) =>
      tx.execute(
        sql`select identity.begin_export_opening(${id}::uuid, array[${caseId}::uuid], '{name}')`,
      ),
    );
    await expect(begin).rejects.toMatchObject({ cause: { code: "42501" } });
  });
});
