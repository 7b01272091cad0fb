import type { Room } from "../../shared/roles.ts";

/** Pages inside an investigation, each a file of its own that is fetched when first opened. */
export const pages = {
  trace: () => import("../features/people/routes/trace-route.tsx"),
  register: () => import("../features/people/routes/register-person-route.tsx"),
  person: () => import("./routes/person-route.tsx"),
  interview: () => import("../features/interviews/routes/interview-route.tsx"),
  places: () => import("../features/places/routes/places-route.tsx"),
  imports: () => import("../features/imports/routes/import-route.tsx"),
  exports: () => import("./routes/exports-route.tsx"),
  matches: () => import("../features/people/routes/matches-route.tsx"),
  follow: () => import("../features/follow-up/routes/follow-route.tsx"),
  review: () => import("../features/review/routes/review-route.tsx"),
  compare: () => import("../features/compare/routes/compare-route.tsx"),
  compareRun: () => import("../features/compare/routes/compare-run-route.tsx"),
  safeguard: () => import("./routes/safeguard-route.tsx"),
  settings: () => import("../features/settings/routes/settings-route.tsx"),
  members: () => import("./routes/members-route.tsx"),
} as const;

/** What work away from a desk needs: these are also opened where there is no signal. */
const atTheDoorstep: Partial<Record<Room, readonly (keyof typeof pages)[]>> = {
  trace: ["trace", "person", "register", "interview"],
  follow: ["follow"],
};

/** Well after the first page has come, and after what its own dialogs fetch. */
const fetchAfterMs = 25_000;

/** Fetches the doorstep's pages ahead of need; returns the way to stop. */
export function fetchAhead(rooms: readonly Room[]): () => void {
  const timer = setTimeout(() => {
    for (const room of rooms) {
      for (const page of atTheDoorstep[room] ?? []) pages[page]().catch(() => {});
    }
  }, fetchAfterMs);
  return () => clearTimeout(timer);
}
