import { lazy, Suspense } from "react";
import { LoadingState } from "../../components/ui/loading-state.tsx";
import { SafeguardRoute } from "../../features/safeguard/routes/safeguard-route.tsx";

// Its form and its question are fetched when the tab is opened.
const MembersTab = lazy(() =>
  import("../../features/investigations/components/members-tab.tsx").then((file) => ({
    default: file.MembersTab,
  })),
);

const ExportsPanel = lazy(() =>
  import("../../features/exports/components/exports-panel.tsx").then((file) => ({
    default: file.ExportsPanel,
  })),
);

const exports = (
  <Suspense fallback={<LoadingState label="Opening the exports" />}>
    <ExportsPanel />
  </Suspense>
);

const members = (
  <Suspense fallback={<LoadingState label="Opening the members" />}>
    <MembersTab />
  </Suspense>
);

/** Safeguard with the exports and the members, which pages of their own show as well. */
export function Component() {
  return <SafeguardRoute exports={exports} members={members} />;
}
