import { sql } from "drizzle-orm";
import type { Tx } from "../db/with-tx.ts";
import type { Actor } from "../http/route.ts";

/** One thing that happened to the contact graph; `bulk` asks the live graph to reload. */
export interface GraphChange {
  kind: "person" | "pair" | "exposure" | "interview" | "classification" | "withdrawn" | "bulk";
  personA?: string | null;
  personB?: string | null;
}

/**
 * Raises the graph version of the acting investigation, logs what changed under it, and announces
 * it; all of it takes effect when the transaction commits.
 *
 * @returns the new graph version
 */
export async function recordGraphChange(
  tx: Tx,
  actor: Actor,
  changes: readonly GraphChange[],
  entityId: string | null = null,
): Promise<number> {
  const bumped = await tx.execute<{ version: string }>(sql`select core.bump_graph() as version`);
  const version = Number(bumped.rows[0]?.version);
  const rows = changes.map((change) => ({
    kind: change.kind,
    person_a: change.personA ?? null,
    person_b: change.personB ?? null,
  }));
  await tx.execute(
    sql`insert into core.graph_change (investigation_id, graph_version, kind, person_a, person_b)
        select ${actor.investigationId}, ${version}, c.kind, c.person_a, c.person_b
        from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as c (kind text, person_a uuid, person_b uuid)`,
  );
  await tx.execute(sql`select core.announce('graph', ${entityId}::uuid, ${version})`);
  return version;
}

/** Announces that something of a topic changed, without touching the graph. */
export async function announce(
  tx: Tx,
  topic: "people" | "interviews" | "imports" | "exports" | "compare" | "members" | "settings",
  entityId: string | null,
): Promise<void> {
  await tx.execute(sql`select core.announce(${topic}, ${entityId}::uuid, null)`);
}
