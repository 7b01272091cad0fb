import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin } from "../../support/field-work.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

/** People entered at given instants, before the graph is first read. */
async function enter(member: Member, instants: readonly string[]): Promise<void> {
  for (const [k, recordedAt] of instants.entries()) {
    await asAdmin(
      app,
      `insert into core.person (id, investigation_id, study_number, recorded_at)
       values ($1, $2, $3, $4)`,
      [randomUUID(), member.investigationId, `Z${k}`, recordedAt],
    );
  }
}

// Kiritimati keeps UTC+14; Los Angeles goes from UTC-8 to UTC-7 on 2024-03-10 at 10:00 UTC, so its
// 10 March has 23 hours.
const CASES = [
  { timeZone: "Pacific/Kiritimati", end: "2024-03-10T10:00:00.000Z" },
  { timeZone: "America/Los_Angeles", end: "2024-03-11T07:00:00.000Z" },
] as const;

test.each(CASES)("a day in $timeZone ends there, whatever the server's zone", async (one) => {
  const id = await buildInvestigation(app, { timeZone: one.timeZone });
  const member = await signInAs(app, "supervisor", id);
  const last = new Date(new Date(one.end).getTime() - 1).toISOString();
  await enter(member, ["2024-03-09T00:00:00Z", last, one.end]);
  const path = `${member.base}/network/summary`;
  const asOfDay = await member.client.get(path, { asOf: "2024-03-10" });
  expect(asOfDay.body).toMatchObject({ people: 2, asOf: "2024-03-10", cutOff: one.end });
  expect(asOfDay.body.trail.at(-1).day).toBe("2024-03-10");
  const asOfInstant = await member.client.get(path, { asOf: one.end });
  expect(asOfInstant.body).toMatchObject({ people: 3, cutOff: one.end });
  expect(asOfInstant.body.trail.at(-1).day).toBe("2024-03-11");

  const { since } = (await member.client.get(`${member.base}/groups`)).body;
  const clock = new Intl.DateTimeFormat("en-GB", {
    timeZone: one.timeZone,
    hour: "2-digit",
    minute: "2-digit",
    hourCycle: "h23",
  });
  expect(clock.format(new Date(since))).toBe("00:00");
  const age = Date.now() - new Date(since).getTime();
  expect(age).toBeGreaterThanOrEqual(0);
  expect(age).toBeLessThan(25 * 3_600_000);
});
