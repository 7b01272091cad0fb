import { randomBytes, randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { newRows } from "../../../server/features/imports/commands/put-new-people.ts";
import { packChunks } from "../../../server/features/imports/pack-jobs.ts";
import { createPackLane } from "../../../server/features/imports/pack-lane.ts";
import { sealChunk } from "../../../server/features/imports/staged-chunk.ts";
import type { PackedPeople } from "../../../server/identity/pack-new-people.ts";
import { openCipher } from "../../../server/identity/records.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { contactRow, register, submit } from "../../support/field-work.ts";
import { commit, stage } from "../../support/imports.ts";

const LOCK = 6021;

let app: TestApp;
let admin: pg.Client;
let id: string;
let supervisor: Member;
let tracer: Member;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  id = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", id);
  tracer = await signInAs(app, "tracer", id);
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

/** Waits, a bounded time, until somebody waits for the lock. */
async function untilHeld(): Promise<void> {
  for (let turn = 0; turn < 600; turn++) {
    const found = await admin.query(
      "select 1 from pg_locks where locktype = 'advisory' and objid = $1 and not granted",
      [LOCK],
    );
    if (found.rowCount) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error("the commit never came to the held table");
}

describe("an interview while a commit is open", () => {
  it("is answered, in the same investigation, before the commit has ended", async () => {
    const caseId = await register(tracer, { name: "Ida Held" });
    // No interview writes this table, so only the commit is held.
    await admin.query(
      `create function public.hold() returns trigger language plpgsql as
         $$ begin perform pg_advisory_xact_lock(${LOCK}); return null; end $$`,
    );
    await admin.query(
      "create trigger hold after insert on core.test_result for each statement execute function public.hold()",
    );
    const staged = await stage(
      supervisor,
      "people",
      "ref,name,household,classification,result\nH-1,Una Long,Long,confirmed,positive\nH-2,Odd Long,Long,contact,\n",
    );
    await admin.query(`select pg_advisory_lock(${LOCK})`);
    const committing = commit(supervisor, staged.id);
    try {
      await untilHeld();
      const answer = await submit(tracer, caseId, {
        contacts: [
          contactRow({
            name: "Pia Near",
            phone: "07700 900321",
            setting: "household",
            place: "Near",
          }),
          contactRow({ name: "Tom Near", setting: "workplace", place: "Works" }),
        ],
      });
      expect(answer.status).toBe(201);
      const import_ = await supervisor.client.get(`${supervisor.base}/imports/${staged.id}`);
      expect(import_.body.state).toBe("committing");
    } finally {
      await admin.query(`select pg_advisory_unlock(${LOCK})`);
    }
    expect(await committing).toMatchObject({ state: "committed", counts: { addedPeople: 2 } });
    await admin.query("drop function public.hold() cascade");
    const numbers = await admin.query(
      "select number from core.place where investigation_id = $1 order by number",
      [id],
    );
    expect(numbers.rows.map(({ number }) => number)).toEqual([1, 2, 3]);
    const versions = await admin.query(
      "select kind, graph_version from core.graph_change where kind in ('bulk', 'interview') order by graph_version",
    );
    expect(versions.rows.map(({ kind }) => kind)).toEqual(["interview", "bulk"]);
  });
});

/** Elements of an array in PostgreSQL's binary form. */
function elements(packed: Uint8Array): (Buffer | null)[] {
  const bytes = Buffer.from(packed);
  if (bytes.readInt32BE(0) === 0) return [];
  const out: (Buffer | null)[] = [];
  for (let at = 20; at < bytes.length; ) {
    const length = bytes.readInt32BE(at);
    out.push(length < 0 ? null : bytes.subarray(at + 4, at + 4 + length));
    at += 4 + Math.max(length, 0);
  }
  return out;
}

describe("sealing in a thread of its own", () => {
  const keys = { seal: randomBytes(32), token: randomBytes(32) };
  const importId = randomUUID();
  const rows = [
    {
      line: 2,
      cells: { ref: "S-1", name: "Élise d'Añez", phone: "07700 900111", email: "e@x.org" },
    },
    { line: 3, cells: { ref: "S-2", name: "unknown", phone: "refused", birth_date: "1980-05" } },
    { line: 4, cells: { ref: "S-3", name: "Bram Venning", address: "1 Mill Lane" } },
  ];
  const chunks = [rows.slice(0, 2), rows.slice(2)].map((part, chunk) => ({
    importId,
    chunk,
    body: sealChunk(keys, importId, chunk, part),
  }));
  const ids = [randomUUID(), randomUUID()];
  const job = { chunks, places: [2, 0], ids, keys, country: "GB" };

  it("gives what sealing here gives", async () => {
    const lane = createPackLane();
    const there = await lane.pack(job).finally(() => lane.stop());
    const here = packChunks({ kind: "pack", ...job });
    const ciphers: Partial<
      Record<keyof PackedPeople, "ref" | "name" | "phone" | "email" | "address" | "birthDate">
    > = {
      refCiphers: "ref",
      nameCiphers: "name",
      phoneCiphers: "phone",
      emailCiphers: "email",
      birthDateCiphers: "birthDate",
      addressCiphers: "address",
    };
    expect(Object.keys(there).sort()).toEqual(Object.keys(here).sort());
    for (const key of Object.keys(here) as (keyof PackedPeople)[]) {
      const field = ciphers[key];
      const read = (packed: PackedPeople) =>
        elements(packed[key]).map((value, at) =>
          field && value ? openCipher(keys, ids[at] as string, field, value) : value,
        );
      expect(read(there), key).toEqual(read(here));
    }
    expect(
      elements(there.nameCiphers).map(
        (value, at) => value && openCipher(keys, ids[at] as string, "name", value),
      ),
    ).toEqual(["Bram Venning", "Élise d'Añez"]);
    expect(elements(there.namesMasked).map(String)).toEqual(["B. V.", "É. D."]);
    // Phone and e-mail of one; two name parts each, and the sounds.
    expect(elements(there.tokens).length).toBeGreaterThanOrEqual(8);
  });

  it("refuses a chunk that is not at its place, and goes on afterwards", async () => {
    const lane = createPackLane();
    try {
      const moved = chunks.map((chunk) => ({ ...chunk, chunk: chunk.chunk + 1 }));
      await expect(lane.pack({ ...job, chunks: moved })).rejects.toThrow();
      expect(elements((await lane.pack(job)).people)).toHaveLength(2);
    } finally {
      await lane.stop();
    }
  });
});

describe("a file long enough for the thread", () => {
  it("puts everyone on record with what they are found by", async () => {
    const lines = ["ref,name,phone,household,result"];
    for (let at = 0; at < 4_500; at++) {
      lines.push(
        `L-${at},Lane${at} Person,07700 9${String(at).padStart(5, "0")},Home ${at % 700},`,
      );
    }
    const staged = await stage(supervisor, "people", lines.join("\n"));
    const done = await commit(supervisor, staged.id);
    const { setAside = 0 } = done.counts;
    expect(done).toMatchObject({
      state: "committed",
      counts: { addedPeople: 4_500 - setAside, addedPlaces: 700 },
    });
    const found = await supervisor.client.call("post", `${supervisor.base}/people/search`, {
      body: { q: "07700 904321" },
    });
    expect(found.body.total).toBe(1);
    const page = await supervisor.client.get(`${supervisor.base}/people/${found.body.items[0].id}`);
    expect(page.body).toMatchObject({
      ref: "L-4321",
      name: "Lane4321 Person",
      phone: "07700 904321",
      household: `Home ${4321 % 700}`,
    });
  }, 120_000);

  it("hands ids out in an order of its own", () => {
    const rows = Array.from({ length: 300 }, (_, line) => ({ line, cells: { ref: `N-${line}` } }));
    const people = newRows(rows, ({ line }) => line % 3 > 0);
    expect(people).toHaveLength(200);
    const ids = people.map((one) => one.id);
    expect(ids).toEqual([...ids].sort());
    const places = people.map(({ at, row }) => {
      expect(row).toBe(rows[at]);
      return at;
    });
    expect(places).not.toEqual([...places].sort((a, b) => a - b));
  });
});
