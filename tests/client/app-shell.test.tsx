import { QueryClient } from "@tanstack/react-query";
import { describe, expect, it } from "vitest";
import { TOPICS } from "../../shared/events.ts";
import { HOME_ROOM, ROLES, ROOMS, ROOMS_OF } from "../../shared/roles.ts";
import { invalidateTopic, STALE_BY_TOPIC } from "../../src/app/live.ts";
import { paths, roomPath } from "../../src/app/paths.ts";
import { homePath, mayOpen, roomLinks } from "../../src/app/rooms.ts";
import { investigationKey, type QueryWord } from "../../src/lib/query-keys.ts";
import { investigationId, personId, sessionOf } from "./support/trace-desk.tsx";

describe("rooms of a role", () => {
  it("are those of the table, each with the same digit for everybody", () => {
    for (const role of ROLES) {
      const links = roomLinks(sessionOf(role));
      expect(links.map((link) => link.id)).toEqual(ROOMS_OF[role]);
      for (const link of links) {
        expect(link.digit).toBe(ROOMS.indexOf(link.id as (typeof ROOMS)[number]) + 1);
      }
      expect(homePath(sessionOf(role))).toBe(roomPath(investigationId, HOME_ROOM[role]));
    }
  });

  it("lead nowhere but to the list of investigations without a role", () => {
    const nobody = { ...sessionOf("tracer"), actingRole: null, investigationId: null };
    expect(roomLinks(nobody)).toEqual([]);
    expect(homePath(nobody)).toBe("/investigations");
    expect(mayOpen(nobody, paths.trace(investigationId))).toBe(false);
  });
});

describe("pages of a role", () => {
  const may = (role: (typeof ROLES)[number], path: string) => mayOpen(sessionOf(role), path);

  it("follow its rooms, with all that lies in them", () => {
    for (const role of ROLES) {
      for (const room of ROOMS) {
        const open = ROOMS_OF[role].includes(room);
        expect(may(role, roomPath(investigationId, room)), `${role} ${room}`).toBe(open);
        expect(may(role, `${roomPath(investigationId, room)}/x`), `${role} ${room}`).toBe(open);
      }
      expect(may(role, paths.person(investigationId, personId))).toBe(true);
    }
  });

  it("ask for its duties", () => {
    expect(ROLES.filter((role) => may(role, paths.newPerson(investigationId)))).toEqual([
      "tracer",
      "supervisor",
    ]);
    expect(ROLES.filter((role) => may(role, paths.imports(investigationId)))).toEqual([
      "supervisor",
      "officer",
    ]);
    expect(ROLES.filter((role) => may(role, paths.matches(investigationId)))).toEqual([
      "supervisor",
    ]);
  });

  it("leave an unknown address to the router, and do not mistake one room for another", () => {
    expect(may("tracer", `/i/${investigationId}/nowhere`)).toBe(true);
    expect(may("tracer", `/i/${investigationId}/reviews`)).toBe(true);
  });
});

describe("live messages", () => {
  const staleAfter = (topics: (typeof TOPICS)[number][], words: QueryWord[]) => {
    const queryClient = new QueryClient();
    const keys = words.map((word) => investigationKey(investigationId, word, "x"));
    const other = investigationKey("another", "people", "x");
    for (const key of [...keys, other]) queryClient.setQueryData(key, 1);
    invalidateTopic(queryClient, investigationId, topics);
    const stale = words.filter(
      (_word, index) => queryClient.getQueryState(keys[index] ?? [])?.isInvalidated,
    );
    expect(queryClient.getQueryState(other)?.isInvalidated).toBe(false);
    return stale;
  };
  const words: QueryWord[] = [
    "groups",
    "network",
    "clusters",
    "people",
    "imports",
    "members",
    "field-policy",
  ];

  it("have an entry for every topic of the server", () => {
    expect(Object.keys(STALE_BY_TOPIC).sort()).toEqual([...TOPICS].sort());
  });

  it("make stale what they touch, in their investigation only", () => {
    expect(staleAfter(["graph"], words)).toEqual(["groups", "network", "clusters"]);
    expect(staleAfter(["people"], words)).toEqual(["clusters", "people"]);
    expect(staleAfter(["members", "graph"], words)).toEqual([
      "groups",
      "network",
      "clusters",
      "people",
      "members",
    ]);
  });
});
