import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { shiftDay } from "../../../server/clock.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { asAdmin, contactRow, submit } from "../../support/field-work.ts";
import { ago, check, followDesk, type Round, today } from "../../support/follow-desk.ts";

const MONITORED = 5;
let app: TestApp;
let desk: Awaited<ReturnType<typeof followDesk>>;

beforeAll(async () => {
  app = await startTestApp();
  desk = await followDesk(app, MONITORED);
});

afterAll(async () => {
  await app?.close();
});

describe("states", () => {
  const CASES: [name: string, lastExposure: number, rows: Round[], state: string][] = [
    ["nobody tried yet", 1, [], "to_be_notified"],
    ["tried in vain once", 2, [[1, "not_reached"]], "to_be_notified"],
    ["a message was left", 2, [[1, "message"]], "under_follow_up"],
    ["spoken to", 3, [[2, "spoken"]], "under_follow_up"],
    ["three days without a check", 4, [], "lost"],
    [
      "two in vain and a gap",
      5,
      [
        [4, "seen"],
        [3, "not_reached"],
        [1, "not_reached"],
      ],
      "lost",
    ],
    ["two days missed are not three", 4, [[3, "seen"]], "under_follow_up"],
    [
      "found again",
      4,
      [
        [3, "not_reached"],
        [2, "not_reached"],
        [1, "not_reached"],
        [0, "seen"],
      ],
      "under_follow_up",
    ],
    [
      "today in vain makes three",
      3,
      [
        [2, "not_reached"],
        [1, "not_reached"],
        [0, "not_reached"],
      ],
      "lost",
    ],
    [
      "the best of a day counts",
      3,
      [
        [2, "not_reached"],
        [1, "not_reached"],
        [0, "seen"],
        [0, "not_reached"],
      ],
      "under_follow_up",
    ],
    ["last due day seen", 5, [[0, "seen"]], "completed"],
    ["last due day spoken", 6, [[1, "spoken"]], "completed"],
    [
      "last due day by message only",
      6,
      [
        [2, "seen"],
        [1, "message"],
      ],
      "under_follow_up",
    ],
    [
      "last due day missed",
      7,
      [
        [6, "seen"],
        [5, "seen"],
        [4, "seen"],
        [3, "seen"],
      ],
      "under_follow_up",
    ],
    ["seen after the last due day", 7, [[0, "seen"]], "completed"],
  ];
  test.each(CASES)("%s", async (name, lastExposure, rows, state) => {
    const id = await desk.contact(name, ago(lastExposure));
    await desk.checks(id, rows);
    expect((await desk.itemOf(id)).state).toBe(state);
  });

  test("days before somebody came on record are not missed", async () => {
    const id = await desk.contact("late on record", ago(5), {}, today);
    expect(await desk.itemOf(id)).toMatchObject({
      state: "to_be_notified",
      expectedFrom: shiftDay(today, 1),
    });
  });

  test("after how many days a contact is lost is a setting", async () => {
    const id = await desk.contact("setting", ago(4));
    expect((await desk.itemOf(id)).state).toBe("lost");
    await asAdmin(app, "update core.investigation set lost_after_days = 4 where id = $1", [
      desk.investigationId,
    ]);
    expect((await desk.itemOf(id)).state).toBe("to_be_notified");
    expect((await desk.read()).lostAfterDays).toBe(4);
    await asAdmin(app, "update core.investigation set lost_after_days = 3 where id = $1", [
      desk.investigationId,
    ]);
  });

  test("a new exposure moves day 0 forward and keeps the checks", async () => {
    const id = await desk.contact("met again", ago(5));
    await desk.checks(id, [
      [1, "seen"],
      [0, "seen"],
    ]);
    expect((await desk.itemOf(id)).state).toBe("completed");
    await submit(desk.tracer, desk.caseId, {
      contacts: [contactRow({ personId: id, lastExposure: ago(2) })],
    });
    const moved = await desk.itemOf(id);
    expect(moved).toMatchObject({ state: "under_follow_up", dayZero: ago(2) });
    expect(moved.dueDays).toEqual([
      { day: ago(1), outcome: "seen" },
      { day: today, outcome: "seen" },
      ...[1, 2, 3].map((days) => ({ day: shiftDay(today, days), outcome: null })),
    ]);
  });

  test("a contact who becomes a case keeps the history and leaves those due", async () => {
    const id = await desk.contact("turned case", ago(3));
    await desk.checks(id, [
      [2, "seen"],
      [1, "spoken"],
    ]);
    const sick = await check(desk.tracer, id, { outcome: "seen", symptoms: "yes" });
    expect(sick.status).toBe(201);
    const changed = await desk.change(id, { classification: "suspected" });
    expect(changed).toMatchObject({ classification: "suspected", becameCase: true });
    expect(changed.monitoring).toMatchObject({
      dayZero: ago(3),
      outcomes: [
        { day: ago(2), outcome: "seen" },
        { day: ago(1), outcome: "spoken" },
        { day: today, outcome: "seen" },
      ],
    });
    expect(await desk.itemOf(id)).toMatchObject({ state: "became_case", symptomatic: false });
    const due = await desk.read();
    expect(due.items.map((item) => item.id)).not.toContain(id);
  });

  test("a contact found to be none says so and is no longer due", async () => {
    const id = await desk.contact("no contact", ago(2));
    await desk.change(id, { classification: "not_a_case" });
    expect((await desk.itemOf(id)).state).toBe("not_a_contact");
    expect((await desk.read()).items.map((item) => item.id)).not.toContain(id);
  });
});

describe("symptoms", () => {
  test("are on top until a later day says no; on the same day yes stands", async () => {
    const id = await desk.contact("with fever", ago(2));
    const answer = await check(desk.tracer, id, {
      day: ago(1),
      outcome: "spoken",
      symptoms: "yes",
      symptomCodes: ["fever", "rash"],
      respondent: "self",
      note: "Zqt asks for a visit",
    });
    expect(answer.status).toBe(201);
    await check(desk.tracer, id, { day: ago(1), outcome: "seen", symptoms: "no" });
    const list = await desk.read();
    expect(list.items[0]).toMatchObject({ id, symptomatic: true });
    await check(desk.tracer, id, { outcome: "seen", symptoms: "no" });
    expect(await desk.itemOf(id)).toMatchObject({
      symptomatic: false,
      lastCheck: { day: today, outcome: "seen", symptoms: "no" },
    });
  });

  test("keep somebody among those due after the last day", async () => {
    const id = await desk.contact("ill at the end", ago(MONITORED + 2));
    await desk.checks(id, [[3, "seen"]]);
    expect((await desk.read()).items.map((item) => item.id)).not.toContain(id);
    await check(desk.tracer, id, { day: ago(2), outcome: "seen", symptoms: "yes" });
    const item = (await desk.read()).items.find((one) => one.id === id);
    expect(item).toMatchObject({ state: "completed", symptomatic: true });
    await check(desk.tracer, id, { day: ago(1), outcome: "seen", symptoms: "no" });
  });
});

test("a household and a shared number stand together, and no number is told", async () => {
  const phone = "020 7946 0555";
  const mother = await desk.contact("Mother", ago(1), { phone });
  const apart = await desk.contact("Apart", ago(2));
  const child = await desk.contact("Child", ago(3));
  const friend = await desk.contact("Friend", ago(4), { phone: "+44 20 7946 0555" });
  for (const id of [mother, child]) await desk.change(id, { household: "Mill lane" });
  const list = await desk.read({ sort: "-lastDueDay" });
  const at = (id: string) => list.items.findIndex((item) => item.id === id);
  const together = (id: string) => list.items[at(id)]?.together;
  expect(together(mother)).toMatch(/^household-\d+$/);
  expect([together(child), together(friend)]).toEqual([together(mother), together(mother)]);
  expect(together(apart)).toBeNull();
  const places = [at(mother), at(child), at(friend)].sort((a, b) => a - b);
  expect((places[2] ?? 0) - (places[0] ?? 0)).toBe(2);
  // In a list that holds one of them, nobody stands with anybody.
  expect((await desk.read({ q: "Mother" })).items[0]?.together).toBeNull();
});
