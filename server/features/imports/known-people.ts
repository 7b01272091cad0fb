import { sql } from "drizzle-orm";
import type { Role } from "../../../shared/roles.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { type IdentityKey, openCipher } from "../../identity/records.ts";
import { normalPhone } from "../../identity/tokens.ts";
import { isMissingWord } from "./check-cell.ts";
import type { PeopleColumn, StagedPerson } from "./staged-row.ts";

/** What is on record of a person, by the columns of the file; null is "not asked". */
type OnRecord = Partial<Record<PeopleColumn, string | null>>;

/** What a row would change of a person on record, and where it says something else. */
export interface Comparison {
  personId: string;
  line: number;
  /** Cells whose field is blank on record. */
  fills: StagedPerson["cells"];
  conflicts: PeopleColumn[];
}

const IDENTITY_COLUMNS: Partial<Record<PeopleColumn, IdentityKey>> = {
  name: "name",
  phone: "phone",
  email: "email",
  birth_date: "birthDate",
  address: "address",
};
/** Names of the identity fields that comparing opens, for the import's event. */
export const COMPARED_FIELDS: readonly string[] = Object.values(IDENTITY_COLUMNS);

const CORE_COLUMNS = [
  "sex",
  "area",
  "occupation",
  "classification",
  "onset_date",
  "specimen_date",
  "result_date",
  "result",
  "report_date",
  "interview_date",
  "interviewed",
  "isolation_date",
] as const satisfies readonly PeopleColumn[];

const idList = (ids: readonly string[]) => sql`${sql.param(`{${ids.join(",")}}`)}::uuid[]`;

async function coreOnRecord(tx: Tx, role: Role, ids: readonly string[]) {
  // A column the role may not read is left out: it is neither compared nor hinted at.
  const columns = CORE_COLUMNS.filter((column) => role !== "officer" || column !== "occupation");
  const found = await tx.execute<Record<string, string | null> & { id: string }>(
    sql`select id, ${sql.raw(columns.join(", "))}, household_id, outcome, outcome_date
        from core.person where id = any (${idList(ids)})`,
  );
  return new Map(found.rows.map((row) => [row.id, row]));
}

/** Identity of people on record by the columns of a file; the event of the import tells of it. */
export async function identityOnRecord(
  tx: Tx,
  keys: InvestigationKeys,
  importId: string,
  ids: readonly string[],
) {
  const columnOf = new Map(
    Object.entries(IDENTITY_COLUMNS).map(([column, key]) => [key, column as PeopleColumn]),
  );
  const found = await tx.execute<{ person_id: string; field: IdentityKey; cipher: Buffer }>(
    sql`select person_id, field, cipher
        from identity.open_for_import(${importId}::uuid, ${idList(ids)})`,
  );
  const out = new Map<string, OnRecord>();
  for (const { person_id: id, field, cipher } of found.rows) {
    const column = columnOf.get(field);
    if (!column) continue;
    const known = out.get(id) ?? {};
    known[column] = openCipher(keys, id, field, cipher);
    out.set(id, known);
  }
  return out;
}

function samePhone(a: string, b: string, country: string): boolean {
  if (a === b) return true;
  if (isMissingWord(a) || isMissingWord(b)) return false;
  const [left, right] = [normalPhone(a, country), normalPhone(b, country)];
  return left !== null && left === right;
}

/** What the record says of death: the day, blank while nothing is said, "" when something else is. */
function diedOnRecord(outcome: string | null, day: string | null): string | null {
  if (outcome === null && day === null) return null;
  if (outcome === "died") return day;
  return outcome === "unknown" && day !== null ? day : "";
}

/** Everything a comparison needs besides the rows. */
export interface CompareContext {
  tx: Tx;
  keys: InvestigationKeys;
  importId: string;
  role: Role;
  /** Country by which national telephone numbers are read. */
  country: string;
}

/**
 * Compares rows with the people they name by reference. A blank on record may be filled; a value
 * that differs stays as it is and is listed.
 *
 * @param rows rows with the id of the person on record
 * @param households place ids of the households the rows name, by name; absent = not on record
 */
export async function compareKnown(
  context: CompareContext,
  rows: readonly { row: StagedPerson; personId: string }[],
  households: ReadonlyMap<string, string>,
): Promise<Comparison[]> {
  if (rows.length === 0) return [];
  const { tx, keys, importId, role, country } = context;
  const ids = rows.map(({ personId }) => personId);
  const core = await coreOnRecord(tx, role, ids);
  const identities = await identityOnRecord(tx, keys, importId, ids);
  return rows.map(({ row, personId }) => {
    const stored = core.get(personId);
    const record: OnRecord = { ...(stored as OnRecord), ...identities.get(personId) };
    const fills: StagedPerson["cells"] = { ref: row.cells.ref };
    const conflicts: PeopleColumn[] = [];
    for (const [name, cell] of Object.entries(row.cells)) {
      const column = name as PeopleColumn;
      if (column === "ref") continue;
      let known = record[column] ?? null;
      let same = known === cell;
      if (column === "phone" && known !== null) same = samePhone(known, cell, country);
      if (column === "household") {
        known = stored?.household_id ?? null;
        // A word for "missing" names no household, so it contradicts none.
        same = isMissingWord(cell) || (known !== null && households.get(cell) === known);
      }
      if (column === "died_date") {
        known = diedOnRecord(stored?.outcome ?? null, stored?.outcome_date ?? null);
        same = known === cell;
      }
      if (same) continue;
      if (known === null) fills[column] = cell;
      else conflicts.push(column);
    }
    return { personId, line: row.line, fills, conflicts };
  });
}
