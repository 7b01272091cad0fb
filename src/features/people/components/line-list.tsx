import { useQuery } from "@tanstack/react-query";
import { useMemo, useRef } from "react";
import type { Person } from "../../../../shared/contracts/people.ts";
import { paths } from "../../../app/paths.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { MarkLegend } from "../../../components/person-mark/mark-legend.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { isTextList, useRemembered } from "../../../lib/remembered.ts";
import { useSession } from "../../../lib/session-context.ts";
import { peopleQuery } from "../api/list-people.ts";
import { HIDDEN_AT_FIRST, peopleColumns } from "../people-columns.tsx";
import { useListState } from "../use-list-state.ts";
import { LineListFilters } from "./line-list-filters.tsx";

export type LineListProps = {
  memberNames?: ReadonlyMap<string, string> | undefined;
};

/** Keys seen so far in the answers; people whose identity is not open come with fewer. */
function useSeenKeys(rows: readonly Person[]): ReadonlySet<string> {
  const seen = useRef<ReadonlySet<string>>(new Set());
  return useMemo(() => {
    const keys = new Set(seen.current);
    for (const row of rows) for (const key of Object.keys(row)) keys.add(key);
    if (keys.size > seen.current.size) seen.current = keys;
    return seen.current;
  }, [rows]);
}

const none: readonly Person[] = [];

/** Everybody in sight, with the columns that the acting role gets. */
export function LineList({ memberNames }: LineListProps) {
  const session = useSession();
  const { id: investigationId, timeZone } = useInvestigation();
  const state = useListState(investigationId);
  const people = useQuery(peopleQuery(investigationId, state.ask));
  const rows = people.data?.items ?? none;
  const keys = useSeenKeys(rows);
  const [hidden, setHidden] = useRemembered("people-columns", [...HIDDEN_AT_FIRST], isTextList);
  const columns = useMemo(
    () => peopleColumns({ keys, accountId: session.accountId, timeZone, memberNames }),
    [keys, session.accountId, timeZone, memberNames],
  );
  const areas = useMemo(
    () => [...new Set(rows.flatMap((row) => (row.area ? [row.area] : [])))].sort(),
    [rows],
  );

  return (
    <>
      <DataTable<Person>
        caption="People on record"
        noun="people"
        columns={columns}
        rows={rows}
        rowId={(row) => row.id}
        rowTo={(row) => paths.person(investigationId, row.id)}
        total={people.data?.total ?? 0}
        page={state.ask.page}
        pageSize={state.ask.pageSize}
        onPageChange={state.setPage}
        onPageSizeChange={state.setPageSize}
        sort={state.sort}
        onSortChange={state.setSort}
        hiddenColumns={hidden}
        onHiddenColumnsChange={setHidden}
        state={people.data ? "ready" : people.isError ? "error" : "loading"}
        updating={people.isPlaceholderData}
        errorKind={errorKind(people.error)}
        onRetry={() => void people.refetch()}
        tools={<LineListFilters state={state} keys={keys} areas={areas} />}
        empty={
          state.anyFilter ? (
            <EmptyState title="Nobody in sight fits this">
              Names are found by their whole parts, also by how they sound; telephone numbers by all
              their digits. People outside your assignment are not searched.
            </EmptyState>
          ) : (
            <EmptyState title="Nobody is on record yet">
              Register the first case, or import a list.
            </EmptyState>
          )
        }
      />
      {rows.length > 0 ? (
        <div className="mt-3">
          <MarkLegend layout="row" />
        </div>
      ) : null}
    </>
  );
}
