import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { LIMITS } from "../../../shared/contracts/common.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { bringIn, commit, stage } from "../../support/imports.ts";

let app: TestApp;
let admin: pg.Client;
let supervisor: Member;
let id: string;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  id = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", id);
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

async function upload(text: Buffer | string, name = "file.csv", kind = "people") {
  return supervisor.client.upload(`${supervisor.base}/imports`, { kind }, text, name);
}

async function stored(): Promise<Record<string, number>> {
  const found = await admin.query(
    `select (select count(*)::int from core.import) as imports,
       (select count(*)::int from identity.import_stage) as stages,
       (select count(*)::int from core.person) as people,
       (select count(*)::int from audit.event where action like 'import%') as events`,
  );
  return found.rows[0];
}

describe("uploads that are refused", () => {
  it.each([
    ["zip", Buffer.from("504b03041400000008", "hex"), [{ path: "file", code: "not_csv" }]],
    ["gzip", Buffer.from("1f8b080000000000", "hex"), [{ path: "file", code: "not_csv" }]],
    ["PDF", Buffer.from("%PDF-1.4 ref,name"), [{ path: "file", code: "not_csv" }]],
    [
      "latin-1",
      Buffer.from("ref,name\nA,Ren\xe9e\n", "latin1"),
      [{ path: "file.line.2.byte.15", code: "encoding" }],
    ],
    ["empty", Buffer.alloc(0), [{ path: "file", code: "empty_file" }]],
    [
      "late unclosed quote",
      Buffer.from(`ref,name\n${"A,b\n".replaceAll("A", "Q")}B,"open\n`),
      [{ path: "file.line.3", code: "unclosed_quote" }],
    ],
    [
      "prototype column",
      Buffer.from("ref,__proto__\nA,b\n"),
      [{ path: "file.columns.2", code: "unknown_column" }],
    ],
  ])("%s: 422 with codes, nothing kept", async (_name, bytes, errors) => {
    const before = await stored();
    const answer = await upload(bytes);
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ code: "invalid", errors });
    expect(await stored()).toEqual(before);
  });

  it("a kind that is none, a missing file, a missing key, a file too large", async () => {
    const path = `${supervisor.base}/imports`;
    expect((await upload("ref\nA\n", "a.csv", "places")).body.errors).toEqual([
      { path: "kind", code: "not_in_list" },
    ]);
    const bare = await supervisor.client.call("post", path, { key: true }).field("kind", "people");
    expect(bare.status).toBe(422);
    expect(bare.body.errors).toEqual([{ path: "file", code: "required" }]);
    const keyless = await supervisor.client
      .call("post", path)
      .field("kind", "people")
      .attach("file", Buffer.from("ref\nA\n"), "a.csv");
    expect(keyless.status).toBe(400);
    expect(keyless.body.code).toBe("idempotency_key_required");
    const large = await upload(Buffer.alloc(LIMITS.fileBytes + 1, "a"));
    expect(large.status).toBe(413);
  });

  it("roles that never import, and imports of elsewhere", async () => {
    const tracer = await signInAs(app, "tracer", id);
    const answer = await tracer.client.upload(
      `${tracer.base}/imports`,
      { kind: "people" },
      "ref\nA\n",
    );
    expect(answer.status).toBe(403);
    const { id: importId } = await stage(supervisor, "people", "ref\nElsewhere\n");
    const other = await signInAs(app, "supervisor", await buildInvestigation(app));
    const path = `${other.base}/imports/${importId}`;
    expect((await other.client.get(path)).status).toBe(404);
    expect((await other.client.call("post", `${path}/commit`, { body: {} })).status).toBe(404);
  });
});

describe("uploads that are taken literally", () => {
  it("whatever the file is called", async () => {
    for (const name of ["../../x.csv", "..\\x.csv", "a\r\nSet-Cookie: b.csv", "x.zip", ""]) {
      const answer = await upload(`ref\nN-${randomUUID()}\n`, name || "blob");
      expect(answer.status).toBe(201);
      expect(JSON.stringify(answer.body)).not.toContain("x.csv");
    }
  });

  it("markup and formulas in names come back byte for byte", async () => {
    const names = ["<img src=x onerror=alert(1)>", "=HYPERLINK(1)", "+1+1", "@SUM(1)", "＝1"];
    await bringIn(
      supervisor,
      "people",
      `ref,name\n${names.map((name, at) => `M-${at},${name}`).join("\n")}\n`,
    );
    const list = await supervisor.client.get(`${supervisor.base}/people`, { pageSize: "200" });
    const found = (list.body.items as { name: string | null }[]).map((person) => person.name);
    expect(found).toEqual(expect.arrayContaining(names));
  });

  it("a replayed upload answers with its receipt and stages nothing again", async () => {
    const key = randomUUID();
    const send = () =>
      supervisor.client
        .call("post", `${supervisor.base}/imports`, { key })
        .field("kind", "people")
        .attach("file", Buffer.from("ref,name\nR-1,Replayed One\n"), "a.csv");
    const first = await send();
    const events = (await stored()).events;
    const second = await send();
    expect(second.status).toBe(201);
    expect(second.body).toEqual(first.body);
    expect((await stored()).events).toBe(events);
  });
});

describe("identity values", () => {
  it("stand in no problem, log, receipt, core table or event", async () => {
    const canaries = ["Zq7CanaryName", "zq7canary@example.org", "Zq7CanaryStreet", "Zq7CanaryRef"];
    const [name, email, address, ref] = canaries;
    const header = "ref,name,email,address,birth_date,household";
    const done = await bringIn(
      supervisor,
      "people",
      `${header}\n${ref},${name},${email},${address},1971-06,${name}\n`,
    );
    expect(done.counts).toMatchObject({ addedPeople: 1, skipped: 0 });
    const answers = [
      await upload(`${header}\n${ref},${name}x,other@example.org,${address}2,1972-06,H2\n`),
      await upload(`${name},${email}\n${ref},${address}\n`),
      await upload(`ref,name,birth_date\n${ref}2,${name}\0,${address}\n`),
      await upload(`ref,name\n${ref}3,"${name}`),
      await upload(`ref_a,ref_b,minutes\n${ref},${ref}9,${name}\n`, "f.csv", "pairs"),
    ];
    expect(answers.map((answer) => answer.status)).toEqual([201, 422, 201, 422, 201]);
    const places = [answers.map((answer) => answer.text).join(), app.logs.join()];
    const tables = await admin.query(
      `select format('%I.%I', schemaname, tablename) as name from pg_tables
       where schemaname in ('core', 'auth', 'audit', 'identity')`,
    );
    for (const { name: table } of tables.rows) {
      const rows = await admin.query(`select t::text as row from ${table} t`);
      places.push(rows.rows.map(({ row }) => row).join("\n"));
    }
    for (const canary of canaries) {
      for (const place of places) expect(place.toLowerCase()).not.toContain(canary.toLowerCase());
    }
  });
});

describe("a commit that cannot be finished", () => {
  it("stores nothing, says so, and can be tried again", async () => {
    const people = (await stored()).people;
    const { id: importId } = await stage(
      supervisor,
      "people",
      "ref,name\nF-1,Fay One\nF-2,Fay Two\n",
    );
    await admin.query(
      `create function public.refuse() returns trigger language plpgsql as
         $$ begin raise exception 'disk full' using errcode = '53100'; end $$`,
    );
    await admin.query(
      "create trigger refuse before insert on identity.search_token execute function public.refuse()",
    );
    const failed = await commit(supervisor, importId);
    await admin.query("drop function public.refuse() cascade");
    expect(failed).toMatchObject({
      state: "failed",
      progress: 0,
      problems: [{ line: 0, column: "file", code: "commit_failed" }],
    });
    expect((await stored()).people).toBe(people);
    const done = await commit(supervisor, importId);
    expect(done).toMatchObject({ state: "committed", problems: [], counts: { addedPeople: 2 } });
  });

  it("because the person signed out meanwhile", async () => {
    const people = (await stored()).people;
    const leaving = await signInAs(app, "supervisor", id);
    const { id: importId } = await stage(leaving, "people", "ref,name\nS-1,Sol One\n");
    await admin.query(
      `create function public.wait() returns trigger language plpgsql as
         $$ begin perform pg_sleep(0.5); return new; end $$`,
    );
    await admin.query(
      "create trigger wait before insert on core.person execute function public.wait()",
    );
    const path = `${supervisor.base}/imports/${importId}`;
    const begun = await leaving.client.call("post", `${path}/commit`, { body: {} });
    expect(begun.status).toBe(202);
    await leaving.client.call("delete", "/api/session");
    let body = (await supervisor.client.get(path)).body;
    const end = Date.now() + 20_000;
    while (body.state === "committing" && Date.now() < end) {
      await new Promise((resolve) => setTimeout(resolve, 25));
      body = (await supervisor.client.get(path)).body;
    }
    await admin.query("drop function public.wait() cascade");
    expect(body).toMatchObject({ state: "failed", problems: [{ line: 0, column: "file" }] });
    expect((await stored()).people).toBe(people);
    expect((await commit(supervisor, importId)).counts).toMatchObject({ addedPeople: 1 });
  });
});
