import { Link } from "react-router-dom";
import type { Person } from "../../../../shared/contracts/people.ts";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { Tag } from "../../../components/ui/tag.tsx";
import { formatDay, formatRelativeDay } from "../../../lib/formatters.ts";
import { interviewWords, wordFor } from "../../../lib/words.ts";
import { PersonLabel } from "./person-label.tsx";

export type QueueItemProps = {
  person: Person;
  mine: boolean;
  today: string;
  personTo: string;
  interviewTo: string;
};

/** One case that waits: who, since when, how far, and the way in. */
export function QueueItem({ person, mine, today, personTo, interviewTo }: QueueItemProps) {
  const begun = person.interviewState !== null;
  return (
    <li
      className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-4 gap-y-0.5 border-b border-rule
        py-1.5 sm:grid-cols-[8rem_minmax(0,1.4fr)_minmax(0,2fr)_6rem]"
    >
      <Link
        to={personTo}
        className="underline decoration-rule underline-offset-4 hover:decoration-kelp"
      >
        <PersonLabel person={person} />
      </Link>
      <span className="order-3 col-span-2 min-w-0 truncate sm:order-none sm:col-span-1">
        {person.name ?? ""}
        {mine ? (
          <Tag tone="kelp" className="ms-2">
            yours
          </Tag>
        ) : null}
      </span>
      <span className="order-4 col-span-2 min-w-0 text-sm text-ink-2 sm:order-none sm:col-span-1">
        {since(person, today)}
        {person.area ? ` · ${person.area}` : ""}
        {begun && person.interviewState
          ? ` · ${wordFor(interviewWords, person.interviewState)}`
          : ""}
      </span>
      <LinkButton
        to={interviewTo}
        size="small"
        variant={mine ? "primary" : "quiet"}
        className="order-2 justify-self-end sm:order-none"
      >
        {begun ? "Go on" : "Interview"} <span className="sr-only">{person.studyNumber}</span>
      </LinkButton>
    </li>
  );
}

function since(person: Person, today: string): string {
  const onset = person.onsetDate;
  if (onset && /^\d{4}-\d{2}-\d{2}$/.test(onset)) {
    return `onset ${formatDay(onset, { style: "short" })}, ${formatRelativeDay(onset, today)}`;
  }
  if (person.reportDate) return `reported ${formatDay(person.reportDate, { style: "short" })}`;
  return "onset not known";
}
