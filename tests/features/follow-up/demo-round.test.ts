import { afterAll, beforeAll, expect, test } from "vitest";
import { generateOutbreak } from "../../../drizzle/seed/generator/generate-outbreak.ts";
import type { Outbreak } from "../../../drizzle/seed/generator/types.ts";
import { dayIn, now } from "../../../server/clock.ts";
import { type FollowUpItem, followUpList } from "../../../shared/contracts/follow-up.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin } from "../../support/field-work.ts";
import { loadGenerated } from "../../support/load-generated.ts";

const SETTINGS = {
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
};
let app: TestApp;
let supervisor: Member;
let outbreak: Outbreak;
const people: FollowUpItem[] = [];

beforeAll(async () => {
  app = await startTestApp();
  const investigationId = await buildInvestigation(app, SETTINGS);
  supervisor = await signInAs(app, "supervisor", investigationId);
  const lastDay = dayIn("UTC", now());
  outbreak = generateOutbreak({ seed: 18, lastDay, tracers: ["first"], ...SETTINGS });
  await loadGenerated(app, investigationId, outbreak);
  for (let page = 1; page < 20; page += 1) {
    const answer = await supervisor.client.get(`${supervisor.base}/follow-up`, {
      show: "all",
      pageSize: "200",
      page: String(page),
    });
    const list = followUpList.parse(answer.body);
    people.push(...list.items);
    if (people.length >= list.total) break;
  }
});

afterAll(async () => {
  await app?.close();
});

test("the rounds of the story show its states, with calls answered and not", () => {
  const states = new Set(people.map((item) => item.state));
  expect([...states]).toEqual(
    expect.arrayContaining([
      "under_follow_up",
      "completed",
      "lost",
      "became_case",
      "moved",
      "refused",
    ]),
  );
  const days = people.flatMap((item) => item.dueDays.map((due) => due.outcome));
  expect(days.filter((outcome) => outcome === "spoken").length).toBeGreaterThan(100);
  expect(days).toContain("not_reached");
});

test("whom the story has lost is lost here, or became a case, or was never dated", () => {
  const lost = outbreak.story.lostContacts.map((index) => outbreak.people[index]?.name);
  expect(lost.length).toBeGreaterThan(10);
  const listed = lost.flatMap((name) => people.filter((item) => item.name === name));
  const others = listed.filter((item) => item.state !== "lost").map((item) => item.state);
  expect(new Set(others)).toEqual(new Set(["became_case"]));
  // The rest have no whole last exposure day, and so no due days.
  expect(listed.length).toBeGreaterThan(lost.length * 0.7);
});

test("symptomatic contacts and those who stand with them come first", () => {
  const first = people.findIndex(
    (item) =>
      !item.symptomatic &&
      !people.some((one) => one.symptomatic && item.together && one.together === item.together),
  );
  expect(first).toBeGreaterThan(0);
  expect(people.slice(first).some((item) => item.symptomatic)).toBe(false);
});

test("those who stand together are neighbours in the list", () => {
  const words = people.map((item) => item.together).filter((word) => word !== null);
  expect(words.length).toBeGreaterThan(1);
  for (const word of new Set(words)) {
    const places = people.flatMap((item, place) => (item.together === word ? [place] : []));
    expect(places.length, word).toBeGreaterThan(1);
    expect((places.at(-1) ?? 0) - (places[0] ?? 0), word).toBe(places.length - 1);
  }
});

test("a tracer who holds everybody reads the list in the supervisor's order", async () => {
  const tracer = await signInAs(app, "tracer", supervisor.investigationId);
  await asAdmin(
    app,
    "update core.person set assigned_account_id = $2 where investigation_id = $1",
    [supervisor.investigationId, tracer.accountId],
  );
  const order = async (member: Member, query: Record<string, string>) => {
    const answer = await member.client.get(`${member.base}/follow-up`, query);
    const { items, total } = followUpList.parse(answer.body);
    // A shared number's word is good for one list only: who has the same one is what counts.
    const lines = items.map(({ id, together, symptomatic }) => [
      id,
      together?.startsWith("phone-")
        ? items.findIndex((one) => one.together === together)
        : together,
      symptomatic,
    ]);
    return { total, lines };
  };
  for (const show of ["due", "all", "ended", "without_day_zero"]) {
    for (const sort of ["lastDueDay", "-lastDueDay"]) {
      for (const page of ["1", "2", "3", "9"]) {
        const query = { show, sort, page, pageSize: "17" };
        expect(await order(tracer, query), JSON.stringify(query)).toEqual(
          await order(supervisor, query),
        );
      }
    }
  }
});
