import type { Person } from "../../../../shared/contracts/people.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { classificationWords, interviewWords } from "../../../lib/words.ts";
import { PersonLabel } from "./person-label.tsx";

/** A person on two lines, for narrow pages: who, and what is known at a glance. */
export function personCard(person: Person) {
  const name = person.name ?? person.nameMasked;
  const more = [
    person.classification ? classificationWords[person.classification] : "not classified",
    person.onsetDate && /^\d/.test(person.onsetDate)
      ? `onset ${formatDay(person.onsetDate)}`
      : null,
    person.interviewState ? `interview ${interviewWords[person.interviewState]}` : null,
    person.area,
  ];
  return {
    title: (
      <>
        <PersonLabel person={person} />
        {name ? <span className="ms-2">{name}</span> : null}
      </>
    ),
    more: more.filter(Boolean).join(" · "),
  };
}
