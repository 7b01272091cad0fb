import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { counted } from "../form/words.ts";

/** What was tried and told before, in one quiet line; nothing when this is the first time. */
export function EarlierAttempts({ person }: { person: PersonPage }) {
  const { timeZone } = useInvestigation();
  const latest = person.attempts.reduce<PersonPage["attempts"][number] | null>(
    (last, one) => (last && last.heldAt >= one.heldAt ? last : one),
    null,
  );
  if (!latest) return null;
  const named = person.pairs.length;
  return (
    <p className="mb-3 text-sm text-ink-2">
      {counted(person.attempts.length, "interview or attempt", "interviews and attempts")} before;
      the latest on {formatInstant(latest.heldAt, timeZone)}
      {latest.channel ? ` by ${latest.channel}` : ""}: {latest.outcome.replace("_", " ")}.{" "}
      {named > 0 ? `${counted(named, "contact pair")} on record already.` : ""}
    </p>
  );
}
