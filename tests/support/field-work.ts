import pg from "pg";
import type { TestApp } from "./app.ts";
import type { Member } from "./factories.ts";

/** Reads or writes as the database's administrator: what no role of the application could. */
export async function asAdmin<T extends pg.QueryResultRow>(
  app: TestApp,
  text: string,
  values: unknown[] = [],
): Promise<T[]> {
  const admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  try {
    return (await admin.query<T>(text, values)).rows;
  } finally {
    await admin.end();
  }
}

/** Registers a person by form and returns the id; a tracer's is assigned to that tracer. */
export async function register(
  member: Member,
  fields: Record<string, unknown> = {},
): Promise<string> {
  const answer = await member.client.post(`${member.base}/people`, {
    name: "Case Person",
    classification: "confirmed",
    ...fields,
  });
  if (answer.status !== 201) throw new Error(`registering answered ${answer.status}`);
  return answer.body.id;
}

/** One contact row of the form with everything filled. */
export function contactRow(fields: Record<string, unknown> = {}): Record<string, unknown> {
  return {
    name: "Contact Person",
    phone: null,
    setting: "social",
    place: null,
    firstExposure: null,
    lastExposure: null,
    minutes: null,
    distanceM: null,
    physical: null,
    indoors: null,
    relation: null,
    ...fields,
  };
}

/** Submits an interview; the answer is returned whatever it is. */
export function submit(
  member: Member,
  personId: string,
  fields: Record<string, unknown> = {},
  key: string | true = true,
) {
  return member.client.post(
    `${member.base}/interviews`,
    { personId, outcome: "complete", contacts: [], groupExposures: [], ...fields },
    key,
  );
}

/** Rows of a table of the `core` schema in one investigation. */
export async function countRows(
  app: TestApp,
  table: string,
  investigationId: string,
): Promise<number> {
  const rows = await asAdmin<{ count: number }>(
    app,
    `select count(*)::int as count from core.${table} where investigation_id = $1`,
    [investigationId],
  );
  return rows[0]?.count ?? 0;
}

/** Access events of one action, oldest first. */
export async function eventsNamed(app: TestApp, investigationId: string, action: string) {
  return asAdmin<{
    account_id: string;
    role: string;
    person_ids: string[];
    fields: string[];
    counts: Record<string, number>;
  }>(
    app,
    `select account_id, role, person_ids, fields, counts from audit.event
     where investigation_id = $1 and action = $2 order by at, id`,
    [investigationId, action],
  );
}
