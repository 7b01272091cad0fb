import { liveRoutes } from "./events/routes.ts";
import { clusterRoutes } from "./features/clusters/routes.ts";
import { compareRoutes } from "./features/compare/routes.ts";
import { exportRoutes } from "./features/exports/routes.ts";
import { followUpRoutes } from "./features/follow-up/routes.ts";
import { groupRoutes } from "./features/groups/routes.ts";
import { importRoutes } from "./features/imports/routes.ts";
import { interviewRoutes } from "./features/interviews/routes.ts";
import { invitationRoutes } from "./features/investigations/invitations.ts";
import { memberRoutes } from "./features/investigations/members.ts";
import { investigationPlainRoutes, investigationRoutes } from "./features/investigations/routes.ts";
import { settingsRoutes } from "./features/investigations/settings-routes.ts";
import { teamRoutes } from "./features/investigations/teams.ts";
import { networkRoutes } from "./features/network/routes.ts";
import { peopleListRoutes } from "./features/people/list-routes.ts";
import { peopleRoutes } from "./features/people/routes.ts";
import { placeRoutes } from "./features/places/routes.ts";
import { safeguardRoutes } from "./features/safeguard/routes.ts";
import { sessionRoutes } from "./features/session/routes.ts";
import { testRoutes } from "./features/tests/routes.ts";
import type { AnyRoute, PlainRoute } from "./http/route.ts";
import type { Services } from "./services.ts";

/** Every route of an investigation; the one list that app, document and tests are made from. */
export const ROUTES: readonly AnyRoute[] = [
  ...investigationRoutes,
  ...settingsRoutes,
  ...memberRoutes,
  ...teamRoutes,
  ...invitationRoutes,
  ...peopleRoutes,
  ...peopleListRoutes,
  ...testRoutes,
  ...placeRoutes,
  ...interviewRoutes,
  ...followUpRoutes,
  ...importRoutes,
  ...exportRoutes,
  ...groupRoutes,
  ...clusterRoutes,
  ...networkRoutes,
  ...compareRoutes,
  ...safeguardRoutes,
];

/** Routes outside any investigation, and those that stream. */
export function plainRoutes(services: Services): PlainRoute[] {
  return [...sessionRoutes(services), ...investigationPlainRoutes(services), ...liveRoutes()];
}
