import type { FieldPolicy } from "../../../shared/contracts/safeguard.ts";
import { ROLE_NAMES, ROLES } from "../../../shared/roles.ts";

export type PolicyItem = FieldPolicy["items"][number];

const catalogueSays: Readonly<Record<string, string>> = {
  direct: "lets it read the stored table itself",
  absent: "has no such column",
};

/** A column in which registry and catalogue differ, role by role and in words. */
export function disagreementWords(item: PolicyItem): string[] {
  const absent = ROLES.every((role) => item.catalogue[role] === "absent");
  if (absent) return ["The registry lists it, the database has no such column."];
  const differing = ROLES.filter((role) => item.registry[role] !== item.catalogue[role]);
  if (item.class === "unlisted") {
    const open = ROLES.filter((role) => item.catalogue[role] !== "none");
    const readers = open.map((role) => ROLE_NAMES[role].toLowerCase()).join(", ");
    return [
      open.length === 0
        ? "The database has it, the registry does not list it; no role can read it."
        : `The database has it, the registry does not list it; open to: ${readers}.`,
    ];
  }
  return differing.map((role) => {
    const found = item.catalogue[role] ?? "none";
    const database = catalogueSays[found] ?? `gives ${found}`;
    return `${ROLE_NAMES[role]}: the registry says ${item.registry[role]}, the database ${database}.`;
  });
}
