import type { PersonPage } from "../../../shared/contracts/people.ts";

export type FactKind = "text" | "day" | "classification" | "phone" | "note";
export interface Fact {
  key: keyof PersonPage;
  label: string;
  kind: FactKind;
}

/** Identity as it is shown: full keys, or the masked and coarse ones that stand in for them. */
export const WHO_FACTS: readonly Fact[] = [
  { key: "name", label: "Name", kind: "text" },
  { key: "nameMasked", label: "Name, masked", kind: "text" },
  { key: "phone", label: "Telephone", kind: "phone" },
  { key: "phoneLast2", label: "Telephone, last two", kind: "text" },
  { key: "email", label: "E-mail", kind: "text" },
  { key: "emailMasked", label: "E-mail, masked", kind: "text" },
  { key: "birthDate", label: "Birth date", kind: "day" },
  { key: "birthYear", label: "Birth year", kind: "text" },
  { key: "ageBand", label: "Age", kind: "text" },
  { key: "sex", label: "Sex", kind: "text" },
  { key: "address", label: "Address", kind: "text" },
  { key: "area", label: "Area", kind: "text" },
  { key: "occupation", label: "Occupation", kind: "text" },
  { key: "household", label: "Household", kind: "text" },
  { key: "householdNumber", label: "Household number", kind: "text" },
  { key: "ref", label: "Reference", kind: "text" },
  { key: "note", label: "Note", kind: "note" },
];

export const ILLNESS_FACTS: readonly Fact[] = [
  { key: "classification", label: "Classification", kind: "classification" },
  { key: "onsetDate", label: "Onset of illness", kind: "day" },
  { key: "reportDate", label: "Reported", kind: "day" },
  { key: "isolationDate", label: "Isolated since", kind: "day" },
  { key: "outcome", label: "Outcome", kind: "text" },
  { key: "outcomeDate", label: "Day of outcome", kind: "day" },
];

/** The facts that an answer holds for this reader. */
export function presentFacts(facts: readonly Fact[], person: PersonPage): readonly Fact[] {
  // A household has a name for some and a number for the rest: one of the two is enough.
  return facts.filter(
    ({ key }) => key in person && !(key === "householdNumber" && "household" in person),
  );
}
