import type { CaseRules } from "./contracts/settings.ts";
import { CASE_CLASSIFICATIONS } from "./vocabulary.ts";

/** What is on record of a person that the rules of a case definition ask for. */
export interface CaseFacts {
  /** A positive test. */
  laboratory: boolean;
  /** An onset of symptoms, be it a month only. */
  clinical: boolean;
  /** A contact pair with a confirmed or probable case. */
  link: boolean;
}

/**
 * The class a person has by the rules alone: the first, in the order confirmed, probable,
 * suspected, whose criteria are all on record; null when none is. A class that asks for nothing is
 * met by nobody, for else it would be everybody's. A person decides on classes, never the rules:
 * this says how many would differ. Source: methods A.1 (usual pattern of case definitions).
 */
export function classByRules(
  facts: CaseFacts,
  rules: CaseRules,
): (typeof CASE_CLASSIFICATIONS)[number] | null {
  for (const one of CASE_CLASSIFICATIONS) {
    const asked = (["laboratory", "clinical", "link"] as const).filter((key) => rules[one][key]);
    if (asked.length > 0 && asked.every((key) => facts[key])) return one;
  }
  return null;
}
