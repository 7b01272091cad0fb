import type { Room } from "../../shared/roles.ts";

/** Addresses of the client. They hold ids and coded values only: never a name, never a search. */
export const paths = {
  signIn: "/sign-in",
  firstOfficer: "/first-officer",
  investigations: "/investigations",
  password: "/password",
  settings: (investigationId: string) => `/i/${investigationId}/settings`,
  members: (investigationId: string) => `/i/${investigationId}/members`,
  trace: (investigationId: string) => `/i/${investigationId}/trace`,
  newPerson: (investigationId: string) => `/i/${investigationId}/trace/people/new`,
  person: (investigationId: string, personId: string) =>
    `/i/${investigationId}/trace/people/${personId}`,
  interview: (investigationId: string, personId: string) =>
    `/i/${investigationId}/trace/people/${personId}/interview`,
  places: (investigationId: string) => `/i/${investigationId}/trace/places`,
  imports: (investigationId: string) => `/i/${investigationId}/trace/import`,
  oneImport: (investigationId: string, importId: string) =>
    `/i/${investigationId}/trace/import/${importId}`,
  exports: (investigationId: string) => `/i/${investigationId}/trace/export`,
  matches: (investigationId: string) => `/i/${investigationId}/trace/matches`,
  follow: (investigationId: string) => `/i/${investigationId}/follow`,
  review: (investigationId: string) => `/i/${investigationId}/review`,
  compare: (investigationId: string) => `/i/${investigationId}/compare`,
  compareRun: (investigationId: string, runId: string) =>
    `/i/${investigationId}/compare/runs/${runId}`,
  safeguard: (investigationId: string) => `/i/${investigationId}/safeguard`,
} as const;

/** Where a room opens. */
export function roomPath(investigationId: string, room: Room): string {
  return paths[room](investigationId);
}
