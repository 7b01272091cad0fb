import type { ReactNode } from "react";
import { useSearchParams } from "react-router-dom";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { Tabs } from "../../../components/ui/tabs.tsx";
import { useSession } from "../../../lib/session-context.ts";
import { EventsTab } from "../components/events-tab.tsx";
import { PolicyTab } from "../components/policy-tab.tsx";

export type SafeguardRouteProps = {
  /** Parts that other pages show as well, handed in by the page that joins them: files taken out… */
  exports: ReactNode;
  /** … and who works here. */
  members: ReactNode;
};

/** Safeguard: who may see which field, who looked, what was taken out, and who works here. */
export function SafeguardRoute({ exports, members }: SafeguardRouteProps) {
  const tabs = [
    { id: "policy", label: "Field policy", content: <PolicyTab /> },
    { id: "events", label: "Access events", content: <EventsTab /> },
    { id: "exports", label: "Exports", content: exports },
    { id: "members", label: "Members", content: members },
  ];
  const { actingRole } = useSession();
  const [params, setParams] = useSearchParams();
  const asked = params.get("tab");
  const tab = tabs.some((one) => one.id === asked) ? (asked as string) : "policy";
  return (
    <RoomPage
      title="Safeguard"
      subLine="Who may see which field, who looked, what was taken out, who works here."
    >
      {actingRole === "officer" ? (
        <>
          <Tabs
            label="Parts of Safeguard"
            items={tabs}
            value={tab}
            onValueChange={(id) => setParams({ tab: id }, { replace: true })}
          />
          <Caution className="mt-6">
            A contact network identifies people even without names. People stand here by study
            number; reading this room is itself on record.
          </Caution>
        </>
      ) : (
        <ErrorState kind="no-permission" />
      )}
    </RoomPage>
  );
}
