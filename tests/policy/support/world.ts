import { randomUUID } from "node:crypto";
import pg from "pg";
import type { Role } from "../../../shared/roles.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInEveryone } from "../../support/factories.ts";
import { type MarkedPerson, MarkerScan, markedPerson } from "./markers.ts";

/** People of the tested investigation by what the tracer may see of them. */
export const PEOPLE = ["held", "named", "heldContact", "hiddenCase", "stranger"] as const;
export type PersonName = (typeof PEOPLE)[number];
/** Whose identity the tracer may open: held people and contacts of held cases. */
export const NAMED: readonly PersonName[] = ["held", "named", "heldContact"];

/** An investigation full of marked people, its four roles, and another one beside it. */
export interface World {
  app: TestApp;
  admin: pg.Client;
  here: string;
  elsewhere: string;
  everyone: Record<Role, Member>;
  others: Record<Role, Member>;
  people: Record<PersonName, string>;
  marked: Record<PersonName | "foreign", MarkedPerson>;
  foreign: string;
  scan: MarkerScan;
  close: () => Promise<void>;
}

async function made(call: PromiseLike<{ status: number; body: { id: string } }>): Promise<string> {
  const answer = await call;
  if (answer.status !== 201) {
    throw new Error(`the world could not be made: ${JSON.stringify(answer.body)}`);
  }
  return answer.body.id;
}

/** Registers a marked person by the form's own route. */
function register(by: Member, marked: MarkedPerson, more: Record<string, unknown>) {
  return made(by.client.post(`${by.base}/people`, { ...marked, area: "North", ...more }));
}

function contactRow(marked: { name?: string; phone?: string }, personId?: string) {
  return {
    ...(personId ? { personId } : {}),
    name: marked.name ?? null,
    phone: marked.phone ?? null,
    setting: "workplace",
    place: "Weaving hall",
    firstExposure: "2026-03-02",
    lastExposure: "2026-03-03",
    minutes: 30,
    distanceM: 1,
    physical: "no",
    indoors: "yes",
    relation: "Zqlrelation colleague",
  };
}

function interview(by: Member, personId: string, contacts: unknown[]) {
  const body = { personId, outcome: "complete", channel: "visit", contacts, groupExposures: [] };
  return made(by.client.post(`${by.base}/interviews`, body));
}

/**
 * Builds the world through the application's own routes. The tracer holds a case and a contact;
 * that contact was also named by a case of nobody's, which the tracer may know by number only.
 */
export async function makeWorld(): Promise<World> {
  const app = await startTestApp();
  const admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  const [here, elsewhere] = [await buildInvestigation(app), await buildInvestigation(app)];
  const [everyone, others] = [
    await signInEveryone(app, here),
    await signInEveryone(app, elsewhere),
  ];
  const marked = {
    held: markedPerson("bimo", 11),
    named: markedPerson("tafe", 12),
    heldContact: markedPerson("rugi", 13),
    hiddenCase: markedPerson("lode", 14),
    stranger: markedPerson("samu", 15),
    foreign: markedPerson("neko", 16),
  };
  const { supervisor } = everyone;
  const dates = { onsetDate: "2026-03-01", reportDate: "2026-03-04" };
  const people: Record<PersonName, string> = {
    held: await register(supervisor, marked.held, { classification: "confirmed", ...dates }),
    named: await register(supervisor, marked.named, { classification: "contact" }),
    heldContact: await register(supervisor, marked.heldContact, { classification: "contact" }),
    hiddenCase: await register(supervisor, marked.hiddenCase, {
      classification: "confirmed",
      ...dates,
    }),
    stranger: await register(supervisor, marked.stranger, { classification: "suspected" }),
  };
  await interview(supervisor, people.held, [contactRow({}, people.named)]);
  await interview(supervisor, people.hiddenCase, [contactRow({}, people.heldContact)]);
  for (const id of [people.held, people.heldContact]) {
    await admin.query("update core.person set assigned_account_id = $2 where id = $1", [
      id,
      everyone.tracer.accountId,
    ]);
  }
  const foreign = await register(others.supervisor, marked.foreign, {
    classification: "confirmed",
    ...dates,
  });
  await interview(others.supervisor, foreign, [contactRow({ name: "Somebody Else" })]);

  const scan = new MarkerScan();
  for (const [person, fields] of Object.entries(marked)) scan.add(person, fields);
  return {
    app,
    admin,
    here,
    elsewhere,
    everyone,
    others,
    people,
    marked,
    foreign,
    scan,
    async close() {
      await admin.end();
      await app.close();
    },
  };
}

/** A context nonce of a member, made as a sign-in makes it; `seconds` may be negative (expired). */
export async function contextOf(
  app: TestApp,
  member: Pick<Member, "accountId" | "investigationId">,
  role: Role,
  seconds = 600,
): Promise<string> {
  const nonce = randomUUID();
  await app.pools.auth.query(
    `insert into auth.ctx_live (nonce, account_id, investigation_id, role, expires_at)
     values ($1, $2, $3, $4, now() + make_interval(secs => $5))`,
    [nonce, member.accountId, member.investigationId, role, seconds],
  );
  return nonce;
}
