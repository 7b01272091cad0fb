import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { groupList } from "../../../shared/contracts/network.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { contactRow, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let id: string;
let tracer: Member;
let supervisor: Member;
let epidemiologist: Member;

beforeAll(async () => {
  app = await startTestApp();
  id = await buildInvestigation(app);
  tracer = await signInAs(app, "tracer", id);
  supervisor = await signInAs(app, "supervisor", id);
  epidemiologist = await signInAs(app, "epidemiologist", id);
});

afterAll(async () => {
  await app?.close();
});

/** Interviews a new case that names so many new contacts; the answer's graph version. */
async function interview(name: string, contacts: number): Promise<number> {
  const caseId = await register(tracer, { name });
  const answer = await submit(tracer, caseId, {
    contacts: Array.from({ length: contacts }, (_, k) => contactRow({ name: `${name} Ally${k}` })),
  });
  expect(answer.status).toBe(201);
  return answer.body.graphVersion;
}

/** The groups once they hold a version, waited for within two seconds. */
async function groupsAt(version: number, query: Record<string, string> = {}) {
  for (let turn = 0; turn < 100; turn++) {
    const answer = await supervisor.client.get(`${supervisor.base}/groups`, query);
    expect(answer.status).toBe(200);
    const groups = groupList.parse(answer.body);
    if (groups.graphVersion >= version) return groups;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  throw new Error("the groups did not follow");
}

describe("GET groups", () => {
  it("is empty before anybody was named", async () => {
    await register(tracer, { name: "Lone Person" });
    const groups = await supervisor.client.get(`${supervisor.base}/groups`);
    expect(groups.body).toMatchObject({ items: [], total: 0, page: 1 });
  });

  it("shows a submitted interview as a group that has grown by its people", async () => {
    const groups = await groupsAt(await interview("Ada Quill", 12));
    expect(groups.items).toEqual([
      { id: expect.any(String), size: 13, cases: 1, contacts: 12, grownSince: 13 },
    ]);
    expect(new Date(groups.since).getTime()).toBeLessThanOrEqual(Date.now());
  });

  it("sorts and pages", async () => {
    const version = await interview("Bea Rowe", 3);
    const all = await groupsAt(version);
    expect(all.items.map(({ size }) => size)).toEqual([13, 4]);
    const up = await groupsAt(version, { sort: "size" });
    expect(up.items.map(({ size }) => size)).toEqual([4, 13]);
    const second = await groupsAt(version, { sort: "-grownSince", page: "2", pageSize: "1" });
    expect(second).toMatchObject({ total: 2, page: 2, pageSize: 1, items: [{ size: 4 }] });
    const one = all.items[1]?.id ?? "";
    expect((await groupsAt(version, { q: one.slice(0, 8) })).items).toEqual([all.items[1]]);
    const refused = await supervisor.client.get(`${supervisor.base}/groups`, { sort: "name" });
    expect(refused.status).toBe(422);
    expect(refused.body.errors).toEqual([{ path: "sort", code: "not_sortable" }]);
  });

  it("carries no name, and is for supervisors and epidemiologists", async () => {
    const seen = await epidemiologist.client.get(`${epidemiologist.base}/groups`);
    expect(seen.status).toBe(200);
    expect(seen.text).not.toMatch(/Ada|Quill|Ally|Rowe/);
    expect((await tracer.client.get(`${tracer.base}/groups`)).status).toBe(403);
    const officer = await signInAs(app, "officer", id);
    expect((await officer.client.get(`${officer.base}/groups`)).status).toBe(403);
    const elsewhere = await buildInvestigation(app);
    const other = `/api/investigations/${elsewhere}/groups`;
    expect((await supervisor.client.get(other)).status).toBe(404);
  });
});
