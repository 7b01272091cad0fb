import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import type { SortState } from "../../../components/data-table/data-column.ts";
import { sortParameter } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { DayStrip } from "../../../components/day-strip/day-strip.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { VersionWords } from "../../../components/network-report/version-words.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatCount, formatNumber } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { clustersQuery } from "../api/get-clusters.ts";
import { clusterColumns } from "../cluster-columns.tsx";
import { clusterDays, clusterRows } from "../cluster-rows.ts";

/** Each has a strip of its own below the table, so a page holds few. */
const pageSize = 10;

/** Proposed clusters as a table and, on one scale of days, a strip of onsets each. */
export function ClustersSection() {
  const { id } = useInvestigation();
  const [page, setPage] = useState(1);
  const [sort, setSort] = useState<SortState>(null);
  const clusters = useQuery(clustersQuery(id, { page, pageSize, sort: sortParameter(sort) }));
  const list = clusters.data;
  const updating = list !== undefined && (list.updating || clusters.isFetching);
  const rows = useMemo(() => clusterRows(list?.items ?? []), [list]);

  return (
    <Section
      title="Proposed clusters"
      subLine={
        list ? (
          <>
            {formatCount(list.minimumCases, "case", "cases")} or more, confirmed or probable, joined
            by a contact pair or by the same place on the same days, with reference days at most{" "}
            {formatCount(list.windowDays, "day", "days")} apart;{" "}
            <VersionWords graphVersion={list.graphVersion} updating={updating} />
          </>
        ) : undefined
      }
    >
      {list && list.withoutReferenceDay > 0 ? (
        <p className="mb-3 text-base">
          {formatCount(
            list.withoutReferenceDay,
            "case has neither a whole onset day nor a specimen day and is",
            "cases have neither a whole onset day nor a specimen day and are",
          )}{" "}
          in no proposed cluster.
        </p>
      ) : null}
      <DataTable
        caption="Proposed clusters"
        columns={clusterColumns}
        rows={list?.items ?? []}
        rowId={({ number }) => String(number)}
        total={list?.total ?? 0}
        page={page}
        pageSize={pageSize}
        onPageChange={setPage}
        sort={sort}
        onSortChange={(next) => {
          setSort(next);
          setPage(1);
        }}
        state={clusters.isPending ? "loading" : clusters.isError && !list ? "error" : "ready"}
        updating={updating}
        errorKind={errorKind(clusters.error)}
        onRetry={() => void clusters.refetch()}
        noun="proposed clusters"
        empty={
          <EmptyState title="No proposed cluster">
            One appears when two confirmed or probable cases that met, or were at the same place on
            the same days, fell ill near enough in time. That none is proposed does not mean that
            there is none.
          </EmptyState>
        }
      />
      {list && rows.length > 0 ? (
        <DayStrip
          label="Onsets of the proposed clusters"
          {...clusterDays(list.items, list.today)}
          today={list.today}
          rows={rows}
          legend
          notes={
            <p className="text-sm text-ink-2">
              Where the onset of a case is not known, the specimen day stands for it. A number is a
              place in this list of {formatNumber(list.total)} and changes with the record.
            </p>
          }
        />
      ) : null}
      <Caution>
        Groups found by calculation are suggestions; an epidemiologist decides what a cluster is. A
        shared place or a contact is not proof of transmission.
      </Caution>
    </Section>
  );
}
