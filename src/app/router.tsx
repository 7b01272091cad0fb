import { createBrowserRouter, type RouteObject } from "react-router-dom";
import { LoadingState } from "../components/ui/loading-state.tsx";
import { pages } from "./pages.ts";
import { NoSuchPage, PageError } from "./routes/page-error.tsx";

/** Pages of the Trace room. */
const trace: RouteObject[] = [
  { path: "trace", lazy: pages.trace },
  { path: "trace/people/new", lazy: pages.register },
  { path: "trace/people/:personId", lazy: pages.person },
  { path: "trace/people/:personId/interview", lazy: pages.interview },
  { path: "trace/places", lazy: pages.places },
  { path: "trace/import", lazy: pages.imports },
  { path: "trace/import/:importId", lazy: pages.imports },
  { path: "trace/export", lazy: pages.exports },
  { path: "trace/matches", lazy: pages.matches },
];

/** The other rooms. */
const rooms: RouteObject[] = [
  { path: "follow", lazy: pages.follow },
  { path: "review", lazy: pages.review },
  { path: "compare", lazy: pages.compare },
  { path: "compare/runs/:runId", lazy: pages.compareRun },
  { path: "safeguard", lazy: pages.safeguard },
  { path: "settings", lazy: pages.settings },
  { path: "members", lazy: pages.members },
];

const routes: RouteObject[] = [
  {
    errorElement: <PageError />,
    hydrateFallbackElement: (
      <main className="mx-auto max-w-2xl px-5 pt-[9vh]">
        <LoadingState label="Opening Strandline" />
      </main>
    ),
    children: [
      { path: "/sign-in", lazy: () => import("../features/session/routes/sign-in-route.tsx") },
      {
        path: "/first-officer",
        lazy: () => import("../features/session/routes/first-officer-route.tsx"),
      },
      {
        path: "/invitation",
        lazy: () => import("../features/session/routes/invitation-route.tsx"),
      },
      {
        path: "/forgotten-password",
        lazy: () => import("../features/session/routes/forgotten-password-route.tsx"),
      },
      {
        path: "/new-password",
        lazy: () => import("../features/session/routes/new-password-route.tsx"),
      },
      { path: "/inbox", lazy: () => import("../features/session/routes/inbox-route.tsx") },
      {
        lazy: () => import("./routes/signed-in-layout.tsx"),
        children: [
          { index: true, lazy: () => import("./routes/home-route.tsx") },
          { path: "acting", lazy: () => import("./routes/acting-route.tsx") },
          { path: "password", lazy: () => import("./routes/password-route.tsx") },
          { path: "investigations", lazy: () => import("./routes/investigations-route.tsx") },
          {
            path: "i/:investigationId",
            lazy: () => import("./routes/investigation-layout.tsx"),
            children: [
              {
                errorElement: <PageError />,
                children: [...trace, ...rooms, { path: "*", element: <NoSuchPage /> }],
              },
            ],
          },
        ],
      },
      { path: "*", lazy: () => import("./routes/not-found-route.tsx") },
    ],
  },
];

/** The router of the client. */
export function createRouter() {
  return createBrowserRouter(routes);
}
