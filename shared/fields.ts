import { CORE_FIELDS } from "./fields/core.ts";
import { IDENTITY_FIELDS, IDENTITY_OTHER_FIELDS, PERSON_FIELDS } from "./fields/person.ts";
import type { Access, Field } from "./fields/types.ts";
import type { Role } from "./roles.ts";

export type { Access, Field, FieldClass, Retention } from "./fields/types.ts";

/**
 * The field registry: every column of the `core` and `identity` schemas, once. Column grants,
 * views, response schemas, allowed sort keys, audit field names and the officer's policy page are
 * made from it; a column that is not listed is readable by no role and fails the build.
 */
export const FIELDS: readonly Field[] = [
  ...PERSON_FIELDS,
  ...IDENTITY_FIELDS,
  ...IDENTITY_OTHER_FIELDS,
  ...CORE_FIELDS,
];

/** Fields of one table, in registry order. */
export function fieldsOf(table: string): Field[] {
  return FIELDS.filter((field) => field.table === table);
}

/** Columns of a table that a role's own database login may read. Ciphertext is never among them. */
export function readableColumns(table: string, role: Role): string[] {
  return fieldsOf(table)
    .filter((field) => field.access[role] === "full" && !field.cipher)
    .map((field) => field.column);
}

/** How a role gets a person's field, by its key in answers (for example `phone`). */
export function accessTo(key: string, role: Role): Access {
  const field = FIELDS.find((one) => one.key === key);
  return field ? field.access[role] : "none";
}

/** Identity keys that a role may open in full (through the recorded opening). */
export function openableKeys(role: Role): string[] {
  return IDENTITY_FIELDS.filter((f) => f.cipher && f.key && f.access[role] === "full").map(
    (f) => f.key as string,
  );
}

/**
 * Keys of a person's answer for a role: plain keys it may read in full, and the masked or coarse
 * keys that stand in for the rest. `household` is a name (tracer, supervisor) or a number.
 */
export function personKeys(role: Role): string[] {
  const keys: string[] = [];
  for (const field of [...PERSON_FIELDS, ...IDENTITY_FIELDS]) {
    if (!field.key) continue;
    const access = field.access[role];
    if (access === "full") keys.push(field.key);
    if (access === "masked" && field.masked) keys.push(field.masked.key);
    if (access === "coarse" && field.coarse) keys.push(field.coarse.key);
  }
  if (openableKeys(role).includes("name")) keys.push("household");
  keys.push("householdNumber", "diedDate", "can");
  return keys;
}

/** People's list: keys that a role may sort by, with the SQL column each stands for. */
export function sortableColumns(role: Role): Record<string, string> {
  // Without a prototype: a sort key is typed by anyone and may be called "constructor".
  const columns: Record<string, string> = Object.create(null);
  for (const field of PERSON_FIELDS) {
    if (field.key && field.sortable && field.access[role] === "full") {
      columns[field.key] = field.column;
    }
  }
  return columns;
}
