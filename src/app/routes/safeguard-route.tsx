import { lazy, Suspense } from "react";
import { LoadingState } from "../../components/ui/loading-state.tsx";
import { SafeguardRoute } from "../../features/safeguard/routes/safeguard-route.tsx";

// Its form and its question are fetched when the tab is opened.
const MembersTab = lazy(() =>
  import("../../features/investigations/components/members-tab.tsx").then((file) => ({
    default: file.MembersTab,
  })),
);

const members = (
  <Suspense fallback={<LoadingState label="Opening the members" />}>
    <MembersTab />
  </Suspense>
);

/** Safeguard with the members, which the members page shows as well. */
export function Component() {
  return <SafeguardRoute members={members} />;
}
