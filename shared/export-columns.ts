import { PAIR_COLUMNS, PEOPLE_COLUMNS } from "./contracts/imports.ts";
import { accessTo, openableKeys, readableColumns } from "./fields.ts";
import type { Role } from "./roles.ts";

export type ExportKind = "people" | "pairs";

/** Columns of a people file that say who somebody is, with the key under which they are opened. */
export const IDENTITY_COLUMNS = {
  ref: "ref",
  name: "name",
  phone: "phone",
  email: "email",
  birth_date: "birthDate",
  address: "address",
} as const;
type IdentityColumn = keyof typeof IDENTITY_COLUMNS;

const isIdentity = (column: string): column is IdentityColumn => column in IDENTITY_COLUMNS;

/** Identity keys that an export with identity opens for a role: those the registry gives in full. */
export function exportedIdentity(role: Role): (typeof IDENTITY_COLUMNS)[IdentityColumn][] {
  const open = openableKeys(role);
  return Object.values(IDENTITY_COLUMNS).filter((key) => open.includes(key));
}

/** Whether a role ever gets a file with identity. */
export function mayIdentify(role: Role): boolean {
  return exportedIdentity(role).length > 0;
}

/** Whether households stand in a file by their name; by a number otherwise. */
export function namesHouseholds(role: Role, identified: boolean): boolean {
  return identified && accessTo("address", role) === "full";
}

/**
 * Columns of a file that hold what is on record; the others are there, so that every file has the
 * columns of the import, and are blank. Made from the field registry: a column is filled only where
 * the role has it in full. `ref` is never blank (without identity it is the study number).
 *
 * @param identified whether identity was asked for
 */
export function filledColumns(kind: ExportKind, role: Role, identified: boolean): string[] {
  if (kind === "pairs") return [...PAIR_COLUMNS];
  const readable = readableColumns("core.person", role);
  const opened: readonly string[] = identified ? exportedIdentity(role) : [];
  return PEOPLE_COLUMNS.filter((column) => {
    if (column === "ref" || column === "household") return true;
    if (isIdentity(column)) return opened.includes(IDENTITY_COLUMNS[column]);
    return column === "died_date"
      ? readable.includes("outcome") && readable.includes("outcome_date")
      : readable.includes(column);
  });
}
