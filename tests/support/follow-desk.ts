import { expect } from "vitest";
import { dayIn, now, shiftDay } from "../../server/clock.ts";
import { followUpList } from "../../shared/contracts/follow-up.ts";
import type { TestApp } from "./app.ts";
import { buildInvestigation, type Member, signInAs } from "./factories.ts";
import { asAdmin, contactRow, register, submit } from "./field-work.ts";

export const today = dayIn("UTC", now());
export const ago = (days: number) => shiftDay(today, -days);
/** What was done how many days ago. */
export type Round = [daysAgo: number, outcome: string];

/** Tries a contact by the form's route. */
export function check(member: Member, personId: string, body: unknown, key: string | true = true) {
  return member.client.post(`${member.base}/follow-up/${personId}/checks`, body, key);
}

/** A tracer with a case whose contacts are followed up. */
export async function followDesk(app: TestApp, monitoringDays: number) {
  const investigationId = await buildInvestigation(app, { monitoringDays });
  const tracer = await signInAs(app, "tracer", investigationId);
  const caseId = await register(tracer);

  async function read(query: Record<string, string> = {}) {
    const answer = await tracer.client.get(`${tracer.base}/follow-up`, {
      pageSize: "200",
      ...query,
    });
    expect(answer.status).toBe(200);
    return followUpList.parse(answer.body);
  }

  async function itemOf(personId: string) {
    const item = (await read({ show: "all" })).items.find(({ id }) => id === personId);
    if (!item) throw new Error("the contact is not in the list");
    return item;
  }

  /** Names a contact of the case and sets when they came on record. */
  async function contact(
    name: string,
    lastExposure: string | null,
    more: Record<string, unknown> = {},
    onRecordSince = lastExposure,
  ): Promise<string> {
    const told = await submit(tracer, caseId, {
      contacts: [contactRow({ name, lastExposure, ...more })],
    });
    expect(told.status).toBe(201);
    const [row] = await asAdmin<{ id: string }>(
      app,
      "select id from core.person where investigation_id = $1 order by recorded_at desc, id limit 1",
      [investigationId],
    );
    const id = row?.id ?? "";
    if (onRecordSince) {
      await asAdmin(
        app,
        "update core.person set recorded_at = $2::date + interval '9 hours' where id = $1",
        [id, onRecordSince],
      );
    }
    return id;
  }

  async function checks(personId: string, rounds: readonly Round[]) {
    for (const [days, outcome] of rounds) {
      expect((await check(tracer, personId, { day: ago(days), outcome })).status).toBe(201);
    }
  }

  async function change(personId: string, fields: Record<string, unknown>) {
    const { version } = await itemOf(personId);
    const changed = await tracer.client.call("patch", `${tracer.base}/people/${personId}`, {
      body: { version, ...fields },
    });
    expect(changed.status).toBe(200);
    return changed.body;
  }

  return { investigationId, tracer, caseId, read, itemOf, contact, checks, change };
}
