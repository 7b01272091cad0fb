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
import { endsQuery } from "../api/list-ends.ts";
import { symptomListQuery } from "../api/symptom-list.ts";
import { CheckBar } from "./check-bar.tsx";
import { EndsTable } from "./ends-table.tsx";
import { isFollowed } from "./follow-status.tsx";
import { ReopenFollowUp } from "./reopen-follow-up.tsx";

export type FollowSectionProps = {
  investigationId: string;
  person: PersonPage;
  timeZone: string;
  today: string;
};

/** The checks of somebody who is or was a contact, and today's where they still are one. */
export function FollowSection({ investigationId, person, timeZone, today }: FollowSectionProps) {
  const checks = useQuery(checksQuery(investigationId, person.id));
  const ends = useQuery(endsQuery(investigationId, person.id));
  const symptoms = useQuery({
    ...symptomListQuery(investigationId),
    enabled: checks.data?.items.some(({ symptomCodes }) => symptomCodes.length > 0) === true,
  });
  const labels = Object.fromEntries((symptoms.data ?? []).map(({ code, label }) => [code, label]));
  const standing = ends.data?.items.find(({ takenBackAt }) => takenBackAt === null);
  // Without a day 0 there are no due days, yet the contact can be called and the follow-up ended.
  const undated = !person.monitoring && person.classification === "contact";
  const state =
    person.monitoring?.state ?? (undated ? (standing?.reason ?? "under_follow_up") : undefined);
  if (!state) return null;
  const called = person.name ?? person.studyNumber;
  return (
    <Section title="Follow-up" subLine={undated ? "no day 0" : followStateWords[state]}>
      {isFollowed(state) ? (
        <CheckBar
          investigationId={investigationId}
          person={{ ...person, called, mine: true }}
          today={today}
        />
      ) : null}
      {standing && state === standing.reason ? (
        <ReopenFollowUp
          investigationId={investigationId}
          person={{ id: person.id, called }}
          end={standing}
        />
      ) : null}
      {ends.isError ? (
        <ErrorState kind={errorKind(ends.error)} onRetry={() => void ends.refetch()} />
      ) : null}
      {ends.data && ends.data.items.length > 0 ? (
        <EndsTable ends={ends.data.items} timeZone={timeZone} />
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
                <CheckRow key={check.id} check={check} labels={labels} timeZone={timeZone} />
              ))}
            </tbody>
          </Table>
        </ScrollRegion>
      ) : null}
    </Section>
  );
}

function CheckRow({
  check,
  labels,
  timeZone,
}: {
  check: FollowCheck;
  /** Words of the symptoms in the settings; one that was removed from them keeps its code. */
  labels: Readonly<Record<string, string>>;
  timeZone: string;
}) {
  const codes = check.symptomCodes.map((code) => wordFor(labels, code)).join(", ");
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
