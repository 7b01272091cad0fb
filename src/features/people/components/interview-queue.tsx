import { useState } from "react";
import { paths } from "../../../app/paths.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatCount } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { useInterviewQueue } from "../use-interview-queue.ts";
import { QueueItem } from "./queue-item.tsx";

const shownAtFirst = 6;

/** Cases to interview, the reader's own first. Left out where nobody in sight may be interviewed. */
export function InterviewQueue() {
  const { id: investigationId, today } = useInvestigation();
  const { accountId } = useSession();
  const queue = useInterviewQueue(investigationId, accountId);
  const [all, setAll] = useState(false);

  if (queue.isPending) return <LoadingState label="Loading the interview queue" rows={3} />;
  if (queue.error) {
    return (
      <Section title="To interview">
        <ErrorState kind={errorKind(queue.error)} onRetry={queue.refetch} />
      </Section>
    );
  }
  if (queue.rows.length === 0) {
    // Waiting cases that nobody here may interview are other people's work: no empty list for it.
    if (queue.total > 0) return null;
    return (
      <Section title="To interview">
        <EmptyState title="No interviews are waiting">
          No case in sight waits for one: they are complete, refused, or not registered yet.
        </EmptyState>
      </Section>
    );
  }
  const shown = all ? queue.rows : queue.rows.slice(0, shownAtFirst);
  const mine = queue.rows.filter((row) => row.mine).length;
  const rest = queue.rows.length - shown.length;
  return (
    <Section
      title="To interview"
      subLine={`${formatCount(queue.total, "case waits", "cases wait")}${mine > 0 ? `, ${mine} yours` : ""}; longest waiting first`}
    >
      <ul className="border-t border-ink">
        {shown.map(({ person, mine: own }) => (
          <QueueItem
            key={person.id}
            person={person}
            mine={own}
            today={today}
            personTo={paths.person(investigationId, person.id)}
            interviewTo={paths.interview(investigationId, person.id)}
          />
        ))}
      </ul>
      {rest > 0 || all ? (
        <Button variant="plain" className="-ms-3.5" onClick={() => setAll(!all)}>
          {all ? "Show the first few" : `Show ${rest} more`}
        </Button>
      ) : null}
    </Section>
  );
}
