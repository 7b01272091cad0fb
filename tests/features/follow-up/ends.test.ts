import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { shiftDay } from "../../../server/clock.ts";
import { followEndList, followUpList } from "../../../shared/contracts/follow-up.ts";
import { FOLLOW_ENDS } from "../../../shared/vocabulary.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, eventsNamed, submit } from "../../support/field-work.ts";
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

const end = (member: Member, id: string, body: unknown, key: string | true = true) =>
  member.client.post(`${member.base}/follow-up/${id}/end`, body, key);
const reopen = (member: Member, id: string, endId: string) =>
  member.client.call("delete", `${member.base}/follow-up/${id}/end/${endId}`);
const list = async (member: Member, query: Record<string, string>) => {
  const answer = await member.client.get(`${member.base}/follow-up`, { pageSize: "200", ...query });
  expect(answer.status).toBe(200);
  return followUpList.parse(answer.body);
};
const history = async (member: Member, id: string) => {
  const answer = await member.client.get(`${member.base}/follow-up/${id}/ends`);
  expect(answer.status).toBe(200);
  return followEndList.parse(answer.body);
};

describe("a recorded end", () => {
  test.each(FOLLOW_ENDS)(
    "%s leaves those due, keeps the checks, fills no other date",
    async (reason) => {
      const id = await desk.contact(`Ended ${reason}`, ago(3));
      await desk.checks(id, [[2, "seen"]]);
      expect((await list(desk.tracer, {})).items.map((item) => item.id)).toContain(id);
      const person = () =>
        asAdmin(
          app,
          "select outcome, outcome_date, classification, isolation_date, version from core.person where id = $1",
          [id],
        );
      const before = await person();
      const made = await end(desk.tracer, id, { reason, day: ago(1) });
      expect([made.status, Object.keys(made.body)]).toEqual([201, ["id"]]);
      expect(await person()).toEqual(before);
      expect((await list(desk.tracer, {})).items.map((item) => item.id)).not.toContain(id);
      const ended = (await list(desk.tracer, { show: "ended" })).items.find((one) => one.id === id);
      expect(ended).toMatchObject({
        state: reason,
        symptomatic: false,
        end: { id: made.body.id, reason, day: ago(1) },
        reopenedOn: null,
        lastCheck: { day: ago(2), outcome: "seen" },
      });
      const event = (await eventsNamed(app, desk.investigationId, "follow_up.ended")).at(-1);
      expect(event).toMatchObject({
        account_id: desk.tracer.accountId,
        person_ids: [id],
        fields: ["reason", "day"],
      });
      // A paper form of a day before the end may still be entered, one after it may not.
      expect((await check(desk.tracer, id, { outcome: "spoken", day: ago(1) })).status).toBe(201);
      const after = await check(desk.tracer, id, { outcome: "spoken" });
      expect(after.body.errors).toEqual([{ path: "day", code: "after_end" }]);
    },
  );

  test("of somebody ill takes them off the top as well", async () => {
    const id = await desk.contact("Ill And Moved", ago(2));
    await check(desk.tracer, id, { outcome: "seen", symptoms: "yes" });
    expect((await list(supervisor, {})).items[0]?.id).toBe(id);
    await end(supervisor, id, { reason: "moved" });
    for (const member of [supervisor, desk.tracer]) {
      expect((await list(member, {})).items.map((item) => item.id)).not.toContain(id);
    }
  });

  test("is taken back by whoever sees the contact, and both stay on record with who and when", async () => {
    const id = await desk.contact("Reopened Person", ago(4));
    const made = await end(desk.tracer, id, { reason: "refused" });
    expect((await reopen(stranger, id, made.body.id)).status).toBe(404);
    expect((await reopen(desk.tracer, randomUUID(), made.body.id)).status).toBe(404);
    expect((await reopen(supervisor, id, made.body.id)).status).toBe(204);
    expect((await reopen(supervisor, id, made.body.id)).status).toBe(404);
    // Nobody had to call while it was ended, so the contact is not lost by that.
    expect(await desk.itemOf(id)).toMatchObject({
      state: "to_be_notified",
      end: null,
      reopenedOn: today,
      expectedFrom: today,
    });
    expect((await list(desk.tracer, {})).items.map((item) => item.id)).toContain(id);
    const again = await end(supervisor, id, { reason: "moved" });
    expect(again.status).toBe(201);
    const told = await history(supervisor, id);
    expect(told.items).toMatchObject([
      { id: again.body.id, reason: "moved", day: today, takenBackAt: null, takenBackBy: null },
      { id: made.body.id, reason: "refused", day: today },
    ]);
    expect(told.items.every((one) => typeof one.recordedBy === "string")).toBe(true);
    expect(told.items[1]?.takenBackBy).toBe(told.items[0]?.recordedBy);
    expect(told.items[1]?.takenBackAt).not.toBeNull();
    // A tracer learns what was done and when, not the names of others.
    expect((await history(desk.tracer, id)).items.map((one) => one.recordedBy)).toEqual([
      null,
      null,
    ]);
    const events = await eventsNamed(app, desk.investigationId, "follow_up.reopened");
    expect(events.at(-1)).toMatchObject({ account_id: supervisor.accountId, person_ids: [id] });
  });

  test("is made once however often it is sent, and once for each follow-up", async () => {
    const id = await desk.contact("Ended Once", ago(2));
    const key = randomUUID();
    const first = await end(desk.tracer, id, { reason: "moved" }, key);
    const again = await end(desk.tracer, id, { reason: "moved" }, key);
    expect([first.status, again.status, again.body]).toEqual([201, 201, first.body]);
    const more = await end(supervisor, id, { reason: "died" });
    expect([more.status, more.body.errors]).toEqual([422, [{ path: "", code: "already_ended" }]]);
  });

  test.each([
    [{}, "reason", "not_in_list"],
    [{ reason: "lost" }, "reason", "not_in_list"],
    [{ reason: "completed" }, "reason", "not_in_list"],
    [{ reason: "moved", day: shiftDay(today, 1) }, "day", "in_future"],
    [{ reason: "died", day: ago(3) }, "day", "before_day_zero"],
    [{ reason: "moved", day: today.slice(0, 7) }, "day", "not_a_day"],
    [{ reason: "moved", why: "x" }, "", "unknown_key"],
  ])("%j is refused at %s: %s", async (body, path, code) => {
    const id = await desk.contact("Refused Input", ago(2));
    const answer = await end(desk.tracer, id, body);
    expect(answer.status).toBe(422);
    expect(answer.body.errors).toContainEqual({ path, code });
    expect((await history(desk.tracer, id)).total).toBe(0);
  });

  test("is not for cases, nor for people out of scope", async () => {
    const answer = await end(desk.tracer, desk.caseId, { reason: "moved" });
    expect(answer.body.errors).toEqual([{ path: "", code: "not_followed" }]);
    const id = await desk.contact("Not Yours", ago(2));
    expect((await end(stranger, id, { reason: "moved" })).status).toBe(404);
    expect((await stranger.client.get(`${stranger.base}/follow-up/${id}/ends`)).status).toBe(404);
  });

  test("gives way to becoming a case, with the version of the definition and the history kept", async () => {
    const id = await desk.contact("Ended Then Ill", ago(3));
    await desk.checks(id, [[1, "spoken"]]);
    await end(desk.tracer, id, { reason: "refused" });
    await asAdmin(app, "update core.investigation set case_definition_version = 7 where id = $1", [
      desk.investigationId,
    ]);
    const changed = await desk.change(id, { classification: "suspected" });
    expect(changed).toMatchObject({ classification: "suspected", becameCase: true });
    expect(changed.classifications.at(-1)).toMatchObject({
      classification: "suspected",
      caseDefinitionVersion: 7,
    });
    expect(await desk.itemOf(id)).toMatchObject({
      state: "became_case",
      lastCheck: { day: ago(1), outcome: "spoken" },
      end: { reason: "refused" },
    });
  });
});

describe("contacts without a day 0", () => {
  test("have a list that says why, and can be called, ended and mended", async () => {
    const month = await desk.contact("Month Only", ago(2).slice(0, 7), {}, null);
    const unknown = await desk.contact("Not Known", "unknown", {}, null);
    for (const member of [desk.tracer, supervisor]) {
      const shown = await list(member, { show: "without_day_zero" });
      expect(shown.total).toBe(shown.withoutDayZero);
      expect(shown.items.find((item) => item.id === month)).toMatchObject({
        dayZero: null,
        lastDueDay: null,
        dayNumber: null,
        dueDays: [],
        dayZeroGap: "month_only",
        state: "to_be_notified",
      });
      expect(shown.items.find((item) => item.id === unknown)?.dayZeroGap).toBe("not_known");
    }
    // Symptoms put somebody on top also where no day is known.
    await check(desk.tracer, unknown, { outcome: "spoken", symptoms: "yes" });
    expect((await list(supervisor, {})).items[0]).toMatchObject({ id: unknown, symptomatic: true });
    expect((await list(desk.tracer, {})).items[0]).toMatchObject({ id: unknown, dayZero: null });

    const made = await end(desk.tracer, month, { reason: "moved" });
    expect(made.status).toBe(201);
    expect(
      (await list(desk.tracer, { show: "without_day_zero" })).items.map((one) => one.id),
    ).toEqual([unknown]);
    expect((await list(supervisor, { show: "ended" })).items.map((one) => one.id)).toContain(month);

    await submit(desk.tracer, desk.caseId, {
      contacts: [contactRow({ personId: unknown, lastExposure: ago(1) })],
    });
    expect(await desk.itemOf(unknown)).toMatchObject({ dayZero: ago(1), dayZeroGap: null });
    expect((await list(desk.tracer, {})).withoutDayZero).toBe(0);
  });

  test("also of somebody whom nobody has named to a case", async () => {
    const made = await supervisor.client.post(`${supervisor.base}/people`, {
      name: "Never Named",
      classification: "contact",
    });
    expect(made.status).toBe(201);
    const shown = await list(supervisor, { show: "without_day_zero" });
    expect(shown.items.find((item) => item.id === made.body.id)?.dayZeroGap).toBe("no_exposure");
  });
});

describe("symptoms of the settings", () => {
  test("are the ones that can be recorded; a check with one that was removed still shows", async () => {
    const set = (symptoms: unknown) =>
      asAdmin(app, "update core.investigation set symptoms = $2::jsonb where id = $1", [
        desk.investigationId,
        symptoms === null ? null : JSON.stringify(symptoms),
      ]);
    const id = await desk.contact("Own Symptoms", ago(2));
    const sick = (symptomCodes: string[]) =>
      check(desk.tracer, id, { outcome: "seen", symptoms: "yes", symptomCodes });
    await set([{ code: "itch", label: "Itching" }]);
    expect((await sick(["itch"])).status).toBe(201);
    const refused = await sick(["fever"]);
    expect([refused.status, refused.body.errors]).toEqual([
      422,
      [{ path: "symptomCodes", code: "not_in_list" }],
    ]);
    await set(null);
    expect((await sick(["fever"])).status).toBe(201);
    expect((await sick(["itch"])).status).toBe(422);
    const checks = await desk.tracer.client.get(`${desk.tracer.base}/follow-up/${id}/checks`);
    expect(checks.body.items.map((one: { symptomCodes: string[] }) => one.symptomCodes)).toEqual(
      expect.arrayContaining([["itch"], ["fever"]]),
    );
  });
});
