import { sql } from "drizzle-orm";
import type { EventName } from "../../shared/events.ts";
import type { Tx } from "../db/with-tx.ts";

/** An audit event: names of fields and ids of people, never values. */
export interface AuditEvent {
  action: EventName;
  accountId: string | null;
  role: string | null;
  investigationId: string | null;
  personIds?: readonly string[];
  fields?: readonly string[];
  /** Numbers; for exports also ids, coded words and checksums, never anything typed. */
  counts?: Record<string, number | string>;
}

/** Writes an event in the transaction of what it tells of; both are stored or neither is. */
export async function recordEvent(tx: Tx, event: AuditEvent): Promise<void> {
  await tx.execute(
    sql`insert into audit.event (investigation_id, account_id, role, action, person_ids, fields, counts)
      values (${event.investigationId}, ${event.accountId}, ${event.role}, ${event.action},
        ${sql.param(`{${(event.personIds ?? []).join(",")}}`)}::uuid[],
        ${sql.param(`{${(event.fields ?? []).join(",")}}`)}::text[],
        ${JSON.stringify(event.counts ?? {})}::jsonb)`,
  );
}
