import { randomUUID } from "node:crypto";
import { request } from "node:http";
import pg from "pg";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { LIMITS } from "../../../shared/contracts/common.ts";
import type { Import } from "../../../shared/contracts/imports.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { bringIn, commit, problemLines, stage } from "../../support/imports.ts";
import { TORTURE_FILES, type TortureFile } from "../../support/torture-files.ts";

let app: TestApp;
let admin: pg.Client;
let supervisor: Member;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

beforeEach(async () => {
  supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
});

async function count(table: string): Promise<number> {
  const found = await admin.query(
    `select count(*)::int as n from ${table} where investigation_id = $1`,
    [supervisor.investigationId],
  );
  return found.rows[0].n;
}

const upload = (bytes: Buffer | string, kind = "people", name = "file.csv") =>
  supervisor.client.upload(`${supervisor.base}/imports`, { kind }, bytes, name);

/** Every data row is somewhere: put on record, kept out with a reason, or set aside. */
function expectAllRows({ rows, counts }: Import) {
  const { good = 0, bad = 0, setAside = 0 } = counts;
  expect(good + bad + setAside).toBe(rows);
}

async function namesOnRecord(): Promise<string[]> {
  const { client, base } = supervisor;
  const list = await client.get(`${base}/people`, { pageSize: "200" });
  const items = list.body.items as { ref: string; name: string | null }[];
  return items.sort((a, b) => (a.ref < b.ref ? -1 : 1)).flatMap(({ name }) => name ?? []);
}

async function expectRefused(file: TortureFile) {
  const answer = await upload(file.bytes(), file.kind);
  expect(answer.status).toBe(422);
  const errors = answer.body.errors as { path: string; code: string }[];
  expect(errors.map(({ path, code }) => `${path} ${code}`)).toEqual(file.refused);
  for (const table of ["core.import", "identity.import_stage", "identity.import_match"]) {
    expect(await count(table)).toBe(0);
  }
}

async function expectTaken(file: TortureFile) {
  const kind = file.kind ?? "people";
  if (kind === "pairs") await bringIn(supervisor, "people", "ref\nP1\nP2\nP3\n");
  const before = await count("core.person");
  const staged = await stage(supervisor, kind, file.bytes());
  expect(problemLines(staged)).toEqual(file.problems ?? []);
  expect(staged.counts.bad).toBe(new Set(staged.problems.map(({ line }) => line)).size);
  expect(staged.counts).toMatchObject(file.counts ?? {});
  expectAllRows(staged);
  const done = await commit(supervisor, staged.id);
  expect(done.state).toBe("committed");
  expectAllRows(done);
  const added = (await count("core.person")) - before;
  expect(added).toBe(kind === "people" ? staged.counts.good : 0);
  if (file.names) expect(await namesOnRecord()).toEqual(file.names);
}

describe("the torture list", () => {
  it.each(TORTURE_FILES.map((file) => [file.id, file.name, file] as const))(
    "%s %s",
    async (_id, _name, file) => {
      await (file.refused ? expectRefused(file) : expectTaken(file));
      expect(({} as Record<string, unknown>).B).toBeUndefined();
    },
  );

  it("28, 29 days of instants: local to the investigation, as written without an offset", async () => {
    const file =
      "ref,onset_date\nA,2024-03-02T01:30:00+05:30\nB,2024-03-31T01:30\nC,2024-10-27T01:30\n";
    await bringIn(supervisor, "people", file);
    const found = await admin.query(
      "select onset_date as day from core.person where investigation_id = $1 order by 1",
      [supervisor.investigationId],
    );
    expect(found.rows.map(({ day }) => day)).toEqual(["2024-03-01", "2024-03-31", "2024-10-27"]);
  });

  it("39 one byte more than 50 MB: 413, and nothing is left", async () => {
    const answer = await upload(Buffer.alloc(LIMITS.fileBytes + 1, "a"));
    expect(answer.status).toBe(413);
    expect(await count("core.import")).toBe(0);
  });

  it("46 the same file twice is the same import and adds nothing", async () => {
    const text = "ref;name\nA;Ann Lee\n";
    const first = await bringIn(supervisor, "people", text);
    const again = await upload(text);
    expect(again.body).toMatchObject({ id: first.id, state: "committed" });
    expect((await commit(supervisor, first.id)).state).toBe("committed");
    expect(await count("core.person")).toBe(1);
    // Read another way it is another import.
    const columns = JSON.stringify(["ref", null]);
    const path = `${supervisor.base}/imports`;
    const other = await supervisor.client.upload(path, { kind: "people", columns }, text);
    expect(other.body.id).not.toBe(first.id);
    expect(other.body).toMatchObject({ state: "ready", counts: { known: 1, new: 0 } });
  });

  it("47 a connection cut half way leaves nothing", async () => {
    const signedIn = await supervisor.client.call("post", "/api/session", {
      body: { email: supervisor.email, password: "long enough for a test" },
    });
    const cookie = (signedIn.get("Set-Cookie") ?? []).map((one) => one.split(";")[0]).join("; ");
    const size = 4_000_000;
    const half = new Promise<void>((resolve) => {
      const sending = request(`${app.origin}${supervisor.base}/imports`, {
        method: "POST",
        headers: {
          Origin: app.origin,
          Cookie: cookie,
          "Idempotency-Key": randomUUID(),
          "Content-Type": "multipart/form-data; boundary=cut",
          "Content-Length": String(size),
        },
      });
      sending.on("error", () => resolve());
      sending.write(
        '--cut\r\nContent-Disposition: form-data; name="kind"\r\n\r\npeople\r\n--cut\r\n' +
          'Content-Disposition: form-data; name="file"; filename="a.csv"\r\n\r\nref\n',
      );
      sending.write("Half-row\n".repeat(size / 18), () => {
        sending.destroy();
        resolve();
      });
    });
    await half;
    const answer = await fetch(`${app.origin}/healthz`);
    expect(answer.status).toBe(200);
    expect(await count("core.import")).toBe(0);
    expect(await count("identity.import_stage")).toBe(0);
  });

  it("50 the name of a file counts for nothing", async () => {
    for (const [at, name] of ["../../x.csv", "a\r\nX-Header: b.csv", "x.zip"].entries()) {
      const answer = await upload(`ref\nN${at}\n`, "people", name);
      expect(answer.status).toBe(201);
      expect(answer.text).not.toContain("x.");
    }
  });

  it("56 a commit whose connection is killed half way stores nothing, and can be done again", async () => {
    const rows = Array.from({ length: 6_000 }, (_, at) => `K${at}`).join("\n");
    const { id } = await stage(supervisor, "people", `ref\n${rows}\n`);
    await admin.query(
      `create function public.slow() returns trigger language plpgsql as
         $$ begin perform pg_sleep(0.6); return null; end $$`,
    );
    await admin.query(
      "create trigger slow after insert on core.person for each statement execute function public.slow()",
    );
    const path = `${supervisor.base}/imports/${id}`;
    const begun = await supervisor.client.call("post", `${path}/commit`, { body: {} });
    expect(begun.status).toBe(202);
    const read = async () => (await supervisor.client.get(path)).body as Import;
    const end = Date.now() + 20_000;
    let state = await read();
    while (state.state === "committing" && state.progress < 0.3 && Date.now() < end) {
      await new Promise((resolve) => setTimeout(resolve, 20));
      state = await read();
    }
    expect(state).toMatchObject({ state: "committing" });
    expect(state.progress).toBeGreaterThan(0.3);
    const killed = await admin.query(
      `select pg_terminate_backend(pid) from pg_stat_activity
       where datname = current_database() and usename = 'strandline_supervisor'
         and xact_start is not null and pid <> pg_backend_pid()`,
    );
    expect(killed.rowCount).toBeGreaterThan(0);
    while (state.state === "committing" && Date.now() < end) {
      await new Promise((resolve) => setTimeout(resolve, 20));
      state = await read();
    }
    await admin.query("drop function public.slow() cascade");
    expect(state).toMatchObject({ state: "failed", progress: 0 });
    expect(await count("core.person")).toBe(0);
    expect(await count("identity.search_token")).toBe(0);
    const done = await commit(supervisor, id);
    expect(done).toMatchObject({ state: "committed", counts: { addedPeople: 6_000 } });
    expect(await count("core.person")).toBe(6_000);
  });

  it("has a test for every number but the file of a million rows", () => {
    const apart = ["28", "39", "46", "47", "50", "56"];
    const ids = new Set([...TORTURE_FILES.map(({ id }) => id.slice(0, 2)), ...apart]);
    const wanted = Array.from({ length: 56 }, (_, at) => String(at + 1).padStart(2, "0"));
    expect(wanted.filter((id) => !ids.has(id))).toEqual(["38"]);
  });
});
