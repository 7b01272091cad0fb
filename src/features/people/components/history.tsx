import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { classificationWords, interviewWords, wordFor } from "../../../lib/words.ts";

export type HistoryProps = { person: PersonPage; timeZone: string };

/** How the person was classified, newest first, each by its version of the case definition. */
export function ClassificationHistory({ person, timeZone }: HistoryProps) {
  if (person.classifications.length === 0) {
    return <p className="text-ink-2">Not classified yet.</p>;
  }
  const newestFirst = [...person.classifications].sort((a, b) =>
    b.recordedAt.localeCompare(a.recordedAt),
  );
  return (
    <ol>
      {newestFirst.map((one) => (
        <li key={`${one.recordedAt} ${one.classification}`} className="border-b border-rule py-1.5">
          {wordFor(classificationWords, one.classification)}
          <span className="block text-sm text-ink-2">
            {formatInstant(one.recordedAt, timeZone)} · case definition {one.caseDefinitionVersion}
          </span>
        </li>
      ))}
    </ol>
  );
}

/** Every try to interview the person, newest first. */
export function AttemptHistory({ person, timeZone }: HistoryProps) {
  if (person.attempts.length === 0) return <p className="text-ink-2">None yet.</p>;
  const newestFirst = [...person.attempts].sort((a, b) => b.heldAt.localeCompare(a.heldAt));
  return (
    <ol>
      {newestFirst.map((one) => (
        <li key={one.id} className="border-b border-rule py-1.5">
          {wordFor(interviewWords, one.outcome)}
          <span className="block text-sm text-ink-2">
            {formatInstant(one.heldAt, timeZone)}
            {one.channel ? ` · ${wordFor({}, one.channel)}` : ""}
          </span>
        </li>
      ))}
    </ol>
  );
}
