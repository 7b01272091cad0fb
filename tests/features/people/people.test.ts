import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Role } from "../../../shared/roles.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInEveryone } from "../../support/factories.ts";

let app: TestApp;
let investigation: string;
let team: Record<Role, Member>;

const KEPT = {
  ref: "MR-1001",
  name: "Wilhelmina Testperson",
  phone: "020 7946 0018",
  email: "Wilhelmina@Example.org",
  birthDate: "1980-02",
  sex: "female",
  address: "1 Invented Street",
  area: "Hillfoot",
  occupation: "teacher",
  household: "The Testpersons",
  classification: "confirmed",
  onsetDate: "2026-05-03",
  specimenDate: "2026-05-04",
  result: "positive",
  resultDate: "2026-05-05",
  reportDate: "2026-05-05",
  isolationDate: "2026-05-06",
  note: "Leave a message with nobody",
};

beforeAll(async () => {
  app = await startTestApp();
  investigation = await buildInvestigation(app);
  team = await signInEveryone(app, investigation);
});
afterAll(() => app.close());

async function register(who: Member, body: Record<string, unknown>): Promise<string> {
  const made = await who.client.post(`${who.base}/people`, body);
  expect(made.status, JSON.stringify(made.body)).toBe(201);
  return made.body.id as string;
}

describe("registering a person", () => {
  it("takes every column of a people file, an earlier interview as one held on its day", async () => {
    const told = { ...KEPT, ref: "MR-1002", interviewed: "yes", interviewDate: "2026-05-05" };
    const id = await register(team.supervisor, told);
    const page = await team.supervisor.client.get(`${team.supervisor.base}/people/${id}`);
    expect(page.body).toMatchObject({
      interviewed: "yes",
      interviewDate: "2026-05-05",
      interviewState: "complete",
    });
    expect(page.body.attempts).toMatchObject([{ outcome: "complete" }]);
    expect(page.body.attempts[0].heldAt).toBe("2026-05-05T12:00:00.000Z");
    const coming = await team.tracer.client.post(`${team.tracer.base}/people`, {
      name: "Nobody Yet",
      interviewed: "yes",
      interviewDate: "2099-01-01",
    });
    expect(coming.body.errors).toEqual([{ path: "interviewDate", code: "in_future" }]);
  });

  it("refuses a form in which nothing is known", async () => {
    for (const body of [{}, { name: " ", area: "" }]) {
      const refused = await team.tracer.client.post(`${team.tracer.base}/people`, body);
      expect(refused.status).toBe(422);
      expect(refused.body.errors).toEqual([{ path: "name", code: "required" }]);
    }
  });

  it("keeps every field and gives it back, e-mail in lower case and partial dates partial", async () => {
    const id = await register(team.supervisor, KEPT);
    const page = await team.supervisor.client.get(`${team.supervisor.base}/people/${id}`);
    expect(page.status).toBe(200);
    expect(page.body).toMatchObject({ ...KEPT, email: "wilhelmina@example.org", ageBand: "45-64" });
    expect(page.body.classifications).toHaveLength(1);
    // methods A.2 with the default window of 2 days before and 10 after, ended by isolation.
    expect(page.body.windows.infectious).toEqual({
      from: "2026-05-01",
      to: "2026-05-06",
      basis: "onset",
    });
  });

  it("keeps unknown, refused and not asked apart", async () => {
    const id = await register(team.supervisor, {
      name: "Three Values",
      phone: "refused",
      onsetDate: "unknown",
    });
    const { body } = await team.supervisor.client.get(`${team.supervisor.base}/people/${id}`);
    expect([body.phone, body.onsetDate, body.email, body.isolationDate]).toEqual([
      "refused",
      "unknown",
      null,
      null,
    ]);
  });

  it("says what is wrong, field by field, and stores nothing", async () => {
    const before = await team.supervisor.client.get(`${team.supervisor.base}/people`);
    const bad = await team.supervisor.client.post(`${team.supervisor.base}/people`, {
      name: "x".repeat(500),
      phone: "not a phone",
      onsetDate: "2023-02-29",
      reportDate: "2099-01-01",
      sex: "maybe",
      surprise: 1,
    });
    expect(bad.status).toBe(422);
    expect(bad.headers["content-type"]).toContain("application/problem+json");
    const codes = Object.fromEntries(
      bad.body.errors.map((e: { path: string; code: string }) => [e.path, e.code]),
    );
    expect(codes).toMatchObject({
      name: "too_long",
      onsetDate: "not_a_day",
      sex: "not_in_list",
      "": "unknown_key",
    });
    const later = await team.supervisor.client.post(`${team.supervisor.base}/people`, {
      phone: "1.5E+11",
      onsetDate: "2099-01-01",
    });
    expect(later.body.errors).toEqual([
      { path: "onsetDate", code: "in_future" },
      { path: "phone", code: "not_a_phone" },
    ]);
    const after = await team.supervisor.client.get(`${team.supervisor.base}/people`);
    expect(after.body.total).toBe(before.body.total);
  });

  it("refuses characters that cannot be kept, and never fails on them", async () => {
    for (const name of ["a\u0000b", "\ud800", "\u0007bell"]) {
      const bad = await team.supervisor.client.post(`${team.supervisor.base}/people`, { name });
      expect(bad.status).toBe(422);
    }
    const proto = await team.supervisor.client
      .call("post", `${team.supervisor.base}/people`, {
        key: true,
        headers: { "Content-Type": "application/json" },
      })
      .send('{"__proto__":{"role":"officer"},"name":"Proto"}');
    expect(proto.status).toBe(422);
    expect(({} as Record<string, unknown>).role).toBeUndefined();
  });

  it("makes one person of one key, however often it is sent", async () => {
    const key = randomUUID();
    const send = () =>
      team.supervisor.client.post(`${team.supervisor.base}/people`, { name: "Once Only" }, key);
    const answers = await Promise.all(Array.from({ length: 8 }, send));
    const made = answers.filter((a) => a.status === 201);
    expect(new Set(made.map((a) => a.body.id)).size).toBe(1);
    expect(answers.every((a) => a.status === 201 || a.body.code === "in_flight")).toBe(true);
    const other = await team.supervisor.client.post(
      `${team.supervisor.base}/people`,
      { name: "Another" },
      key,
    );
    expect([other.status, other.body.code]).toEqual([422, "key_reused"]);
  });

  it("refuses a reference that is taken", async () => {
    const again = await team.supervisor.client.post(`${team.supervisor.base}/people`, {
      ref: " MR-1001 ",
    });
    expect(again.body.errors).toEqual([{ path: "ref", code: "ref_taken" }]);
  });
});

describe("what each role gets", () => {
  it("gives the epidemiologist and the officer no name", async () => {
    const id = await register(team.supervisor, { ...KEPT, ref: "MR-2002" });
    for (const role of ["epidemiologist", "officer"] as const) {
      const { client, base } = team[role];
      const page = await client.get(`${base}/people/${id}`);
      const list = await client.get(`${base}/people`);
      expect(page.status).toBe(200);
      for (const answer of [page, list]) {
        expect(answer.text).not.toMatch(/Wilhelmina|Testperson|7946|Invented Street|nobody/i);
      }
    }
    const masked = await team.officer.client.get(`${team.officer.base}/people/${id}`);
    expect(masked.body).toMatchObject({ nameMasked: "W. T.", phoneLast2: "18", birthYear: 1980 });
    expect(masked.body).not.toHaveProperty("name");
  });

  it("refuses to sort by a field that is not readable", async () => {
    for (const [role, sort] of [
      ["epidemiologist", "name"],
      ["supervisor", "phone"],
      ["officer", "-birthDate"],
    ] as const) {
      const answer = await team[role].client.get(`${team[role].base}/people`, { sort });
      expect(answer.body.errors).toEqual([{ path: "sort", code: "not_sortable" }]);
    }
    const sorted = await team.epidemiologist.client.get(`${team.epidemiologist.base}/people`, {
      sort: "-onsetDate",
    });
    expect(sorted.status).toBe(200);
  });

  it("lets a tracer take a person, and a supervisor give them to somebody else or to nobody", async () => {
    const id = await register(team.tracer, { name: "Taken Person" });
    const path = `${team.tracer.base}/people/${id}`;
    const give = (who: Member, version: number, assignedTo: string | null) =>
      who.client.call("patch", path, { body: { version, assignedTo } });
    const back = await give(team.tracer, 1, null);
    expect([back.status, back.body.errors]).toEqual([
      422,
      [{ path: "assignedTo", code: "not_known" }],
    ]);
    expect((await give(team.tracer, 1, team.tracer.accountId)).status).toBe(200);
    expect((await give(team.supervisor, 2, null)).status).toBe(200);
    expect((await team.tracer.client.get(path)).status).toBe(404);
  });

  it("shows a tracer their own people only, and hides the rest like the absent", async () => {
    const theirs = await register(team.tracer, {
      name: "Held Person",
      classification: "confirmed",
    });
    const other = await register(team.supervisor, { name: "Unheld Person" });
    const list = await team.tracer.client.get(`${team.tracer.base}/people`);
    expect(list.body.items.map((p: { id: string }) => p.id)).toEqual([theirs]);
    const hidden = await team.tracer.client.get(`${team.tracer.base}/people/${other}`);
    const absent = await team.tracer.client.get(`${team.tracer.base}/people/${randomUUID()}`);
    expect([hidden.status, absent.status]).toEqual([404, 404]);
    expect(hidden.text).toBe(absent.text);
  });

  it("refuses roles that never have the route", async () => {
    for (const role of ["epidemiologist", "officer"] as const) {
      const made = await team[role].client.post(`${team[role].base}/people`, { name: "No" });
      expect([made.status, made.body.code]).toEqual([403, "role_refused"]);
    }
  });
});

describe("finding people", () => {
  it("finds by whole name part, sound, phone and e-mail, without accents or case", async () => {
    const id = await register(team.supervisor, {
      name: "Zoë Okonkwo-Bräuer",
      phone: "+44 20 7946 0555",
      email: "zoe@example.org",
    });
    for (const q of ["okonkwo", "BRAUER zoe", "020 7946 0555", "ZOE@example.org", "Okonkwoh"]) {
      const found = await team.supervisor.client.post(`${team.supervisor.base}/people/search`, {
        q,
      });
      expect(
        found.body.items.map((p: { id: string }) => p.id),
        q,
      ).toContain(id);
    }
    const part = await team.supervisor.client.post(`${team.supervisor.base}/people/search`, {
      q: "okon",
    });
    expect(part.body.items.map((p: { id: string }) => p.id)).not.toContain(id);
    const hidden = await team.epidemiologist.client.post(
      `${team.epidemiologist.base}/people/search`,
      { q: "okonkwo" },
    );
    expect([hidden.status, hidden.body.total]).toEqual([200, 0]);
  });

  it("offers a tracer nobody out of their scope", async () => {
    await register(team.supervisor, { name: "Hidden Quexley", phone: "020 7946 0777" });
    const typed = { name: "Hidden Quexley", phone: "020 7946 0777" };
    const mine = await team.tracer.client.call("post", `${team.tracer.base}/people/matches`, {
      body: typed,
    });
    const nobody = await team.tracer.client.call("post", `${team.tracer.base}/people/matches`, {
      body: { name: "Nobody Such" },
    });
    expect(mine.body).toEqual(nobody.body);
    const seen = await team.supervisor.client.call(
      "post",
      `${team.supervisor.base}/people/matches`,
      { body: typed },
    );
    expect(seen.body.items[0]).toMatchObject({
      name: "Hidden Quexley",
      phoneLast2: "77",
      matchedOn: ["phone", "name"],
    });
  });
});

describe("changing a person", () => {
  it("changes only what is sent, keeps the history, and refuses a stale version", async () => {
    const id = await register(team.supervisor, {
      name: "Change Me",
      phone: "020 7946 0123",
      classification: "contact",
    });
    const path = `${team.supervisor.base}/people/${id}`;
    const changed = await team.supervisor.client.call("patch", path, {
      body: { version: 1, classification: "probable" },
    });
    expect(changed.status, JSON.stringify(changed.body)).toBe(200);
    expect(changed.body).toMatchObject({
      name: "Change Me",
      phone: "020 7946 0123",
      version: 2,
      becameCase: true,
    });
    expect(
      changed.body.classifications.map((c: { classification: string }) => c.classification),
    ).toEqual(["contact", "probable"]);
    const stale = await team.supervisor.client.call("patch", path, {
      body: { version: 1, area: "Elsewhere" },
    });
    expect([stale.status, stale.body.code]).toEqual([409, "stale_version"]);
    const found = await team.supervisor.client.post(`${team.supervisor.base}/people/search`, {
      q: "020 7946 0123",
    });
    expect(found.body.items.map((p: { id: string }) => p.id)).toContain(id);
    await team.supervisor.client.call("patch", path, { body: { version: 2, phone: null } });
    const gone = await team.supervisor.client.post(`${team.supervisor.base}/people/search`, {
      q: "020 7946 0123",
    });
    expect(gone.body.total).toBe(0);
  });

  it("lets one of fifty editors win", async () => {
    const id = await register(team.supervisor, { name: "Crowded" });
    const path = `${team.supervisor.base}/people/${id}`;
    const answers = await Promise.all(
      Array.from({ length: 50 }, (_, i) =>
        team.supervisor.client.call("patch", path, { body: { version: 1, area: `Area ${i}` } }),
      ),
    );
    expect(answers.filter((a) => a.status === 200)).toHaveLength(1);
    expect(
      answers.filter((a) => a.status !== 200).every((a) => a.status === 409 || a.status === 503),
    ).toBe(true);
  });
});

describe("tests of a person", () => {
  it("keeps several, and copies the first positive to the line list", async () => {
    const id = await register(team.supervisor, { name: "Tested Often" });
    const path = `${team.supervisor.base}/people/${id}/tests`;
    for (const test of [
      { specimenDate: "2026-04-01", kind: "pcr", result: "negative", resultDate: "2026-04-02" },
      { specimenDate: "2026-04-09", kind: "pcr", result: "positive", resultDate: "2026-04-10" },
      { specimenDate: "2026-04-05", kind: "antigen", result: "positive", resultDate: "2026-04-05" },
      { specimenDate: "2026-04-20", kind: "pcr", result: "pending" },
    ]) {
      expect((await team.supervisor.client.post(path, test)).status).toBe(201);
    }
    const list = await team.supervisor.client.get(path);
    expect(list.body.total).toBe(4);
    const person = await team.supervisor.client.get(`${team.supervisor.base}/people/${id}`);
    expect(person.body).toMatchObject({
      specimenDate: "2026-04-05",
      result: "positive",
      resultDate: "2026-04-05",
    });
    const wrong = await team.supervisor.client.post(path, {
      specimenDate: "2026-04-05",
      resultDate: "2026-04-01",
    });
    expect(wrong.body.errors).toEqual([{ path: "resultDate", code: "result_before_specimen" }]);
  });
});
