import type { Group } from "../../shared/contracts/network.ts";

/** Place of each group by size, 0 = largest; groups that are not listed are among "the rest". */
export type GroupPlaces = ReadonlyMap<string, number>;

/** Places by size, ties in the given order (that of the server, which does not change by itself). */
export function groupPlaces(groups: readonly Group[]): GroupPlaces {
  const ordered = [...groups].sort((one, other) => other.size - one.size);
  return new Map(ordered.map(({ id }, place) => [id, place]));
}

/** Place in the colour set, as a person mark takes it. */
export function groupColor(places: GroupPlaces, id: string): number | "rest" {
  return places.get(id) ?? "rest";
}

/**
 * What a group is called on screen: a short code that stays with it while others overtake it in
 * size. A group has no name of its own, and one taken from its people would tell who is in it.
 */
export function groupCode(id: string): string {
  const [, head = id, turn] = /^([0-9a-f]{5})[0-9a-f-]{31}(?:-(\d+))?$/i.exec(id) ?? [];
  return `G-${head.toUpperCase()}${turn === undefined ? "" : `-${turn}`}`;
}
