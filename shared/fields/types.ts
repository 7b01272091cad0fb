import type { Role } from "../roles.ts";

/** How much of a value a role gets. `coarse` and `masked` are columns of their own. */
export type Access = "full" | "masked" | "coarse" | "none";

/** Sensitivity: names a person; narrows one down; says something about health; runs the house. */
export type FieldClass = "direct" | "quasi" | "health" | "operational";

/** How long a value is kept; the schedule itself is set per investigation. */
export type Retention = "investigation" | "monitoring" | "session" | "log";

/** One stored column. `access` is also the floor: an officer can tighten it, never loosen it. */
export interface Field {
  table: string;
  column: string;
  class: FieldClass;
  retention: Retention;
  access: Record<Role, Access>;
  /** Key in people's answers and forms; absent when the column never leaves by itself. */
  key?: string;
  /** True when a role with full access may sort or filter by it in SQL. */
  sortable?: boolean;
  /** For an encrypted field: the columns of its masked and coarse forms, with their keys. */
  masked?: { column: string; key: string };
  coarse?: { column: string; key: string };
  /** True when the column holds ciphertext: it leaves only through the recorded opening. */
  cipher?: boolean;
}
