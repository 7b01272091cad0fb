import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.close());

async function register(who: Member, body: Record<string, unknown>): Promise<string> {
  const made = await who.client.post(`${who.base}/people`, body);
  expect(made.status, JSON.stringify(made.body)).toBe(201);
  return made.body.id as string;
}

describe("the access record", () => {
  interface Event {
    action: string;
    person_ids: string[];
    fields: string[];
    counts: Record<string, number>;
  }
  async function eventsOf(investigationId: string): Promise<Event[]> {
    const admin = new pg.Client({ connectionString: app.adminUrl });
    await admin.connect();
    const found = await admin.query(
      `select action, person_ids, fields, counts from audit.event
       where investigation_id = $1 order by at`,
      [investigationId],
    );
    await admin.end();
    return found.rows;
  }

  it("writes one event for a list, one for a page, none for an answer without identity", async () => {
    const inv = await buildInvestigation(app);
    const supervisor = await signInAs(app, "supervisor", inv);
    const epidemiologist = await signInAs(app, "epidemiologist", inv);
    const id = await register(supervisor, { name: "Watched Person", address: "2 Invented Street" });
    const before = (await eventsOf(inv)).length;
    await supervisor.client.get(`${supervisor.base}/people`);
    await epidemiologist.client.get(`${epidemiologist.base}/people`);
    await supervisor.client.get(`${supervisor.base}/people/${id}`);
    const added = (await eventsOf(inv)).slice(before);
    expect(added.map((e) => e.action)).toEqual(["people.listed", "person.opened"]);
    expect(added[0]).toMatchObject({ person_ids: [id] });
    expect(added[0]?.fields.sort()).toEqual(["name", "phone", "ref"]);
    expect(JSON.stringify(added)).not.toMatch(/Watched|Invented/);
  });

  it("has one event for a page with those met on it, and one for a search that finds nobody", async () => {
    const inv = await buildInvestigation(app);
    const supervisor = await signInAs(app, "supervisor", inv);
    const id = await register(supervisor, { name: "Watched Case", household: "The Watched" });
    await supervisor.client.post(`${supervisor.base}/interviews`, {
      personId: id,
      outcome: "complete",
      contacts: [{ name: "Named Contact" }],
    });
    const before = (await eventsOf(inv)).length;
    const page = await supervisor.client.get(`${supervisor.base}/people/${id}`);
    await supervisor.client.post(`${supervisor.base}/people/search`, { q: "Absentee" });
    const [opened, searched, ...more] = (await eventsOf(inv)).slice(before);
    expect(more).toEqual([]);
    expect(opened?.action).toBe("person.opened");
    expect(opened?.person_ids.sort()).toEqual([id, page.body.pairs[0].personId].sort());
    expect(opened?.fields).toEqual(expect.arrayContaining(["address", "household", "name"]));
    expect(searched).toMatchObject({
      action: "people.searched",
      person_ids: [],
      counts: { found: 0 },
    });
  });
});
