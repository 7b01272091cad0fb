import { useQuery } from "@tanstack/react-query";
import { type ReactNode, useCallback, useMemo, useRef } from "react";
import type { Person } from "../../../../shared/contracts/people.ts";
import { hasDuty } from "../../../../shared/roles.ts";
import { paths } from "../../../app/paths.ts";
import { VirtualTable } from "../../../components/data-table/virtual-table.tsx";
import { MarkLegend } from "../../../components/person-mark/mark-legend.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind, errorWords } from "../../../lib/api-error.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { assigneesQuery } from "../api/assign-people.ts";
import { peopleColumns } from "../people-columns.tsx";
import { useColumnLayout } from "../use-column-layout.ts";
import { useListState } from "../use-list-state.ts";
import { usePeoplePages } from "../use-people-pages.ts";
import { usePicked } from "../use-picked.ts";
import { ColumnLayoutChoice } from "./column-layout-choice.tsx";
import { LineListFilters } from "./line-list-filters.tsx";
import { personCard } from "./person-card.tsx";
import { SavedFilters } from "./saved-filters.tsx";
import { SelectionBar } from "./selection-bar.tsx";

export type LineListProps = {
  /** What else can be done with the list as it is shown, such as taking it out as a file. */
  actions?: ReactNode;
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

const noAssignees = { members: [], teams: [] };

/** Everybody in sight, with the columns that the acting role gets. */
export function LineList({ actions }: LineListProps) {
  const { accountId, actingRole } = useSession();
  const { id: investigationId, timeZone } = useInvestigation();
  const state = useListState(investigationId);
  const people = usePeoplePages(investigationId, state.question);
  const picked = usePicked(state.key, people.total);
  const keys = useSeenKeys(people.rows);
  const assigns = hasDuty(actingRole, "assign");
  const known = useQuery({
    ...assigneesQuery(investigationId),
    enabled: assigns || hasDuty(actingRole, "manageMembers"),
  });
  const assignees = known.data ?? noAssignees;
  const columns = useMemo(() => {
    const names = new Map([
      ...assignees.members.map((one) => [one.accountId, one.displayName] as const),
      ...assignees.teams.map((one) => [one.id, `team ${one.name}`] as const),
    ]);
    return peopleColumns({ keys, accountId, timeZone, names });
  }, [keys, accountId, timeZone, assignees]);
  const layout = useColumnLayout(accountId, columns);
  const areas = useMemo(
    () => [...new Set(people.rows.flatMap((row) => (row.area ? [row.area] : [])))].sort(),
    [people.rows],
  );
  const { onRange } = people;
  const { keepFirstRow, firstRow } = state;
  const place = useRef(keepFirstRow);
  place.current = keepFirstRow;
  const range = useCallback(
    (first: number, last: number) => {
      onRange(first, last);
      place.current(first);
    },
    [onRange],
  );

  return (
    <>
      <div className="flex flex-wrap items-end gap-x-4 gap-y-2 pb-2" data-print="hide">
        <LineListFilters state={state} keys={keys} areas={areas} members={assignees.members} />
        <div className="ms-auto flex flex-wrap items-end gap-2">
          <SavedFilters investigationId={investigationId} state={state} />
          <ColumnLayoutChoice layout={layout} />
          {actions}
        </div>
      </div>
      {assigns ? (
        <SelectionBar
          investigationId={investigationId}
          picked={picked}
          question={state.question}
          total={people.total}
          assignees={assignees}
        />
      ) : null}
      <VirtualTable<Person>
        question={state.key}
        caption="People on record"
        noun="people"
        columns={layout.shown}
        total={people.total}
        rowAt={people.rowAt}
        rowId={(row) => row.id}
        onRange={range}
        firstRow={firstRow()}
        rowTo={(row) => paths.person(investigationId, row.id)}
        card={(row) => personCard(row)}
        sort={state.sort}
        onSortChange={state.setSort}
        selection={assigns ? picked.selection : undefined}
        state={people.state}
        updating={people.updating}
        errorKind={errorKind(people.error)}
        onRetry={people.retry}
        empty={state.anyFilter ? <NobodyFits /> : <NobodyYet />}
      />
      {people.pageError ? (
        <Notice
          tone="error"
          title="Some rows could not be read."
          actions={<Button onClick={people.retry}>Try again</Button>}
        >
          {errorWords(people.pageError)}.
        </Notice>
      ) : null}
      {people.total > 0 ? (
        <div className="mt-3">
          <MarkLegend layout="row" />
        </div>
      ) : null}
    </>
  );
}

function NobodyFits() {
  return (
    <EmptyState title="Nobody in sight fits this">
      Names are found by their whole parts, also by how they sound; telephone numbers by all their
      digits. People outside your assignment are not searched.
    </EmptyState>
  );
}

function NobodyYet() {
  return (
    <EmptyState title="Nobody is on record yet">
      Register the first case, or import a list.
    </EmptyState>
  );
}
