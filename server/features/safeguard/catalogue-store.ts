import { sql } from "drizzle-orm";
import { ROLES, type Role } from "../../../shared/roles.ts";
import { loginOf } from "../../db/access/policies.ts";
import type { Tx } from "../../db/with-tx.ts";

/** What PostgreSQL's catalogue says about the role logins, read at this moment. */
export interface Catalogue {
  /** `table.column` of every column of `core` and `identity`. */
  columns: ReadonlySet<string>;
  /** Columns of those schemas that a login may select from the table itself. */
  direct: Record<Role, ReadonlySet<string>>;
  /** Columns of a role's generated view that its login may select. */
  viewed: Record<Role, ReadonlySet<string>>;
  /** May the login call the function that opens people, household names, or notes of checks? */
  opensPeople: Record<Role, boolean>;
  opensPlaces: Record<Role, boolean>;
  opensChecks: Record<Role, boolean>;
  /** Fields the opening function gives a role. */
  rights: Record<Role, ReadonlySet<string>>;
}

const LOGINS = sql.join(
  ROLES.map((role) => sql`(${role}::text, ${loginOf(role)}::name)`),
  sql`, `,
);

function perRole<T>(make: (role: Role) => T): Record<Role, T> {
  return Object.fromEntries(ROLES.map((role) => [role, make(role)])) as Record<Role, T>;
}

/** Reads the catalogue for all four logins; names are never looked up by a search path. */
export async function readCatalogue(tx: Tx): Promise<Catalogue> {
  const columns = await tx.execute<{ name: string; roles: string[] }>(
    sql`with logins (role, login) as (values ${LOGINS})
      select n.nspname || '.' || c.relname || '.' || a.attname as name,
        (select coalesce(array_agg(l.role), '{}') from logins l
          where has_schema_privilege(l.login, n.oid, 'usage')
            and has_column_privilege(l.login, c.oid, a.attnum, 'select')) as roles
      from pg_class c join pg_namespace n on n.oid = c.relnamespace
      join pg_attribute a on a.attrelid = c.oid and a.attnum > 0 and not a.attisdropped
      where n.nspname in ('core', 'identity') and c.relkind in ('r', 'p', 'v', 'm', 'f')
      order by n.nspname, c.relname, a.attnum`,
  );
  const viewed = await tx.execute<{ role: Role; name: string }>(
    sql`with logins (role, login) as (values ${LOGINS})
      select l.role, a.attname::text as name
      from logins l join pg_namespace n on n.nspname = 'views'
      join pg_class c on c.relnamespace = n.oid and c.relname = 'person_' || l.role
      join pg_attribute a on a.attrelid = c.oid and a.attnum > 0 and not a.attisdropped
      where has_schema_privilege(l.login, n.oid, 'usage')
        and has_column_privilege(l.login, c.oid, a.attnum, 'select')`,
  );
  const functions = await tx.execute<{
    role: Role;
    people: boolean;
    places: boolean;
    checks: boolean;
  }>(
    sql`with logins (role, login) as (values ${LOGINS})
      select l.role,
        coalesce(has_schema_privilege(l.login, 'identity', 'usage') and has_function_privilege(l.login,
          to_regprocedure('identity.open_people(uuid[],text[],text)')::oid, 'execute'), false) as people,
        coalesce(has_schema_privilege(l.login, 'identity', 'usage') and has_function_privilege(l.login,
          to_regprocedure('identity.open_places(uuid[])')::oid, 'execute'), false) as places,
        coalesce(has_schema_privilege(l.login, 'identity', 'usage') and has_function_privilege(l.login,
          to_regprocedure('identity.open_check_notes(uuid)')::oid, 'execute'), false) as checks
      from logins l`,
  );
  const rights = await tx.execute<{ role: Role; field: string }>(
    sql`select role, field from views.field_right`,
  );
  const names = (rows: readonly { role: Role; name: string }[], role: Role) =>
    new Set(rows.filter((row) => row.role === role).map((row) => row.name));
  const rightRows = rights.rows.map(({ role, field }) => ({ role, name: field }));
  return {
    columns: new Set(columns.rows.map((row) => row.name)),
    direct: perRole(
      (role) =>
        new Set(columns.rows.filter((row) => row.roles.includes(role)).map((row) => row.name)),
    ),
    viewed: perRole((role) => names(viewed.rows, role)),
    opensPeople: perRole((role) => functions.rows.some((row) => row.role === role && row.people)),
    opensPlaces: perRole((role) => functions.rows.some((row) => row.role === role && row.places)),
    opensChecks: perRole((role) => functions.rows.some((row) => row.role === role && row.checks)),
    rights: perRole((role) => names(rightRows, role)),
  };
}
