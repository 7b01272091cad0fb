import { afterAll, beforeAll, expect, test } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, register, submit } from "../../support/field-work.ts";

// 22 or 21 hours lie between these two, so that at most instants they are on different days.
const ZONES = ["Pacific/Kiritimati", "America/Los_Angeles"] as const;

let app: TestApp;
const tracers = new Map<string, Member>();

beforeAll(async () => {
  app = await startTestApp();
  for (const timeZone of ZONES) {
    const id = await buildInvestigation(app, { timeZone });
    tracers.set(timeZone, await signInAs(app, "tracer", id));
  }
});

afterAll(async () => {
  await app?.close();
});

/** The local day by the runtime's own calendar, independent of the server's clock helper. */
function localDay(timeZone: string, instant: Date): string {
  const parts = new Intl.DateTimeFormat("en-US", {
    timeZone,
    year: "numeric",
    month: "2-digit",
    day: "2-digit",
  }).formatToParts(instant);
  const part = (type: string) => parts.find((one) => one.type === type)?.value;
  return `${part("year")}-${part("month")}-${part("day")}`;
}

const member = (zone: string) => tracers.get(zone) as Member;

// Kiritimati keeps UTC+14; Los Angeles goes from UTC-8 to UTC-7 on 2024-03-10 at 10:00 UTC.
const instants: [heldAt: string, kiritimati: string, losAngeles: string][] = [
  ["2024-03-10T07:59:59Z", "2024-03-10", "2024-03-09"],
  ["2024-03-10T08:00:00Z", "2024-03-10", "2024-03-10"],
  ["2024-03-10T09:59:59Z", "2024-03-10", "2024-03-10"],
  ["2024-03-10T10:00:00Z", "2024-03-11", "2024-03-10"],
  ["2024-03-11T06:59:59Z", "2024-03-11", "2024-03-10"],
  ["2024-03-11T07:00:00+00:00", "2024-03-11", "2024-03-11"],
  ["2023-12-31T23:30:00-10:00", "2024-01-01", "2024-01-01"],
  ["2024-02-29T09:59:59.999Z", "2024-02-29", "2024-02-29"],
];

test.each(instants)(
  "an interview at %s falls on the local day of each investigation",
  async (heldAt, kiritimati, losAngeles) => {
    for (const [zone, day] of [
      [ZONES[0], kiritimati],
      [ZONES[1], losAngeles],
    ] as const) {
      const tracer = member(zone);
      const caseId = await register(tracer);
      const made = await submit(tracer, caseId, { heldAt });
      expect(made.status).toBe(201);
      const list = await tracer.client.get(`${tracer.base}/interviews`, { personId: caseId });
      expect(list.body.items).toMatchObject([{ day, heldAt: new Date(heldAt).toISOString() }]);
      const person = await tracer.client.get(`${tracer.base}/people/${caseId}`);
      expect(person.body.interviewDate).toBe(day);
    }
  },
);

test("a day is in the future by the investigation's calendar, and is stored as typed", async () => {
  const days = new Map(ZONES.map((zone) => [zone, localDay(zone, new Date())]));
  for (const zone of ZONES) {
    const tracer = member(zone);
    const caseId = await register(tracer);
    for (const typed of days.values()) {
      const answer = await submit(tracer, caseId, {
        contacts: [contactRow({ firstExposure: typed, lastExposure: typed })],
      });
      // The day may have turned between the reading above and the request, never back.
      const ahead = typed > localDay(zone, new Date());
      expect(answer.status).toBe(ahead ? 422 : 201);
      if (ahead) {
        expect(answer.body.errors).toContainEqual({
          path: "contacts.0.lastExposure",
          code: "in_future",
        });
        continue;
      }
      const stored = await asAdmin(
        app,
        "select first_exposure, last_exposure from core.exposure where interview_id = $1",
        [answer.body.id],
      );
      expect(stored).toEqual([{ first_exposure: typed, last_exposure: typed }]);
    }
  }
});

test("today in the follow-up list is the investigation's own", async () => {
  for (const zone of ZONES) {
    const tracer = member(zone);
    const before = localDay(zone, new Date());
    const list = await tracer.client.get(`${tracer.base}/follow-up`, { show: "all" });
    expect([before, localDay(zone, new Date())]).toContain(list.body.today);
    for (const item of list.body.items) {
      expect(item.dayNumber).toBe(
        (Date.parse(list.body.today) - Date.parse(item.dayZero)) / 86_400_000,
      );
    }
  }
});
