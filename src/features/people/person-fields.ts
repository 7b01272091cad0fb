import type { PersonInput } from "../../../shared/contracts/people.ts";
import { CLASSIFICATIONS, OUTCOMES, SEXES, TEST_RESULTS } from "../../../shared/vocabulary.ts";
import { classificationWords, wordFor } from "../../lib/words.ts";

export type PersonKey = keyof PersonInput;
export type PersonFieldKind = "text" | "phone" | "email" | "date" | "choice" | "note";
export type PersonSection = "who" | "illness" | "test";

export interface PersonField {
  key: PersonKey;
  label: string;
  section: PersonSection;
  kind: PersonFieldKind;
  options?: readonly { value: string; label: string }[];
  hint?: string;
  wide?: boolean;
}

const choices = (values: readonly string[], words: Record<string, string> = {}) =>
  values.map((value) => ({ value, label: wordFor(words, value) }));

const missing = [
  { value: "unknown", label: "unknown" },
  { value: "refused", label: "refused" },
];

/** Everything a form may set, in the order in which it is asked. */
export const PERSON_FIELDS: readonly PersonField[] = [
  { key: "name", label: "Name", section: "who", kind: "text" },
  { key: "phone", label: "Telephone", section: "who", kind: "phone" },
  { key: "email", label: "E-mail", section: "who", kind: "email" },
  { key: "birthDate", label: "Birth date", section: "who", kind: "date" },
  {
    key: "sex",
    label: "Sex",
    section: "who",
    kind: "choice",
    options: [...choices(SEXES), { value: "refused", label: "refused" }],
  },
  { key: "address", label: "Address", section: "who", kind: "text" },
  {
    key: "area",
    label: "Area",
    section: "who",
    kind: "text",
    hint: "District or village; stays in pseudonymous reports.",
  },
  { key: "occupation", label: "Occupation", section: "who", kind: "text" },
  {
    key: "household",
    label: "Household",
    section: "who",
    kind: "text",
    hint: "The name of a household. The same name puts two people into one.",
  },
  {
    key: "ref",
    label: "Reference",
    section: "who",
    kind: "text",
    hint: "Number in a list of your own, such as the laboratory’s.",
  },
  {
    key: "classification",
    label: "Classification",
    section: "illness",
    kind: "choice",
    options: choices(CLASSIFICATIONS, classificationWords),
    hint: "By the current case definition; every change is kept.",
  },
  { key: "onsetDate", label: "Onset of illness", section: "illness", kind: "date" },
  { key: "reportDate", label: "Reported", section: "illness", kind: "date" },
  { key: "isolationDate", label: "Isolated since", section: "illness", kind: "date" },
  {
    key: "outcome",
    label: "Outcome",
    section: "illness",
    kind: "choice",
    options: choices(OUTCOMES),
  },
  { key: "outcomeDate", label: "Day of outcome", section: "illness", kind: "date" },
  {
    key: "note",
    label: "Note",
    section: "who",
    kind: "note",
    wide: true,
    hint: "Read on this person’s page only; never in lists or reports.",
  },
  { key: "specimenDate", label: "Specimen taken", section: "test", kind: "date" },
  {
    key: "result",
    label: "Result",
    section: "test",
    kind: "choice",
    options: [...choices(TEST_RESULTS), ...missing],
  },
  { key: "resultDate", label: "Day of result", section: "test", kind: "date" },
];

/** Fields of one part of a form. */
export function fieldsIn(section: PersonSection): readonly PersonField[] {
  return PERSON_FIELDS.filter((field) => field.section === section);
}

/** What boxes hold: text, where blank means "not asked". */
export type PersonValues = Record<PersonKey, string>;

/** Every box empty. */
export function blankPerson(): PersonValues {
  return {
    ref: "",
    name: "",
    phone: "",
    email: "",
    birthDate: "",
    sex: "",
    address: "",
    area: "",
    occupation: "",
    household: "",
    classification: "",
    onsetDate: "",
    specimenDate: "",
    resultDate: "",
    result: "",
    reportDate: "",
    isolationDate: "",
    diedDate: "",
    outcome: "",
    outcomeDate: "",
    note: "",
  };
}
