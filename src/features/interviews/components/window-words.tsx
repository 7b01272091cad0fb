import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { range } from "../form/row-notices.ts";

const days = (count: number) => `${count} ${count === 1 ? "day" : "days"}`;

/** The two windows in words, with what they rest on. */
export function WindowWords({ person }: { person: PersonPage }) {
  const settings = useInvestigation();
  const { infectious, source } = person.windows;
  const basis =
    infectious?.basis === "onset"
      ? `onset (${formatDay(person.onsetDate)})`
      : "the specimen of the first positive test; no onset day on record";
  const cut = infectious !== null && infectious.to === person.isolationDate;
  return (
    <dl className="grid gap-x-3 gap-y-0.5 text-sm sm:grid-cols-[auto_1fr]">
      <dt className="text-ink-2">Infectious window</dt>
      <dd>
        {infectious ? (
          <>
            <strong>{range(infectious)}</strong>: from {days(settings.infectiousBefore)} before{" "}
            {basis} {cut ? "to the day of isolation" : `to ${days(settings.infectiousAfter)} after`}
            . Whom did the person meet on these days?
          </>
        ) : (
          "not known: neither onset nor a positive test is on record. Any day may be told."
        )}
      </dd>
      <dt className="text-ink-2">Source window</dt>
      <dd>
        {source ? (
          <>
            <strong>{range(source)}</strong>: {settings.incubationMin} to{" "}
            {days(settings.incubationMax)} before onset. Where may the person have caught it?
          </>
        ) : (
          "not known: it needs a day of onset."
        )}
      </dd>
    </dl>
  );
}
