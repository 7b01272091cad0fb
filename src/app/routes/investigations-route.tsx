import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { hasDuty } from "../../../shared/roles.ts";
import { RoomPage } from "../../components/layouts/room-page.tsx";
import { Section } from "../../components/layouts/section.tsx";
import { Button } from "../../components/ui/button.tsx";
import { EmptyState } from "../../components/ui/empty-state.tsx";
import { ErrorState } from "../../components/ui/error-state.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";
import { LoadingState } from "../../components/ui/loading-state.tsx";
import { Tag } from "../../components/ui/tag.tsx";
import { useToast } from "../../components/ui/use-toast.ts";
import { investigationsQuery } from "../../features/investigations/api/get-investigations.ts";
import { CreateInvestigationForm } from "../../features/investigations/components/create-investigation-form.tsx";
import { InvestigationTable } from "../../features/investigations/components/investigation-table.tsx";
import { useSwitchActing } from "../../features/session/components/acting-switch.tsx";
import { errorKind } from "../../lib/api-error.ts";
import { useSession } from "../../lib/session-context.ts";
import { Frame } from "../frame.tsx";
import { paths } from "../paths.ts";

/** The investigations one works in; the way to their settings; opening a new one. */
export function Component() {
  const session = useSession();
  const toast = useToast();
  const switchTo = useSwitchActing();
  const list = useQuery(investigationsQuery());
  const [creating, setCreating] = useState(false);
  const mayChange = hasDuty(session.actingRole, "changeSettings");

  return (
    <Frame>
      <RoomPage
        title="Investigations"
        subLine="You act in one at a time."
        actions={
          mayChange && !creating ? (
            <Button onClick={() => setCreating(true)}>Open a new one</Button>
          ) : null
        }
      >
        {creating ? (
          <Section title="New investigation">
            <CreateInvestigationForm
              demo={session.demo}
              mayPractise={session.actingRole === "supervisor"}
              onCancel={() => setCreating(false)}
              onCreated={() => {
                setCreating(false);
                toast({
                  tone: "done",
                  text: "Opened. You hold your acting role in it; act in it to invite the others.",
                });
              }}
            />
          </Section>
        ) : null}
        <Section title="Yours">
          {list.isPending ? <LoadingState label="Loading investigations" rows={3} /> : null}
          {list.isError ? (
            <ErrorState kind={errorKind(list.error)} onRetry={() => void list.refetch()} />
          ) : null}
          {list.data && list.data.items.length === 0 ? (
            <EmptyState title="You hold no role in any investigation">
              A supervisor or data officer of an investigation can invite you by the e-mail you sign
              in with.
            </EmptyState>
          ) : null}
          {list.data && list.data.items.length > 0 ? (
            <InvestigationTable
              investigations={list.data.items}
              action={(one) => {
                const role = one.roles.find((held) => held === session.actingRole) ?? one.roles[0];
                if (one.id === session.investigationId) return <Tag tone="kelp">acting here</Tag>;
                return role ? (
                  <Button size="small" onClick={() => switchTo(role, one.id)}>
                    Act here <span className="sr-only">in {one.name}</span>
                  </Button>
                ) : null;
              }}
            />
          ) : null}
        </Section>
        {session.investigationId ? (
          <Section title="Settings">
            <p>
              {mayChange
                ? "Windows, clusters, grades, texts and the case definition of the investigation you act in: see what a change would move before it is saved."
                : "Windows, clusters, grades, texts and the case definition of the investigation you act in, and who changed them when."}
            </p>
            <p className="mt-3 flex flex-wrap gap-2">
              <LinkButton to={paths.settings(session.investigationId)}>
                Open the settings
              </LinkButton>
              {hasDuty(session.actingRole, "manageMembers") ? (
                <LinkButton to={paths.members(session.investigationId)}>
                  Members and invitations
                </LinkButton>
              ) : null}
            </p>
          </Section>
        ) : null}
      </RoomPage>
    </Frame>
  );
}
