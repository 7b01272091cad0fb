import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import type { Member } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { pagedTable, usePages } from "../../../components/data-table/use-paged-table.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { formatDay, formatInstant, noValue } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { membersQuery } from "../../../lib/members-query.ts";
import { useSession } from "../../../lib/session-context.ts";
import { AddMemberForm, type NewMemberBy } from "./add-member-form.tsx";
import { ChangeMemberDialog } from "./change-member-dialog.tsx";
import { EndMemberDialog } from "./end-member-dialog.tsx";
import { PastMembers } from "./past-members.tsx";
import { PendingInvitations } from "./pending-invitations.tsx";
import { TeamsSection } from "./teams-section.tsx";

const nameRole = (member: Member) =>
  `${member.displayName} as ${ROLE_NAMES[member.role].toLowerCase()}`;

function memberColumns(
  timeZone: string,
  accountId: string,
  change: (member: Member) => void,
  end: (member: Member) => void,
): DataColumn<Member>[] {
  return [
    {
      id: "name",
      header: "Name",
      rowHeader: true,
      cell: (member) =>
        member.accountId === accountId ? `${member.displayName} (you)` : member.displayName,
    },
    // Before the address, which on a phone would push it out of sight.
    { id: "role", header: "Role", cell: (member) => ROLE_NAMES[member.role] },
    { id: "email", header: "E-mail", cell: (member) => member.email },
    { id: "team", header: "Team", cell: (member) => member.team ?? noValue },
    { id: "since", header: "Since", cell: (member) => formatInstant(member.since, timeZone) },
    {
      id: "ends",
      header: "Last day",
      cell: (member) => (member.endsOn ? formatDay(member.endsOn) : "no end"),
    },
    {
      id: "change",
      header: "Change",
      cell: (member) => (
        <span className="flex gap-2">
          <Button
            size="small"
            aria-label={`Change the role of ${nameRole(member)}`}
            onClick={() => change(member)}
          >
            Change …
          </Button>
          <Button
            size="small"
            aria-label={`End the role of ${nameRole(member)}`}
            onClick={() => end(member)}
          >
            End …
          </Button>
        </span>
      ),
    },
  ];
}

/**
 * Who holds which role here, who is invited, the teams, and whose role is over; a person with several roles stands here once for
 * each.
 */
export function MembersTab() {
  const { id, timeZone } = useInvestigation();
  const { accountId } = useSession();
  const toast = useToast();
  const pages = usePages();
  const [adding, setAdding] = useState<NewMemberBy | null>(null);
  const [ending, setEnding] = useState<Member | null>(null);
  const [changing, setChanging] = useState<Member | null>(null);
  const members = useQuery(membersQuery(id, pages.page, pages.pageSize));
  const columns = useMemo(
    () => memberColumns(timeZone, accountId, setChanging, setEnding),
    [timeZone, accountId],
  );
  return (
    <>
      {adding ? (
        <Section title={adding === "invitation" ? "Invite by e-mail" : "New member"}>
          <AddMemberForm
            key={adding}
            by={adding}
            investigationId={id}
            onDone={(done) => {
              if (done) toast({ text: done, tone: "done" });
              setAdding(null);
            }}
          />
        </Section>
      ) : null}
      <DataTable<Member>
        {...pagedTable(members, pages)}
        caption="Members of this investigation, by name"
        noun="memberships"
        columns={columns}
        rowId={(member) => member.id}
        tools={
          adding ? undefined : (
            <>
              <Button variant="primary" onClick={() => setAdding("invitation")}>
                Invite by e-mail
              </Button>
              <Button onClick={() => setAdding("account")}>Add a member</Button>
            </>
          )
        }
      />
      <PendingInvitations />
      <TeamsSection />
      <PastMembers />
      {changing ? (
        <ChangeMemberDialog
          investigationId={id}
          member={changing}
          onClose={() => setChanging(null)}
        />
      ) : null}
      {ending ? (
        <EndMemberDialog
          investigationId={id}
          member={ending}
          own={ending.accountId === accountId}
          onClose={() => setEnding(null)}
        />
      ) : null}
    </>
  );
}
