import { RoomPage } from "../../components/layouts/room-page.tsx";
import { MembersTab } from "../../features/investigations/components/members-tab.tsx";

/** Who works on the investigation: for supervisors, whose rooms hold no other way to it. */
export function Component() {
  return (
    <RoomPage title="Members" subLine="Who works here, in which role, and who is invited.">
      <MembersTab />
    </RoomPage>
  );
}
