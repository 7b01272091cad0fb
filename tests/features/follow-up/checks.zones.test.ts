import { afterAll, beforeAll, expect, test } from "vitest";
import { dayIn, now, shiftDay } from "../../../server/clock.ts";
import { followUpList } from "../../../shared/contracts/follow-up.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, signInAs } from "../../support/factories.ts";
import { contactRow, register, submit } from "../../support/field-work.ts";
import { check } from "../../support/follow-desk.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

// 25 hours lie between the two, so that at any instant their days differ.
test.each(["Pacific/Kiritimati", "Pacific/Pago_Pago"])(
  "today, the future and day 0 are days in %s, whatever the server's zone",
  async (timeZone) => {
    const id = await buildInvestigation(app, { timeZone, monitoringDays: 3 });
    const tracer = await signInAs(app, "tracer", id);
    const today = dayIn(timeZone, now());
    const caseId = await register(tracer);
    const told = await submit(tracer, caseId, {
      contacts: [contactRow({ lastExposure: shiftDay(today, -2) })],
    });
    expect(told.status).toBe(201);
    const read = async () =>
      followUpList.parse((await tracer.client.get(`${tracer.base}/follow-up`)).body);
    const [item] = (await read()).items;
    const personId = item?.id ?? "";
    expect(item).toMatchObject({ dayNumber: 2, expectedFrom: shiftDay(today, 1) });

    expect((await check(tracer, personId, { outcome: "seen" })).status).toBe(201);
    const refusals = [
      [shiftDay(today, 1), "in_future"],
      [shiftDay(today, -3), "before_day_zero"],
    ] as const;
    for (const [day, code] of refusals) {
      const answer = await check(tracer, personId, { outcome: "seen", day });
      expect([answer.status, answer.body.errors]).toEqual([422, [{ path: "day", code }]]);
    }
    const [after] = (await read()).items;
    expect(after?.lastCheck?.day).toBe(today);
    expect(after?.dueDays).toEqual([
      { day: shiftDay(today, -1), outcome: null },
      { day: today, outcome: "seen" },
      { day: shiftDay(today, 1), outcome: null },
    ]);
  },
);
