import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Link } from "react-router-dom";
import type { CompareRunItem } from "../../../../shared/contracts/compare.ts";
import { paths } from "../../../app/paths.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind, errorWords } from "../../../lib/api-error.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { populationNames } from "../../../lib/population-words.ts";
import { useEndCompareRun } from "../api/end-compare-run.ts";
import { compareRunsQuery } from "../api/list-compare-runs.ts";
import { mayChange, runStateWords } from "../run-words.ts";
import { plainLink } from "./plain-link.ts";
import { RunProgress } from "./run-progress.tsx";

const pageSize = 10;

function columnsIn(timeZone: string): DataColumn<CompareRunItem>[] {
  return [
    { id: "name", header: "Name", rowHeader: true, wrap: true, cell: (run) => run.name },
    {
      id: "state",
      header: "State",
      cell: runStateWords,
      pending: (run) => run.state === "running",
    },
    {
      id: "recordedAt",
      header: "Asked for",
      cell: (run) => formatInstant(run.recordedAt, timeZone),
    },
    { id: "by", header: "By", wrap: true, cell: (run) => run.by ?? "—" },
    { id: "cutOff", header: "Cut-off", cell: (run) => formatInstant(run.cutOff, timeZone) },
    { id: "population", header: "People", cell: (run) => populationNames[run.population] },
    { id: "n", header: "n", numeric: true, cell: (run) => formatNumber(run.people) },
    {
      id: "replicates",
      header: "Random networks",
      numeric: true,
      cell: (run) =>
        run.state === "ready" && run.reached < run.replicates
          ? `${formatNumber(run.reached)} of ${formatNumber(run.replicates)}`
          : formatNumber(run.replicates),
    },
  ];
}

export type RunListProps = { investigationId: string; timeZone: string };

/** Comparisons asked for so far; what is being worked out stands on top with a way to stop it. */
export function RunList({ investigationId, timeZone }: RunListProps) {
  const [page, setPage] = useState(1);
  const [columns] = useState(() => columnsIn(timeZone));
  const runs = useQuery(compareRunsQuery(investigationId, page, pageSize));
  const end = useEndCompareRun(investigationId);
  const items = runs.data?.items ?? [];
  const running = items.filter(({ state }) => state === "running");
  return (
    <>
      {end.isError ? (
        <Notice tone="error" title="Not stopped." className="mb-3">
          {errorWords(end.error)}.
        </Notice>
      ) : null}
      {running.length > 0 ? (
        <ul aria-label="Being worked out" className="mb-4 max-w-3xl">
          {running.map((run) => (
            <li key={run.id} className="border-t border-rule py-3 last:border-b">
              <RunProgress
                run={run}
                label={
                  <Link to={paths.compareRun(investigationId, run.id)} className={plainLink}>
                    {run.name}
                  </Link>
                }
                onCancel={
                  mayChange(run) ? () => end.mutate({ runId: run.id, act: "cancel" }) : undefined
                }
                cancelling={end.isPending && end.variables.runId === run.id}
              />
            </li>
          ))}
        </ul>
      ) : null}
      <DataTable<CompareRunItem>
        caption="Comparisons, newest first"
        hideCaption
        noun="comparisons"
        columns={columns}
        rows={items}
        rowId={(run) => run.id}
        rowTo={(run) => paths.compareRun(investigationId, run.id)}
        total={runs.data?.total ?? 0}
        page={page}
        pageSize={pageSize}
        onPageChange={setPage}
        sort={null}
        onSortChange={() => {}}
        state={runs.data ? "ready" : runs.isError ? "error" : "loading"}
        updating={runs.isPlaceholderData}
        errorKind={errorKind(runs.error)}
        onRetry={() => void runs.refetch()}
        empty={
          <EmptyState title="No comparison was asked for yet">
            A comparison draws networks in which chance decides who met whom, and says where the
            network on record lies among them. It is kept with its cut-off and seed, so that it can
            be worked out again.
          </EmptyState>
        }
      />
    </>
  );
}
