import { type SQL, sql } from "drizzle-orm";
import { fieldsOf, readableColumns } from "../../../shared/fields.ts";
import type { Role } from "../../../shared/roles.ts";
import { maskedColumns } from "../../db/access/grants.ts";
import type { Tx } from "../../db/with-tx.ts";

/** A person's core columns under their keys, as far as the role may read them. */
export interface CorePerson {
  id: string;
  studyNumber: string;
  version: number;
  classification: string | null;
  onsetDate: string | null;
  isolationDate: string | null;
  outcome: string | null;
  outcomeDate: string | null;
  householdId: string | null;
  householdNumber: number | null;
  /** True when the acting person may open this person's identity and change the record. */
  mine: boolean;
  [key: string]: unknown;
}

const ids = (list: readonly string[]) => sql`${sql.param(`{${list.join(",")}}`)}::uuid[]`;

/**
 * The list of columns of `core.person p` for a role, never `*`: an ungranted column is an error.
 *
 * @param named SQL array of the people of this answer whose identity a tracer may open
 */
export function selection(role: Role, named: SQL): SQL {
  const columns = readableColumns("core.person", role);
  const keyed = fieldsOf("core.person").filter((f) => f.key && columns.includes(f.column));
  const list = keyed.map(
    (f) => sql`p.${sql.identifier(f.column)} as ${sql.identifier(f.key as string)}`,
  );
  const mine =
    role === "tracer"
      ? sql`p.id = any (${named})`
      : sql`${role === "supervisor" || role === "officer"}::boolean`;
  return sql`${sql.join(list, sql`, `)}, p.household_id as "householdId",
    (select h.number from core.place h where h.id = p.household_id) as "householdNumber", ${mine} as mine`;
}

/** People by id, as far as row security shows them. */
export async function peopleById(
  tx: Tx,
  role: Role,
  personIds: readonly string[],
): Promise<CorePerson[]> {
  if (personIds.length === 0) return [];
  const found = await tx.execute<CorePerson>(
    sql`select ${selection(role, sql`(select core.ctx_named_of(${ids(personIds)}))::uuid[]`)}
        from core.person p
        where p.id = any (${ids(personIds)}) and p.withdrawn_at is null`,
  );
  return found.rows;
}

/** Masked and coarse forms of people's identity, for roles that get no more. */
export async function maskedOf(
  tx: Tx,
  role: Role,
  personIds: readonly string[],
): Promise<Map<string, Record<string, unknown>>> {
  const columns = maskedColumns(role);
  const out = new Map<string, Record<string, unknown>>();
  if (columns.length === 0 || personIds.length === 0) return out;
  const list = columns.map((column) => sql.identifier(column));
  const found = await tx.execute<Record<string, unknown> & { person_id: string }>(
    sql`select person_id, ${sql.join(list, sql`, `)} from ${sql.identifier("views")}.${sql.identifier(`person_${role}`)}
        where person_id = any (${ids(personIds)})`,
  );
  for (const row of found.rows) out.set(row.person_id, row);
  return out;
}
