import { type SQL, sql } from "drizzle-orm";
import { sortableColumns } from "../../../shared/fields.ts";
import type { Role } from "../../../shared/roles.ts";
import { invalid } from "../../http/problem.ts";

/** How a list is ordered: by one column of `core.person p`, the id deciding between equals. */
export interface Order {
  by: SQL;
  down: boolean;
}

/**
 * Reads a sort key such as `-onsetDate`; without one the latest recorded come first.
 *
 * @throws HttpProblem invalid for a key the role may not sort by
 */
export function orderOf(sort: string | undefined, role: Role): Order {
  if (!sort) return { by: sql`p.recorded_at`, down: true };
  const down = sort.startsWith("-");
  const key = down ? sort.slice(1) : sort;
  const columns = sortableColumns(role);
  const column = columns[key];
  if (column) return { by: sql`p.${sql.identifier(column)}`, down };
  // The day somebody died is the day of their outcome, where that is what it was.
  if (key === "diedDate" && columns.outcome && columns.outcomeDate) {
    return { by: sql`case when p.outcome = 'died' then p.outcome_date end`, down };
  }
  throw invalid({ path: "sort", code: "not_sortable" });
}
