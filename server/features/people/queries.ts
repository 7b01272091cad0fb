import { type SQL, sql } from "drizzle-orm";
import type { PeopleQuery } from "../../../shared/contracts/people.ts";
import {
  accessTo,
  fieldsOf,
  openableKeys,
  readableColumns,
  sortableColumns,
} from "../../../shared/fields.ts";
import type { Role } from "../../../shared/roles.ts";
import { maskedColumns } from "../../db/access/grants.ts";
import type { Tx } from "../../db/with-tx.ts";
import { invalid } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { findPeople, refToken } from "../../identity/records.ts";
import { asStudyNumber } from "./study-number.ts";

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

/** The list of columns of `core.person` for a role, never `*`: an ungranted column is an error. */
function selection(role: Role): SQL {
  const columns = readableColumns("core.person", role);
  const keyed = fieldsOf("core.person").filter((f) => f.key && columns.includes(f.column));
  const list = keyed.map(
    (f) => sql`p.${sql.identifier(f.column)} as ${sql.identifier(f.key as string)}`,
  );
  const mine =
    role === "tracer"
      ? sql`p.id = any ((select core.ctx_named_people())::uuid[])`
      : sql`${role === "supervisor" || role === "officer"}::boolean`;
  return sql`${sql.join(list, sql`, `)}, p.household_id as "householdId",
    (select h.number from core.place h where h.id = p.household_id) as "householdNumber", ${mine} as mine`;
}

const ids = (list: readonly string[]) => sql`${sql.param(`{${list.join(",")}}`)}::uuid[]`;

/** People by id, as far as row security shows them. */
export async function peopleById(
  tx: Tx,
  role: Role,
  personIds: readonly string[],
): Promise<CorePerson[]> {
  if (personIds.length === 0) return [];
  const found = await tx.execute<CorePerson>(
    sql`select ${selection(role)} from core.person p
        where p.id = any (${ids(personIds)}) and p.withdrawn_at is null`,
  );
  return found.rows;
}

/** Turns a sort key such as `-onsetDate` into SQL; a key the role may not sort by is refused. */
function ordering(sort: string | undefined, role: Role): SQL {
  if (!sort) return sql`p.recorded_at desc, p.id`;
  const down = sort.startsWith("-");
  const key = down ? sort.slice(1) : sort;
  const columns = sortableColumns(role);
  const column = columns[key];
  // The day somebody died is the day of their outcome, where that is what it was.
  const died = key === "diedDate" && columns.outcome && columns.outcomeDate;
  if (!column && !died) throw invalid({ path: "sort", code: "not_sortable" });
  const by = column
    ? sql`p.${sql.identifier(column)}`
    : sql`case when p.outcome = 'died' then p.outcome_date end`;
  return down ? sql`${by} desc nulls last, p.id` : sql`${by} asc nulls last, p.id`;
}

/** People met by what was typed: a study number, and for roles that read names, names or phone. */
async function typed(
  tx: Tx,
  keys: InvestigationKeys | null,
  actor: Actor,
  q: string,
  country: string,
): Promise<SQL> {
  const found: string[] = [];
  const openable = openableKeys(actor.role);
  if (keys && openable.includes("name")) {
    found.push(...(await findPeople(tx, keys, q, country)).map((one) => one.personId));
  }
  if (keys && openable.includes("ref") && actor.role !== "tracer") {
    const met = await tx.execute<{ person_id: string }>(
      sql`select person_id from identity.people_by_ref(array[${refToken(keys, q)}::bytea])`,
    );
    found.push(...met.rows.map((row) => row.person_id));
  }
  const number = asStudyNumber(q);
  const byNumber = number ? sql`p.study_number like ${`${number}%`}` : sql`false`;
  return sql`(p.id = any (${ids(found)}) or ${byNumber})`;
}

/** One page of the line list. */
export async function listPeople(
  tx: Tx,
  keys: InvestigationKeys | null,
  actor: Actor,
  query: PeopleQuery,
  country: string,
): Promise<{ rows: CorePerson[]; total: number }> {
  const where: SQL[] = [
    sql`p.investigation_id = ${actor.investigationId}`,
    sql`p.withdrawn_at is null`,
  ];
  const order = ordering(query.sort, actor.role);
  if (query.classification === "case" || query.needs === "interview") {
    where.push(sql`p.classification in ('confirmed', 'probable', 'suspected')`);
  } else if (query.classification) where.push(sql`p.classification = ${query.classification}`);
  if (query.needs === "interview") {
    where.push(
      sql`(p.interview_state is null or p.interview_state in ('attempted', 'partial', 'unreachable'))`,
    );
  }
  if (query.interviewed === "yes") where.push(sql`p.interviewed = 'yes'`);
  if (query.interviewed === "no") where.push(sql`p.interviewed is distinct from 'yes'`);
  if (query.area) where.push(sql`p.area = ${query.area}`);
  if (query.assigned) {
    if (accessTo("assignedTo", actor.role) !== "full")
      throw invalid({ path: "assigned", code: "not_in_list" });
    where.push(
      query.assigned === "me"
        ? sql`p.assigned_account_id = ${actor.accountId}`
        : sql`p.assigned_account_id is null and p.assigned_team_id is null`,
    );
  }
  if (query.q) where.push(await typed(tx, keys, actor, query.q, country));
  const all = sql.join(where, sql` and `);
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.person p where ${all}`,
  );
  const found = await tx.execute<CorePerson>(
    sql`select ${selection(actor.role)} from core.person p where ${all} order by ${order}
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
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
