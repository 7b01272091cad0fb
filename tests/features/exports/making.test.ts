import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { withTx } from "../../../server/db/with-tx.ts";
import { endInterrupted, sweepExports } from "../../../server/features/exports/upkeep.ts";
import { exportList } from "../../../shared/contracts/exports.ts";
import { contextOf } from "../../policy/support/world.ts";
import type { TestApp } from "../../support/app.ts";
import { type ExportDesk, makeExportDesk } from "../../support/export-desk.ts";
import { fileOf, settled, takeOut } from "../../support/exports.ts";
import { type Member, PASSWORD, signInEveryone } from "../../support/factories.ts";
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
    expect(await desk.partsOf(id)).toBe(0);
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
    await expect.poll(() => desk.partsOf(id)).toBe(0);
  });

  test("a process that ends leaves an entry that says so", async () => {
    const { epidemiologist } = everyone;
    const one = await takeOut(epidemiologist, { kind: "people" });
    await asAdmin(app, "update core.export set state = 'building' where id = $1", [one.id]);
    expect(await endInterrupted(app.pools)).toBe(1);
    const entry = await settled(epidemiologist, one.id);
    expect([entry.state, entry.failure]).toEqual(["failed", "export_failed"]);
    await sweepExports(app.pools);
    expect(await desk.partsOf(one.id)).toBe(0);
  });
});

describe("the password", () => {
  const later = (member: Member) =>
    asAdmin(
      app,
      `update auth.session set sess = jsonb_set(sess::jsonb, '{startedAt}',
         to_jsonb((now() - interval '6 minutes')::text))::json where account_id = $1`,
      [member.accountId],
    );

  test("has to be given again when it was given five minutes ago", async () => {
    const { epidemiologist } = everyone;
    const { client } = epidemiologist;
    await later(epidemiologist);
    const refused = await ask(epidemiologist, { kind: "people" });
    expect([refused.status, refused.body.code]).toEqual([403, "confirm_needed"]);
    const wrong = await client.call("post", "/api/session/confirm", {
      body: { password: "some other password" },
    });
    expect([wrong.status, wrong.body.errors]).toEqual([
      422,
      [{ path: "password", code: "wrong_password" }],
    ]);
    expect((await ask(epidemiologist, { kind: "people" })).status).toBe(403);
    const right = await client.call("post", "/api/session/confirm", {
      body: { password: PASSWORD },
    });
    expect(right.status).toBe(200);
    const made = await takeOut(epidemiologist, { kind: "people" });
    expect(made.state).toBe("ready");
    // Looking and fetching go on without it.
    await later(epidemiologist);
    await fileOf(epidemiologist, made);
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
    const [opened] = (await desk.eventsOf("export.opened")).filter(
      (e) => e.counts.export === one.id,
    );
    expect(opened?.personIds).toContain(desk.caseId);
    expect(opened?.personIds).toHaveLength(3);
    expect([...(opened?.fields ?? [])].sort()).toEqual(
      ["address", "birthDate", "email", "household", "name", "phone", "ref"].sort(),
    );
    const [made] = (await desk.eventsOf("export.made")).filter((e) => e.counts.export === one.id);
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
      expect((await desk.eventsOf(action)).some((e) => e.counts.export === one.id)).toBe(true);
    }
    // What was typed stands at the export alone.
    expect(JSON.stringify(await desk.eventsOf("export.made"))).not.toContain("Harbour");
  });

  test("a file without identity opens nobody", async () => {
    const one = await takeOut(everyone.supervisor, { kind: "pairs" });
    const opened = (await desk.eventsOf("export.opened")).filter((e) => e.counts.export === one.id);
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
              array[${desk.caseId}::uuid], '{ref,name,address,household}',
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
        sql`select identity.begin_export_opening(${id}::uuid, array[${desk.caseId}::uuid], '{name}')`,
      ),
    );
    await expect(begin).rejects.toMatchObject({ cause: { code: "42501" } });
  });
});
