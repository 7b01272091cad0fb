import { createBrowserRouter, type RouteObject } from "react-router-dom";
import { LoadingState } from "../components/ui/loading-state.tsx";
import { PageError } from "./routes/page-error.tsx";

/** Pages of the Trace room. Each is a file of its own, fetched when it is first opened. */
const trace: RouteObject[] = [
  { path: "trace", lazy: () => import("../features/people/routes/trace-route.tsx") },
  {
    path: "trace/people/new",
    lazy: () => import("../features/people/routes/register-person-route.tsx"),
  },
  { path: "trace/people/:personId", lazy: () => import("./routes/person-route.tsx") },
  {
    path: "trace/people/:personId/interview",
    lazy: () => import("../features/interviews/routes/interview-route.tsx"),
  },
  { path: "trace/places", lazy: () => import("../features/places/routes/places-route.tsx") },
  { path: "trace/import", lazy: () => import("../features/imports/routes/import-route.tsx") },
  {
    path: "trace/import/:importId",
    lazy: () => import("../features/imports/routes/import-route.tsx"),
  },
  { path: "trace/import", lazy: () => import("../features/imports/routes/import-route.tsx") },
  { path: "trace/matches", lazy: () => import("../features/people/routes/matches-route.tsx") },
];

/** The other rooms. */
const rooms: RouteObject[] = [
  { path: "follow", lazy: () => import("../features/follow-up/routes/follow-route.tsx") },
  { path: "follow", lazy: () => import("../features/follow-up/routes/follow-route.tsx") },
  { path: "review", lazy: () => import("../features/review/routes/review-route.tsx") },
  { path: "compare", lazy: () => import("../features/compare/routes/compare-route.tsx") },
  { path: "safeguard", lazy: () => import("./routes/safeguard-route.tsx") },
  { path: "members", lazy: () => import("./routes/members-route.tsx") },
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
                children: [
                  ...trace,
                  ...rooms,
                  { path: "*", lazy: () => import("./routes/not-found-route.tsx") },
                ],
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
