import { parse } from "csv-parse/sync";
import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { withTx } from "../../../server/db/with-tx.ts";
import { sweepExports } from "../../../server/features/exports/upkeep.ts";
import { type Export, exportList } from "../../../shared/contracts/exports.ts";
import { PAIR_COLUMNS, PEOPLE_COLUMNS } from "../../../shared/contracts/imports.ts";
import { contextOf } from "../../policy/support/world.ts";
import type { TestApp } from "../../support/app.ts";
import { type ExportDesk, IDENTITY, makeExportDesk, SECRETS } from "../../support/export-desk.ts";
import { fileOf, takeOut } from "../../support/exports.ts";
import { buildMember, type Member } from "../../support/factories.ts";
import { asAdmin } from "../../support/field-work.ts";

let desk: ExportDesk;
let app: TestApp;
let everyone: ExportDesk["everyone"];
const ask: ExportDesk["ask"] = (member, body) => desk.ask(member, body);

beforeAll(async () => {
  desk = await makeExportDesk();
  ({ app, everyone } = desk);
});

afterAll(async () => {
  await app?.close();
});

type Line = Record<string, string>;
const linesOf = (text: string) => parse(text, { columns: true, bom: false }) as Line[];
const filled = (lines: Line[]) =>
  Object.keys(lines[0] ?? {}).filter((column) => lines.some((line) => line[column] !== ""));

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
      for (const secret of SECRETS) expect(people + pairs).not.toContain(secret);
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
    for (const secret of SECRETS.slice(1)) expect(text).not.toContain(secret);
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

  test("every filter of the line list narrows the file as it narrows the list", async () => {
    const { supervisor } = everyone;
    const filters: Record<string, string>[] = [
      { interviewState: "none" },
      { interviewed: "no" },
      { followUp: "no" },
      { followUp: "yes" },
      { assigned: "team" },
      { assigned: supervisor.accountId },
      { onsetFrom: "2026-05-01", onsetTo: "2026-05-31" },
      { reportTo: "1999-12-31" },
    ];
    const numbers = new Set<number>();
    for (const filter of filters) {
      const list = await supervisor.client.get(`${supervisor.base}/people`, filter);
      expect(list.status, JSON.stringify(filter)).toBe(200);
      const made = await takeOut(supervisor, { kind: "people", filter });
      expect(made.rows, JSON.stringify(filter)).toBe(list.body.total);
      numbers.add(made.rows);
    }
    expect(numbers.size).toBeGreaterThan(1);
    const back = { onsetFrom: "2026-05-31", onsetTo: "2026-05-01" };
    const refused = await ask(supervisor, { kind: "people", filter: back });
    expect(refused.body.errors).toEqual([{ path: "filter.onsetTo", code: "last_before_first" }]);
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
    expect(await desk.partsOf(old.id)).toBe(0);
  });

  test("nobody after it was deleted, by its maker or by a data officer", async () => {
    for (const by of [everyone.epidemiologist, everyone.officer]) {
      const maker = everyone.epidemiologist;
      const made = await takeOut(maker, { kind: "people" });
      const path = `${maker.base}/exports/${made.id}`;
      const answer = await by.client.call("delete", path);
      expect([answer.status, answer.body.state]).toEqual([200, "deleted"]);
      expect(await desk.partsOf(made.id)).toBe(0);
      expect((await maker.client.get(`${path}/file`)).status).toBe(404);
      // Again: nothing more to end.
      expect((await by.client.call("delete", path)).body.state).toBe("deleted");
    }
    expect((await desk.eventsOf("export.deleted")).length).toBe(2);
  });
});
