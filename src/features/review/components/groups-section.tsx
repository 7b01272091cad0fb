import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import { paths } from "../../../app/paths.ts";
import type { SortState } from "../../../components/data-table/data-column.ts";
import { sortParameter } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { VersionWords } from "../../../components/network-report/version-words.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { withQuery } from "../../../lib/api-client.ts";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { groupPlaces } from "../../../lib/group-places.ts";
import { groupsQuery, largestGroupsQuery } from "../../../lib/groups-query.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { groupColumns } from "../group-columns.tsx";
import { growthSentence } from "../growth-sentence.ts";

const byGrowth: SortState = { key: "grownSince", descending: true };
const mostGrown = { page: 1, pageSize: 50, sort: "-grownSince" } as const;

/** Connected groups by what they grew, each one step away from its picture. */
export function GroupsSection() {
  const { id, timeZone } = useInvestigation();
  const { rooms } = useSession();
  const [page, setPage] = useState(1);
  const [pageSize, setPageSize] = useState(50);
  const [sort, setSort] = useState<SortState>(byGrowth);
  const groups = useQuery(groupsQuery(id, { page, pageSize, sort: sortParameter(sort) }));
  const grown = useQuery(groupsQuery(id, mostGrown));
  const largest = useQuery(largestGroupsQuery(id));
  const since = formatInstant(groups.data?.since, timeZone);
  const columns = useMemo(
    () => groupColumns(groupPlaces(largest.data?.items ?? [])),
    [largest.data],
  );
  const version = groups.data?.graphVersion;
  const updating = groups.isFetching && groups.data !== undefined;

  return (
    <Section
      title="Groups"
      subLine={
        version === undefined ? undefined : (
          <>
            people connected by contact pairs, all exposures; growth since {since};{" "}
            <VersionWords graphVersion={version} updating={updating} />
          </>
        )
      }
    >
      {grown.data ? (
        <p className="mb-3 text-base">
          {growthSentence(
            grown.data.items,
            grown.data.total,
            formatInstant(grown.data.since, timeZone),
          )}
        </p>
      ) : null}
      <DataTable
        caption="Connected groups"
        columns={columns}
        rows={groups.data?.items ?? []}
        rowId={(group) => group.id}
        total={groups.data?.total ?? 0}
        page={page}
        pageSize={pageSize}
        onPageChange={setPage}
        onPageSizeChange={(size) => {
          setPageSize(size);
          setPage(1);
        }}
        sort={sort}
        onSortChange={(next) => {
          setSort(next);
          setPage(1);
        }}
        rowTo={
          rooms.includes("compare")
            ? (group) => withQuery(paths.compare(id), { group: group.id })
            : undefined
        }
        state={groups.isPending ? "loading" : groups.isError && !groups.data ? "error" : "ready"}
        updating={updating}
        errorKind={errorKind(groups.error)}
        onRetry={() => void groups.refetch()}
        noun="groups"
        empty={
          <EmptyState title="No connected group yet">
            A group is two people or more, connected by contact pairs. The first one appears with
            the first interview that names a contact.
          </EmptyState>
        }
      />
      <Caution>
        Groups found by calculation are suggestions; an epidemiologist decides what a cluster is. A
        line is a contact, not an infection. Do not tell a contact who the case is.
      </Caution>
    </Section>
  );
}
