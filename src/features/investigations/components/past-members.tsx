import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { Member } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatDay, formatInstant, noValue } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { membersQuery } from "../../../lib/members-query.ts";

const columnsIn = (timeZone: string): DataColumn<Member>[] => [
  { id: "name", header: "Name", rowHeader: true, cell: (member) => member.displayName },
  { id: "email", header: "E-mail", cell: (member) => member.email },
  { id: "role", header: "Role", cell: (member) => ROLE_NAMES[member.role] },
  { id: "team", header: "Team", cell: (member) => member.team ?? noValue },
  { id: "since", header: "Since", cell: (member) => formatInstant(member.since, timeZone) },
  {
    id: "ended",
    header: "Ended",
    cell: (member) => (member.endedAt ? formatInstant(member.endedAt, timeZone) : noValue),
  },
  {
    id: "last",
    header: "Last day set",
    cell: (member) => (member.endsOn ? formatDay(member.endsOn) : noValue),
  },
];

/** Memberships that are over, for the record; nothing at all when there is none. */
export function PastMembers() {
  const { id, timeZone } = useInvestigation();
  const [page, setPage] = useState(1);
  const [pageSize, setPageSize] = useState(50);
  const list = useQuery(membersQuery(id, page, pageSize, "past"));
  if (!list.data && !list.isError) return null;
  if (list.data?.total === 0) return null;
  return (
    <div className="mt-8">
      <Section title="Roles that are over" subLine="Kept for the record; they open nothing.">
        <DataTable<Member>
          caption="Memberships that are over, the latest first"
          noun="past memberships"
          columns={columnsIn(timeZone)}
          rows={list.data?.items ?? []}
          rowId={(member) => member.id}
          total={list.data?.total ?? 0}
          page={page}
          pageSize={pageSize}
          onPageChange={setPage}
          onPageSizeChange={(size) => {
            setPageSize(size);
            setPage(1);
          }}
          sort={null}
          onSortChange={() => {}}
          state={list.data ? "ready" : "error"}
          updating={list.isPlaceholderData}
          errorKind={errorKind(list.error)}
          onRetry={() => void list.refetch()}
        />
      </Section>
    </div>
  );
}
