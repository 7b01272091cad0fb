import { useQuery } from "@tanstack/react-query";
import type { Invitation } from "../../../../shared/contracts/accounts.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { pagedTable, usePages } from "../../../components/data-table/use-paged-table.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { formatDay, formatInstant, noValue } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { invitationsQuery, useWithdrawInvitation } from "../api/invitations.ts";

function columnsIn(
  timeZone: string,
  withdraw: (invitation: Invitation) => void,
): DataColumn<Invitation>[] {
  return [
    { id: "email", header: "E-mail", rowHeader: true, cell: (one) => one.email },
    { id: "role", header: "Role", cell: (one) => ROLE_NAMES[one.role] },
    { id: "team", header: "Team", cell: (one) => one.team ?? noValue },
    { id: "by", header: "Invited by", cell: (one) => one.invitedBy ?? noValue },
    {
      id: "ends",
      header: "Last day",
      cell: (one) => (one.endsOn ? formatDay(one.endsOn) : "no end"),
    },
    {
      id: "until",
      header: "Link works until",
      cell: (one) => formatInstant(one.expiresAt, timeZone),
    },
    {
      id: "withdraw",
      header: "Change",
      cell: (one) => (
        <Button
          size="small"
          aria-label={`Withdraw the invitation of ${one.email} as ${ROLE_NAMES[one.role].toLowerCase()}`}
          onClick={() => withdraw(one)}
        >
          Withdraw
        </Button>
      ),
    },
  ];
}

/** Invitations that are still open; nothing at all when there is none. */
export function PendingInvitations() {
  const { id, timeZone } = useInvestigation();
  const pages = usePages();
  const toast = useToast();
  const withdraw = useWithdrawInvitation(id);
  // The one invited acts elsewhere, so this list asks again by itself.
  const list = useQuery({
    ...invitationsQuery(id, pages.page, pages.pageSize),
    refetchInterval: 30_000,
  });
  if (list.data?.total === 0) return null;
  return (
    <div className="mt-8">
      <Section
        title="Invited, not here yet"
        subLine="Inviting the same address and role again ends the earlier link."
      >
        <DataTable<Invitation>
          {...pagedTable(list, pages)}
          caption="Open invitations, the newest first"
          noun="invitations"
          columns={columnsIn(timeZone, (one) =>
            withdraw.mutate(one.id, {
              onSuccess: () => toast({ tone: "done", text: "Invitation withdrawn" }),
              onError: (error) =>
                toast({ tone: "error", text: `Not withdrawn. ${errorWords(error)}.` }),
            }),
          )}
          rowId={(one) => one.id}
        />
      </Section>
    </div>
  );
}
