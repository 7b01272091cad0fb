import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { Team } from "../../../../shared/contracts/investigations.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { pagedTable, usePages } from "../../../components/data-table/use-paged-table.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/form-errors.ts";
import { formatNumber } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { teamsQuery, useRemoveTeam } from "../api/teams.ts";
import { TeamForm } from "./team-form.tsx";

const isEmpty = (team: Team) => team.members + team.invitations + team.people === 0;

function columnsWith(
  rename: (team: Team) => void,
  remove: (team: Team) => void,
): DataColumn<Team>[] {
  return [
    { id: "name", header: "Team", rowHeader: true, cell: (team) => team.name },
    { id: "members", header: "Members", cell: (team) => formatNumber(team.members) },
    { id: "invitations", header: "Invited", cell: (team) => formatNumber(team.invitations) },
    { id: "people", header: "People assigned", cell: (team) => formatNumber(team.people) },
    {
      id: "change",
      header: "Change",
      cell: (team) => (
        <span className="flex gap-2">
          <Button size="small" aria-label={`Rename ${team.name}`} onClick={() => rename(team)}>
            Rename …
          </Button>
          {isEmpty(team) ? (
            <Button size="small" aria-label={`Remove ${team.name}`} onClick={() => remove(team)}>
              Remove
            </Button>
          ) : null}
        </span>
      ),
    },
  ];
}

/** The teams of the investigation: made, renamed, and removed while nothing hangs on them. */
export function TeamsSection() {
  const { id } = useInvestigation();
  const toast = useToast();
  const pages = usePages();
  const [naming, setNaming] = useState<Team | "new" | null>(null);
  const remove = useRemoveTeam(id);
  const list = useQuery(teamsQuery(id, pages.page, pages.pageSize));
  const removeTeam = (team: Team) =>
    remove.mutate(team.id, {
      onSuccess: () => toast({ tone: "done", text: `Team ${team.name} removed` }),
      onError: (error) => {
        const code = error instanceof ApiError ? error.errors[0]?.code : undefined;
        toast({ tone: "error", text: `Not removed. ${fieldWords(code) ?? errorWords(error)}.` });
      },
    });
  return (
    <div className="mt-8">
      <Section
        title="Teams"
        subLine="A team sees the people assigned to it. One can be removed when nothing hangs on it."
      >
        {naming ? (
          <TeamForm
            key={naming === "new" ? "new" : naming.id}
            investigationId={id}
            team={naming === "new" ? null : naming}
            onDone={(done) => {
              if (done) toast({ text: done, tone: "done" });
              setNaming(null);
            }}
          />
        ) : null}
        <DataTable<Team>
          {...pagedTable(list, pages)}
          caption="Teams of this investigation, by name"
          noun="teams"
          columns={columnsWith(setNaming, removeTeam)}
          rowId={(team) => team.id}
          empty={
            <EmptyState title="No team yet">
              People are assigned to one member each. Make a team where several share the same
              people.
            </EmptyState>
          }
          tools={naming ? undefined : <Button onClick={() => setNaming("new")}>Make a team</Button>}
        />
      </Section>
    </div>
  );
}
