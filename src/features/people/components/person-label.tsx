import type { Person } from "../../../../shared/contracts/people.ts";
import { PersonMark } from "../../../components/person-mark/person-mark.tsx";
import { personMarkOf } from "../person-mark-of.ts";

export type PersonLabelProps = {
  person: Pick<Person, "studyNumber" | "classification" | "becameCase">;
};

/** Mark and study number, as a person is named wherever names are not open. */
export function PersonLabel({ person }: PersonLabelProps) {
  const mark = personMarkOf(person);
  return (
    <span className="whitespace-nowrap">
      {mark ? (
        <PersonMark {...mark} size={16} className="me-1.5" />
      ) : (
        <span className="me-1.5 inline-block w-4 text-center text-ink-2" title="not classified">
          <span aria-hidden="true">·</span>
          <span className="sr-only">not classified</span>
        </span>
      )}
      {person.studyNumber}
    </span>
  );
}
