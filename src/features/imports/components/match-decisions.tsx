import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { MatchedOn } from "../../../../shared/contracts/imports.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { errorKind, errorWords } from "../../../lib/api-error.ts";
import { formatCount, formatNumber } from "../../../lib/formatters.ts";
import { useDecideMatches } from "../api/decide-matches.ts";
import { importMatchesQuery } from "../api/list-import-matches.ts";
import { decidedWords, matchedWords } from "../import-words.ts";
import { MatchItem } from "./match-item.tsx";

const pageSize = 20;

export type MatchDecisionsProps = { investigationId: string; importId: string };

type Bulk = { matchedOn: MatchedOn; waiting: number; decision: "same" | "other" };

/** Rows set aside because they may be somebody else: decided one by one, or all of a kind. */
export function MatchDecisions({ investigationId, importId }: MatchDecisionsProps) {
  const [page, setPage] = useState(1);
  const [bulk, setBulk] = useState<Bulk | null>(null);
  const [left, setLeft] = useState<number | null>(null);
  const list = useQuery(importMatchesQuery(investigationId, importId, page, pageSize));
  const decide = useDecideMatches(investigationId, importId);
  const found = list.data;
  if (list.isError && !found) {
    return <ErrorState kind={errorKind(list.error)} onRetry={() => void list.refetch()} />;
  }
  if (!found) return <LoadingState label="Opening the rows set aside" rows={3} />;
  const shown = Math.min(page, Math.max(1, Math.ceil(found.total / pageSize)));
  if (shown !== page) setPage(shown);

  function decideAll({ matchedOn, decision }: Bulk) {
    setLeft(null);
    decide.mutate({ matchedOn, decision, onProgress: setLeft }, { onSettled: () => setBulk(null) });
  }

  return (
    <Section
      title="Set aside to decide"
      subLine={found.total > 0 ? formatCount(found.total, "row", "rows") : "nothing waits"}
    >
      {found.total > 0 ? (
        <p className="mb-3 max-w-[70ch] text-ink-2">
          These rows may be somebody who is on record, or an earlier row of the file. As the same
          person, a row fills blanks and its reference names that person too; what differs is not
          stored. As another person, it is added. A decision is recorded under your name.
        </p>
      ) : null}
      {decide.isError ? (
        <Notice tone="error" title="Not decided." className="mb-3">
          {errorWords(decide.error)}.
        </Notice>
      ) : null}
      {decide.isSuccess ? (
        <p role="status" className="mb-3">
          {decidedWords(decide.data)}
        </p>
      ) : null}
      {found.total > 1 ? (
        <ul className="mb-4">
          {found.kinds.map(({ matchedOn, waiting }) => (
            <li
              key={matchedOn}
              className="flex flex-wrap items-baseline gap-x-4 gap-y-2 border-b border-rule py-2"
            >
              <span className="min-w-0 flex-1 basis-60">
                {formatCount(waiting, "row", "rows")}: {matchedWords[matchedOn]}
              </span>
              <span className="flex flex-wrap gap-2">
                <Button
                  size="small"
                  onClick={() => setBulk({ matchedOn, waiting, decision: "same" })}
                >
                  All the same person
                </Button>
                <Button
                  size="small"
                  onClick={() => setBulk({ matchedOn, waiting, decision: "other" })}
                >
                  All other people
                </Button>
              </span>
            </li>
          ))}
        </ul>
      ) : null}
      <ol aria-label="Rows to decide">
        {found.items.map((item) => (
          <MatchItem
            key={item.id}
            investigationId={investigationId}
            item={item}
            pending={decide.isPending}
            onDecide={(decision) => decide.mutate({ id: item.id, decision })}
          />
        ))}
      </ol>
      {found.total > pageSize ? (
        <Pagination
          page={shown}
          pageSize={pageSize}
          total={found.total}
          onPageChange={setPage}
          noun="rows"
        />
      ) : null}
      {bulk ? (
        <ConfirmDialog
          open
          onOpenChange={(open) => (open || decide.isPending ? null : setBulk(null))}
          title={
            bulk.decision === "same"
              ? `Join ${formatCount(bulk.waiting, "row", "rows")}?`
              : `Add ${formatCount(bulk.waiting, "row", "rows")} as other people?`
          }
          description={
            bulk.decision === "same"
              ? `Each is joined with whom it looks like (${matchedWords[bulk.matchedOn]}). This cannot be taken back here.`
              : `Each becomes a new person (${matchedWords[bulk.matchedOn]}). This cannot be taken back here.`
          }
          confirmLabel={bulk.decision === "same" ? "Join them all" : "Add them all"}
          pending={decide.isPending}
          onConfirm={() => decideAll(bulk)}
        >
          {left !== null && decide.isPending ? (
            <p role="status">{formatNumber(left)} left</p>
          ) : null}
        </ConfirmDialog>
      ) : null}
    </Section>
  );
}
