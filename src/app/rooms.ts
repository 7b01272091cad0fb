import type { Session } from "../../shared/contracts/session.ts";
import { ROOMS, ROOMS_OF, type Room } from "../../shared/roles.ts";
import type { Room as RoomLink } from "../components/layouts/app-frame.tsx";
import { roomPath } from "./paths.ts";

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
  const home = session.rooms[0];
  return home && session.investigationId
    ? roomPath(session.investigationId, home)
    : "/investigations";
}
