import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { shiftDay } from "../../../server/clock.ts";
import { followCheckList } from "../../../shared/contracts/follow-up.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, countRows, eventsNamed } from "../../support/field-work.ts";
import { ago, check, followDesk, today } from "../../support/follow-desk.ts";

let app: TestApp;
let desk: Awaited<ReturnType<typeof followDesk>>;
let stranger: Member;
let supervisor: Member;

beforeAll(async () => {
  app = await startTestApp();
  desk = await followDesk(app, 5);
  stranger = await signInAs(app, "tracer", desk.investigationId);
  supervisor = await signInAs(app, "supervisor", desk.investigationId);
});

afterAll(async () => {
  await app?.close();
});

describe("recording", () => {
  let id: string;
  beforeAll(async () => {
    id = await desk.contact("Recorded Person", ago(2));
  });

  test("is made once however often it is sent, with one event that holds no value", async () => {
    const key = randomUUID();
    const body = { outcome: "spoken", symptoms: "no", note: "Zqt mentioned a neighbour" };
    const before = await countRows(app, "follow_check", desk.investigationId);
    const first = await check(desk.tracer, id, body, key);
    const again = await check(desk.tracer, id, body, key);
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(again.body).toEqual(first.body);
    expect(Object.keys(first.body)).toEqual(["id"]);
    expect(await countRows(app, "follow_check", desk.investigationId)).toBe(before + 1);
    const other = await check(desk.tracer, id, { outcome: "seen" }, key);
    expect([other.status, other.body.code]).toEqual([422, "key_reused"]);
    const event = (await eventsNamed(app, desk.investigationId, "follow_check.recorded")).at(-1);
    expect(event).toMatchObject({
      account_id: desk.tracer.accountId,
      person_ids: [id],
      fields: ["outcome", "symptoms", "note"],
    });
    expect(JSON.stringify(event)).not.toContain("Zqt");
    const [stored] = await asAdmin<{ line: string }>(
      app,
      "select string_agg(t::text, ' ') as line from identity.follow_check t",
    );
    expect(stored?.line).not.toContain("Zqt");
  });

  test("is read again with its note, by whom the person is", async () => {
    const answer = await desk.tracer.client.get(`${desk.tracer.base}/follow-up/${id}/checks`);
    expect(answer.status).toBe(200);
    const list = followCheckList.parse(answer.body);
    expect(list.total).toBe(1);
    expect(list.items[0]).toMatchObject({
      day: today,
      outcome: "spoken",
      symptoms: "no",
      symptomCodes: [],
      respondent: null,
      note: "Zqt mentioned a neighbour",
    });
    const opened = (await eventsNamed(app, desk.investigationId, "follow_checks.opened")).at(-1);
    expect(opened).toMatchObject({ person_ids: [id], fields: ["note"] });
  });

  test("a tracer to whom the contact is out of scope finds nobody", async () => {
    for (const answer of [
      await check(stranger, id, { outcome: "seen" }),
      await stranger.client.get(`${stranger.base}/follow-up/${id}/checks`),
      await check(desk.tracer, randomUUID(), { outcome: "seen" }),
    ]) {
      expect([answer.status, answer.body.code]).toEqual([404, "not_found"]);
    }
    expect((await check(supervisor, id, { outcome: "message" })).status).toBe(201);
  });

  test.each([
    [{}, "outcome", "not_in_list"],
    [{ outcome: "visited" }, "outcome", "not_in_list"],
    [{ outcome: "seen", day: shiftDay(today, 1) }, "day", "in_future"],
    [{ outcome: "seen", day: ago(3) }, "day", "before_day_zero"],
    [{ outcome: "seen", day: "2026-02-30" }, "day", "not_a_day"],
    [{ outcome: "seen", day: today.slice(0, 7) }, "day", "not_a_day"],
    [{ outcome: "seen", symptoms: "maybe" }, "symptoms", "not_in_list"],
    [
      { outcome: "seen", symptoms: "no", symptomCodes: ["fever"] },
      "symptomCodes",
      "only_with_symptoms",
    ],
    [
      { outcome: "seen", symptoms: "yes", symptomCodes: ["fever", "fever"] },
      "symptomCodes",
      "repeated",
    ],
    [{ outcome: "not_reached", symptoms: "no" }, "symptoms", "nobody_answered"],
    [{ outcome: "not_reached", respondent: "self" }, "respondent", "nobody_answered"],
    [{ outcome: "seen", respondent: "boss" }, "respondent", "not_in_list"],
    [{ outcome: "seen", note: "x".repeat(10_001) }, "note", "too_long"],
  ])("%j is refused at %s: %s", async (body, path, code) => {
    const answer = await check(desk.tracer, id, body);
    expect(answer.status).toBe(422);
    expect(answer.body.errors).toContainEqual({ path, code });
  });

  test("day 0 itself may be recorded, and a contact without a day 0 checked", async () => {
    expect((await check(desk.tracer, id, { outcome: "seen", day: ago(2) })).status).toBe(201);
    const undated = await desk.contact("Not Dated", null);
    expect((await check(desk.tracer, undated, { outcome: "seen" })).status).toBe(201);
  });

  test("a check entered by mistake is taken back, once, by who sees the contact", async () => {
    const person = await desk.contact("Taken Back", ago(2));
    const made = await check(desk.tracer, person, { outcome: "seen", symptoms: "yes" });
    expect(await desk.itemOf(person)).toMatchObject({ symptomatic: true });
    const remove = (member: Member, of = person) =>
      member.client.call("delete", `${member.base}/follow-up/${of}/checks/${made.body.id}`);
    expect((await remove(stranger)).status).toBe(404);
    expect((await remove(desk.tracer, id)).status).toBe(404);
    expect((await remove(desk.tracer)).status).toBe(204);
    expect((await remove(desk.tracer)).status).toBe(404);
    expect(await desk.itemOf(person)).toMatchObject({ symptomatic: false, lastCheck: null });
    const list = await desk.tracer.client.get(`${desk.tracer.base}/follow-up/${person}/checks`);
    expect(list.body).toMatchObject({ items: [], total: 0 });
    const event = (await eventsNamed(app, desk.investigationId, "follow_check.withdrawn")).at(-1);
    expect(event).toMatchObject({ account_id: desk.tracer.accountId, person_ids: [person] });
  });

  test("a case who was no contact is not followed up", async () => {
    const answer = await check(desk.tracer, desk.caseId, { outcome: "seen" });
    expect([answer.status, answer.body.errors]).toEqual([
      422,
      [{ path: "", code: "not_followed" }],
    ]);
  });
});
