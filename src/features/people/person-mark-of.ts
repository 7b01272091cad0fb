import type { PersonMarkInput } from "../../components/person-mark/person-mark-input.ts";

/** What a person's mark needs of the record; null while nobody has classified them. */
export function personMarkOf(person: {
  classification: PersonMarkInput["classification"] | null;
  becameCase: boolean;
}): PersonMarkInput | null {
  if (!person.classification) return null;
  return { classification: person.classification, wasContact: person.becameCase };
}
