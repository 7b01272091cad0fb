import { sql } from "drizzle-orm";
import type { z } from "zod";
import type { investigationPatch } from "../../../../shared/contracts/investigations.ts";
import type { Tx } from "../../../db/with-tx.ts";
import type { Actor } from "../../../http/route.ts";

const COLUMNS = {
  name: "name",
  populationAtRisk: "population_at_risk",
  infectiousBefore: "infectious_before",
  infectiousAfter: "infectious_after",
  monitoringDays: "monitoring_days",
} as const;

/**
 * Changes settings when the version is the current one.
 *
 * @returns false when somebody changed the investigation meanwhile
 */
export async function patchInvestigation(
  tx: Tx,
  actor: Actor,
  patch: z.output<typeof investigationPatch>,
): Promise<boolean> {
  const sets = Object.entries(COLUMNS)
    .filter(([key]) => patch[key as keyof typeof COLUMNS] !== undefined)
    .map(([key, column]) => sql`${sql.identifier(column)} = ${patch[key as keyof typeof COLUMNS]}`);
  sets.push(sql`version = version + 1`);
  const done = await tx.execute(
    sql`update core.investigation set ${sql.join(sets, sql`, `)}
        where id = ${actor.investigationId} and version = ${patch.version}`,
  );
  return done.rowCount === 1;
}
