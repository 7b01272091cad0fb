import { useQuery } from "@tanstack/react-query";
import type { FollowCheck } from "../../../../shared/contracts/follow-up.ts";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Answer } from "../../../components/ui/answer.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatDay, formatInstant } from "../../../lib/formatters.ts";
import { checkWords, followStateWords, wordFor } from "../../../lib/words.ts";
import { checksQuery } from "../api/list-checks.ts";
import { CheckBar } from "./check-bar.tsx";
import { isFollowed } from "./follow-status.tsx";

export type FollowSectionProps = {
  investigationId: string;
  person: PersonPage;
  timeZone: string;
  today: string;
};

/** The checks of somebody who is or was a contact, and today's where they still are one. */
export function FollowSection({ investigationId, person, timeZone, today }: FollowSectionProps) {
  const checks = useQuery(checksQuery(investigationId, person.id));
  const state = person.monitoring?.state;
  if (!state) return null;
  return (
    <Section title="Follow-up" subLine={followStateWords[state]}>
      {isFollowed(state) ? (
        <CheckBar
          investigationId={investigationId}
          person={{ ...person, called: person.name ?? person.studyNumber, mine: true }}
          today={today}
        />
      ) : null}
      {checks.isPending ? <LoadingState label="Loading checks" rows={2} /> : null}
      {checks.isError ? (
        <ErrorState kind={errorKind(checks.error)} onRetry={() => void checks.refetch()} />
      ) : null}
      {checks.data?.items.length === 0 ? (
        <p className="mt-2 text-ink-2">No check on record.</p>
      ) : null}
      {checks.data && checks.data.items.length > 0 ? (
        <ScrollRegion label="Table of checks">
          <Table caption="Checks" hideCaption>
            <thead>
              <tr>
                {["day", "reached", "symptoms", "who answered", "note", "entered"].map((head) => (
                  <HeadCell key={head}>{head}</HeadCell>
                ))}
              </tr>
            </thead>
            <tbody>
              {checks.data.items.map((check) => (
                <CheckRow key={check.id} check={check} timeZone={timeZone} />
              ))}
            </tbody>
          </Table>
        </ScrollRegion>
      ) : null}
    </Section>
  );
}

function CheckRow({ check, timeZone }: { check: FollowCheck; timeZone: string }) {
  const codes = check.symptomCodes.map((code) => wordFor({}, code)).join(", ");
  return (
    <tr>
      <HeadCell scope="row">{formatDay(check.day)}</HeadCell>
      <Cell>{checkWords[check.outcome]}</Cell>
      <Cell>
        <Answer value={check.symptoms} />
        {codes ? `: ${codes}` : null}
      </Cell>
      <Cell>
        <Answer value={check.respondent} format={(value) => wordFor({}, String(value))} />
      </Cell>
      <Cell>{check.note ?? "–"}</Cell>
      <Cell>{formatInstant(check.recordedAt, timeZone)}</Cell>
    </tr>
  );
}
