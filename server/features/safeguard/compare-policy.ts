import type { FieldPolicy } from "../../../shared/contracts/safeguard.ts";
import type { Field } from "../../../shared/fields.ts";
import { ROLES, type Role } from "../../../shared/roles.ts";
import type { Catalogue } from "./catalogue-store.ts";

type Row = FieldPolicy["items"][number];

/**
 * What a role gets of a column as the catalogue has it: the registry's four words, `direct` when a
 * login could read an identity table itself (never right), `absent` when there is no such column.
 */
function catalogueSays(field: Field, role: Role, catalogue: Catalogue): string {
  const name = `${field.table}.${field.column}`;
  if (!catalogue.columns.has(name)) return "absent";
  const direct = catalogue.direct[role].has(name);
  if (!field.table.startsWith("identity.")) return direct ? "full" : "none";
  if (direct) return "direct";
  const viewed = catalogue.viewed[role];
  if (!field.cipher) {
    return field.table === "identity.person" && viewed.has(field.column) ? "full" : "none";
  }
  if (field.table === "identity.place") return catalogue.opensPlaces[role] ? "full" : "none";
  if (field.table === "identity.follow_check") {
    return catalogue.opensChecks[role] ? "full" : "none";
  }
  if (field.key && catalogue.opensPeople[role] && catalogue.rights[role].has(field.key)) {
    return "full";
  }
  if (field.masked && viewed.has(field.masked.column)) return "masked";
  if (field.coarse && viewed.has(field.coarse.column)) return "coarse";
  return "none";
}

/**
 * Puts the registry and the catalogue side by side, column by column. A column only one of the two
 * knows of is a disagreement, and so is every role's right that differs.
 */
export function comparePolicy(fields: readonly Field[], catalogue: Catalogue): FieldPolicy {
  const items = fields.map((field): Row => {
    const registry = field.access;
    const found = says((role) => catalogueSays(field, role, catalogue));
    return {
      table: field.table,
      column: field.column,
      key: field.key ?? null,
      class: field.class,
      retention: field.retention,
      registry,
      catalogue: found,
      agrees: ROLES.every((role) => registry[role] === found[role]),
    };
  });
  const listed = new Set(fields.map((field) => `${field.table}.${field.column}`));
  for (const name of catalogue.columns) {
    if (listed.has(name)) continue;
    const at = name.lastIndexOf(".");
    items.push({
      table: name.slice(0, at),
      column: name.slice(at + 1),
      key: null,
      class: "unlisted",
      retention: "unlisted",
      registry: says(() => "none"),
      catalogue: says((role) => (catalogue.direct[role].has(name) ? "full" : "none")),
      agrees: false,
    });
  }
  return { items, disagreements: items.filter((item) => !item.agrees).length };
}

function says(of: (role: Role) => string): Record<Role, string> {
  return Object.fromEntries(ROLES.map((role) => [role, of(role)])) as Record<Role, string>;
}
