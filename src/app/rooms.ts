import type { Session } from "../../shared/contracts/session.ts";
import { type Duty, HOME_ROOM, hasDuty, ROOMS, ROOMS_OF, type Room } from "../../shared/roles.ts";
import type { Room as RoomLink } from "../components/layouts/app-frame.tsx";
import { paths, roomPath } from "./paths.ts";

const names: Record<Room, string> = {
  trace: "Trace",
  follow: "Follow",
  review: "Review",
  compare: "Compare",
  safeguard: "Safeguard",
};

/** The rooms of the acting role, each with the digit that it has for everybody. */
export function roomLinks(session: Session): RoomLink[] {
  const { actingRole, investigationId } = session;
  if (!actingRole || !investigationId) return [];
  return ROOMS_OF[actingRole].map((room) => ({
    id: room,
    label: names[room],
    to: roomPath(investigationId, room),
    digit: ROOMS.indexOf(room) + 1,
  }));
}

/** Where the session's acting role starts; the list of investigations when it acts in none. */
export function homePath(session: Session): string {
  const home = session.actingRole && HOME_ROOM[session.actingRole];
  return home && session.investigationId
    ? roomPath(session.investigationId, home)
    : paths.investigations;
}

/** Pages of a room that ask for a duty of the role. */
const duties: readonly (readonly [(investigationId: string) => string, Duty])[] = [
  [paths.newPerson, "register"],
  [paths.imports, "importFiles"],
  [paths.exports, "exportFiles"],
  [paths.matches, "reviewMatches"],
  [paths.members, "manageMembers"],
];

/** Whether the acting role ever has a page; an address that is no room's is left to the router. */
export function mayOpen(session: Session, pathname: string): boolean {
  const { actingRole, investigationId } = session;
  if (!actingRole || !investigationId) return false;
  const duty = duties.find(([path]) => path(investigationId) === pathname);
  if (duty && !hasDuty(actingRole, duty[1])) return false;
  const room = ROOMS.find((one) => {
    const start = roomPath(investigationId, one);
    return pathname === start || pathname.startsWith(`${start}/`);
  });
  return room === undefined || ROOMS_OF[actingRole].includes(room);
}
