import type { AccessEvent } from "../../shared/contracts/safeguard.ts";
import type { Role } from "../../shared/roles.ts";
import { startTestApp, type TestApp } from "./app.ts";
import { buildInvestigation, type Member, signInEveryone } from "./factories.ts";
import { asAdmin, contactRow, register, submit } from "./field-work.ts";

/** Identity of the one case of the desk. */
export const IDENTITY = {
  ref: "REF-1",
  name: "=HYPERLINK(Name)",
  phone: "+44 7700 900123",
  email: "jo@export.example",
  birthDate: "1980-05-06",
  address: "5 Secret Quay",
};

/** What no file without identity may hold. */
export const SECRETS = [...Object.values(IDENTITY), "Named Contact", "Hidden House"];

/** An investigation with an interviewed case and two contacts, and a member of each role. */
export interface ExportDesk {
  app: TestApp;
  everyone: Record<Role, Member>;
  caseId: string;
  /** Asks for a file; the answer is returned whatever it is. */
  ask(member: Member, body: Record<string, unknown>): ReturnType<Member["client"]["post"]>;
  /** Events of the access record, as the data officer reads them. */
  eventsOf(action: string): Promise<AccessEvent[]>;
  /** How many parts of a file are kept. */
  partsOf(id: string): Promise<number>;
}

/** Makes the desk; close its `app` in afterAll. */
export async function makeExportDesk(): Promise<ExportDesk> {
  const app = await startTestApp();
  const everyone = await signInEveryone(app, await buildInvestigation(app));
  const { supervisor, officer } = everyone;
  const caseId = await register(supervisor, {
    ...IDENTITY,
    occupation: "Rope maker",
    household: "Hidden House",
    area: "North",
    onsetDate: "2026-03-01",
  });
  const contacts = [
    contactRow({ name: "Named Contact", setting: "household", place: "Hidden House" }),
    contactRow({ name: "Other Contact", setting: "workplace", place: "Rope walk", minutes: 30 }),
  ];
  const made = await submit(supervisor, caseId, { contacts });
  if (made.status !== 201) throw new Error(`the interview answered ${made.status}`);
  return {
    app,
    everyone,
    caseId,
    ask: (member, body) =>
      member.client.post(`${member.base}/exports`, { purpose: "analysis", ...body }),
    async eventsOf(action) {
      const answer = await officer.client.get(`${officer.base}/access-events`, { action });
      if (answer.status !== 200) throw new Error(`the record answered ${answer.status}`);
      return answer.body.items;
    },
    async partsOf(id) {
      const [row] = await asAdmin<{ count: number }>(
        app,
        "select count(*)::int as count from identity.export_part where export_id = $1",
        [id],
      );
      return row?.count ?? -1;
    },
  };
}
