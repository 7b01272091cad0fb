import { RoomPage } from "../../components/layouts/room-page.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";
import { ExportsPanel } from "../../features/exports/components/exports-panel.tsx";
import { useInvestigation } from "../../lib/investigation-context.ts";
import { paths } from "../paths.ts";

/** Taking files out: beside the line list for those who have no Safeguard. */
export function Component() {
  const { id } = useInvestigation();
  return (
    <RoomPage
      title="Export"
      subLine="The line list or the contact pairs as a CSV file."
      actions={<LinkButton to={paths.trace(id)}>Trace</LinkButton>}
    >
      <ExportsPanel />
    </RoomPage>
  );
}
