import { MembersTab } from "../../features/investigations/components/members-tab.tsx";
import { SafeguardRoute } from "../../features/safeguard/routes/safeguard-route.tsx";

/** Safeguard with the members, which the members page shows as well. */
export function Component() {
  return <SafeguardRoute members={<MembersTab />} />;
}
