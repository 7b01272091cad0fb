import type { PersonPage } from "../../../shared/contracts/people.ts";
import { isSeen } from "../../../shared/follow-state.ts";
import type { PersonMarkInput } from "../../components/person-mark/person-mark-input.ts";

/** What a person's mark needs of the record; null while nobody has classified them. */
export function personMarkOf(person: {
  classification: PersonMarkInput["classification"] | null;
  becameCase: boolean;
  monitoring?: PersonPage["monitoring"];
}): PersonMarkInput | null {
  if (!person.classification) return null;
  const { monitoring } = person;
  return {
    classification: person.classification,
    wasContact: person.becameCase,
    ...(monitoring && person.classification === "contact"
      ? { followUp: followUpOf(monitoring) }
      : {}),
  };
}

function followUpOf({ dueDays, outcomes, state }: NonNullable<PersonPage["monitoring"]>) {
  const due = new Set(dueDays);
  const done = outcomes.filter(({ day, outcome }) => due.has(day) && isSeen(outcome)).length;
  const shown: "active" | "completed" | "lost" =
    state === "completed" || state === "lost" ? state : "active";
  return { share: done / Math.max(1, dueDays.length), state: shown };
}
