/** The four roles of an investigation. A person may hold several and acts in exactly one. */
export const ROLES = ["tracer", "supervisor", "epidemiologist", "officer"] as const;
export type Role = (typeof ROLES)[number];

/** What each role is called on screen. */
export const ROLE_NAMES: Record<Role, string> = {
  tracer: "Contact tracer",
  supervisor: "Supervisor",
  epidemiologist: "Epidemiologist",
  officer: "Data officer",
};

/** Minutes without activity after which a session ends, by acting role. */
export const IDLE_MINUTES: Record<Role, number> = {
  tracer: 30,
  supervisor: 15,
  epidemiologist: 30,
  officer: 15,
};

/** Hours after sign-in when a session ends whatever happens. */
export const ABSOLUTE_HOURS = 12;

export const ROOMS = ["trace", "follow", "review", "compare", "safeguard"] as const;
export type Room = (typeof ROOMS)[number];

/** Rooms by role, in the order of the navigation; the first one named in `HOME_ROOM` opens at sign-in. */
export const ROOMS_OF: Record<Role, readonly Room[]> = {
  tracer: ["trace", "follow"],
  supervisor: ["trace", "follow", "review", "compare"],
  epidemiologist: ["trace", "review", "compare"],
  officer: ["trace", "safeguard"],
};

export const HOME_ROOM: Record<Role, Room> = {
  tracer: "trace",
  supervisor: "review",
  epidemiologist: "compare",
  officer: "safeguard",
};

/**
 * What a role may do that no single record's `can` could say. For offering a way in only: the
 * server's route policies and the database decide.
 */
export const DUTIES = {
  register: ["tracer", "supervisor"],
  recordPlace: ["tracer", "supervisor"],
  assign: ["supervisor"],
  reviewMatches: ["supervisor"],
  importFiles: ["supervisor", "officer"],
  exportFiles: ["supervisor", "epidemiologist", "officer"],
  changeSettings: ["supervisor", "officer"],
  manageMembers: ["supervisor", "officer"],
} as const satisfies Record<string, readonly Role[]>;
export type Duty = keyof typeof DUTIES;

/** Whether a role has a duty; false without a role. */
export function hasDuty(role: Role | null, duty: Duty): boolean {
  return role !== null && (DUTIES[duty] as readonly Role[]).includes(role);
}
