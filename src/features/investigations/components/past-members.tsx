import { useQuery } from "@tanstack/react-query";
import type { Member } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { pagedTable, usePages } from "../../../components/data-table/use-paged-table.ts";
import { Section } from "../../../components/layouts/section.tsx";
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
  const pages = usePages();
  const list = useQuery(membersQuery(id, pages.page, pages.pageSize, "past"));
  if (!list.data && !list.isError) return null;
  if (list.data?.total === 0) return null;
  return (
    <div className="mt-8">
      <Section title="Roles that are over" subLine="Kept for the record; they open nothing.">
        <DataTable<Member>
          {...pagedTable(list, pages)}
          caption="Memberships that are over, the latest first"
          noun="past memberships"
          columns={columnsIn(timeZone)}
          rowId={(member) => member.id}
        />
      </Section>
    </div>
  );
}
