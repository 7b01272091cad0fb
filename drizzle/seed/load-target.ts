import type pg from "pg";
import type { InvestigationKeys } from "../../server/identity/keys.ts";

/** Where and as whom an outbreak is loaded. */
export interface LoadTarget {
  client: pg.ClientBase;
  keys: InvestigationKeys;
  investigationId: string;
  /** Account of each tracer id the outbreak was generated with. */
  accounts: ReadonlyMap<string, string>;
  country: string;
  /** Version of the case definition that classifications are made with; 1 when left out. */
  caseDefinitionVersion?: number;
}
