import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Role } from "../../../shared/roles.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInEveryone } from "../../support/factories.ts";

let app: TestApp;
let team: Record<Role, Member>;
const ids: Record<string, string> = {};

/** Onset, report and what else matters, by a person's letter. */
const PEOPLE: Record<string, Record<string, unknown>> = {
  a: { classification: "confirmed", onsetDate: "2026-05-03", area: "North" },
  b: { classification: "probable", onsetDate: "2026-05-10", area: "North" },
  c: { classification: "contact", area: "South", reportDate: "2026-05-11" },
  d: { classification: "confirmed", onsetDate: "2026-05", reportDate: "2026-05-02" },
  e: { classification: "suspected", onsetDate: "unknown" },
  f: { classification: "contact", onsetDate: "2026-04-30", occupation: "baker" },
};

beforeAll(async () => {
  app = await startTestApp();
  team = await signInEveryone(app, await buildInvestigation(app));
  const { client, base } = team.supervisor;
  for (const [letter, told] of Object.entries(PEOPLE)) {
    const made = await client.post(`${base}/people`, { name: `Person ${letter}`, ...told });
    expect(made.status, JSON.stringify(made.body)).toBe(201);
    ids[letter] = made.body.id;
  }
});
afterAll(() => app.close());

async function list(who: Role, query: Record<string, unknown>) {
  const { client, base } = team[who];
  return client.get(`${base}/people`, query as Record<string, string>);
}

/** Letters of the people an answer holds, in its order. */
function letters(answer: { body: { items: { id: string }[] } }): string {
  const byId = new Map(Object.entries(ids).map(([letter, id]) => [id, letter]));
  return answer.body.items.map((item) => byId.get(item.id) ?? "?").join("");
}

const sorted = (text: string) => [...text].sort().join("");

describe("order and pages", () => {
  it("puts those without a value last both ways, over pages of any size", async () => {
    const up = letters(await list("supervisor", { sort: "onsetDate" }));
    const down = letters(await list("supervisor", { sort: "-onsetDate" }));
    expect(up).toBe("fdabec");
    expect(down).toBe("ebadfc");
    for (const role of ["supervisor", "epidemiologist"] as const) {
      for (const sort of ["-onsetDate", "onsetDate", "-reportDate", "sex", "-area"]) {
        const whole = letters(await list(role, { sort }));
        for (const pageSize of ["2", "4"]) {
          let parts = "";
          for (let page = 1; page <= 3; page++) {
            const answer = await list(role, { sort, pageSize, page: String(page) });
            expect(answer.body.total).toBe(6);
            parts += letters(answer);
          }
          expect([role, sort, pageSize, parts]).toEqual([role, sort, pageSize, whole]);
        }
      }
    }
  });

  it("counts what a tracer sees, also beyond the last page", async () => {
    const { client, base } = team.supervisor;
    for (const letter of ["a", "b"]) {
      const seen = await client.get(`${base}/people/${ids[letter]}`);
      await client.call("patch", `${base}/people/${ids[letter]}`, {
        body: {
          version: seen.body.version,
          assignedTo: team.tracer.accountId,
        },
      });
    }
    const first = await list("tracer", { sort: "-onsetDate", pageSize: "1" });
    expect([letters(first), first.body.total]).toEqual(["b", 2]);
    expect(first.body.items[0].name).toBe("Person b");
    const beyond = await list("tracer", { page: "9" });
    expect([beyond.body.items, beyond.body.total]).toEqual([[], 2]);
  });
});

describe("filters", () => {
  const cases: [string, Record<string, string>, string][] = [
    ["cases of any certainty", { classification: "case" }, "abde"],
    ["one class", { classification: "contact" }, "cf"],
    ["an area", { area: "North" }, "ab"],
    ["no interview yet", { interviewState: "none" }, "abcdef"],
    ["a complete interview", { interviewState: "complete" }, ""],
    ["nobody's", { assigned: "none" }, "cdef"],
    ["onset from a day on", { onsetFrom: "2026-05-04" }, "bd"],
    ["onset up to a day", { onsetTo: "2026-05-03" }, "adf"],
    ["onset between two days", { onsetFrom: "2026-05-01", onsetTo: "2026-05-05" }, "ad"],
    ["report between two days", { reportFrom: "2026-05-10", reportTo: "2026-05-12" }, "c"],
    ["several at once", { classification: "confirmed", onsetTo: "2026-05-03" }, "ad"],
    ["no check of follow-up", { followUp: "no" }, "abcdef"],
    ["some check of follow-up", { followUp: "yes" }, ""],
  ];
  it.each(cases)("%s", async (_words, query, wanted) => {
    const answer = await list("supervisor", query);
    expect(answer.status).toBe(200);
    expect([sorted(letters(answer)), answer.body.total]).toEqual([wanted, wanted.length]);
  });

  it("a member, oneself, one's team", async () => {
    const tracer = team.tracer.accountId;
    expect(sorted(letters(await list("supervisor", { assigned: tracer })))).toBe("ab");
    expect(sorted(letters(await list("tracer", { assigned: "me" })))).toBe("ab");
    expect((await list("tracer", { assigned: "team" })).body.total).toBe(0);
    expect((await list("officer", { assigned: tracer })).body.total).toBe(2);
  });

  it("refuses what cannot be read, what is no choice, and a range turned round", async () => {
    const wrong: [Role, Record<string, string>, string, string][] = [
      ["epidemiologist", { assigned: "none" }, "assigned", "not_in_list"],
      ["epidemiologist", { assigned: team.tracer.accountId }, "assigned", "not_in_list"],
      ["supervisor", { assigned: "everybody" }, "assigned", "not_in_list"],
      ["supervisor", { interviewState: "often" }, "interviewState", "not_in_list"],
      ["supervisor", { onsetFrom: "2026-05" }, "onsetFrom", "not_a_day"],
      [
        "supervisor",
        { onsetFrom: "2026-05-09", onsetTo: "2026-05-01" },
        "onsetTo",
        "last_before_first",
      ],
    ];
    for (const [role, query, path, code] of wrong) {
      const answer = await list(role, query);
      expect([answer.status, answer.body.errors]).toEqual([422, [{ path, code }]]);
    }
  });

  it("goes with a search in a body", async () => {
    const { client, base } = team.supervisor;
    const found = await client.post(`${base}/people/search`, {
      q: "person",
      classification: "case",
      onsetFrom: "2026-05-04",
    });
    expect([found.status, sorted(letters(found)), found.body.total]).toEqual([200, "bd", 2]);
  });
});

describe("saved filters", () => {
  const filter = { classification: "case", onsetFrom: "2026-05-01", sort: "-onsetDate" };

  it("are kept, renamed and deleted by their owner, who alone sees them", async () => {
    const { client, base } = team.supervisor;
    const path = `${base}/people/filters`;
    const saved = await client.post(path, { name: "Recent cases", filter });
    expect(saved.status).toBe(200);
    expect(saved.body).toMatchObject({ name: "Recent cases", filter, version: 1 });
    // Sent twice it is kept once; the name stands for one question.
    expect((await client.post(path, { name: "Recent cases", filter })).body.id).toBe(saved.body.id);
    const other = await client.post(path, { name: "recent CASES", filter: {} });
    expect(other.body.errors).toEqual([{ path: "name", code: "repeated" }]);
    const named = await client.call("patch", `${path}/${saved.body.id}`, {
      body: { version: 1, name: "May" },
    });
    expect(named.body).toMatchObject({ name: "May", filter, version: 2 });
    const late = await client.call("patch", `${path}/${saved.body.id}`, {
      body: { version: 1, name: "June" },
    });
    expect([late.status, late.body.code]).toEqual([409, "stale_version"]);
    expect((await client.get(path)).body.items).toHaveLength(1);
    for (const role of ["tracer", "epidemiologist", "officer"] as const) {
      const mine = team[role];
      expect((await mine.client.get(`${mine.base}/people/filters`)).body.items).toEqual([]);
      const stolen = await mine.client.call(
        "delete",
        `${mine.base}/people/filters/${saved.body.id}`,
      );
      expect(stolen.status).toBe(404);
    }
    expect((await client.call("delete", `${path}/${saved.body.id}`)).status).toBe(204);
    expect((await client.get(path)).body.items).toEqual([]);
  });

  it("never hold what was typed, nor what the role may not ask", async () => {
    const { client, base } = team.supervisor;
    const path = `${base}/people/filters`;
    const typed = await client.post(path, { name: "Search", filter: { q: "person a" } });
    expect(typed.status).toBe(422);
    const area = await client.post(path, { name: "Area", filter: { area: "Person a" } });
    expect(area.body.errors).toEqual([{ path: "filter.area", code: "not_known" }]);
    expect((await client.post(path, { name: "North", filter: { area: "North" } })).status).toBe(
      200,
    );
    const reader = team.epidemiologist;
    const refused = await reader.client.post(`${reader.base}/people/filters`, {
      name: "Mine",
      filter: { assigned: "me" },
    });
    expect(refused.status).toBe(422);
    const unsorted = await client.post(path, { name: "By name", filter: { sort: "name" } });
    expect(unsorted.body.errors).toEqual([{ path: "sort", code: "not_sortable" }]);
    const unnamed = await client.post(path, { name: "  ", filter });
    expect(unnamed.body.errors).toEqual([{ path: "name", code: "required" }]);
  });
});
