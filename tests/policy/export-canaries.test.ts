import { afterAll, beforeAll, expect, test } from "vitest";
import { accessTo, openableKeys } from "../../shared/fields.ts";
import type { Role } from "../../shared/roles.ts";
import { fileOf, takeOut } from "../support/exports.ts";
import { hitsAtRest, postgresLogSize } from "./support/at-rest.ts";
import type { Hit } from "./support/markers.ts";
import { makeWorld, type World } from "./support/world.ts";

let world: World;
let logFrom: number;

beforeAll(async () => {
  logFrom = await postgresLogSize();
  world = await makeWorld();
});

afterAll(async () => {
  await world?.close();
});

/** May a file of this role hold this field? The registry says so; identity only when asked for. */
function allowed(role: Role, identified: boolean, { person, key }: Hit): boolean {
  if (person === "foreign" || key === "note") return false;
  if (key === "occupation") return accessTo("occupation", role) === "full";
  return identified && openableKeys(role).includes(key === "household" ? "name" : key);
}

const seenBy: Record<string, readonly string[]> = {
  "supervisor with": [
    "address",
    "birthDate",
    "email",
    "household",
    "name",
    "occupation",
    "phone",
    "ref",
  ],
  "supervisor without": ["occupation"],
  "epidemiologist without": ["occupation"],
  "officer with": ["ref"],
  "officer without": [],
};

test.each(Object.keys(seenBy))(
  "files of a %s identity hold what the registry allows",
  async (who) => {
    const [role, how] = who.split(" ") as [Role, string];
    const member = world.everyone[role];
    const identified = how === "with";
    const seen = new Set<string>();
    for (const kind of ["people", "pairs"]) {
      const one = await takeOut(member, { kind, identified });
      const text = await fileOf(member, one);
      for (const told of [text, JSON.stringify(one)]) {
        const hits = world.scan.hits(told);
        expect(
          hits.filter((hit) => !allowed(role, identified, hit)),
          kind,
        ).toEqual([]);
        for (const hit of hits) seen.add(hit.key);
      }
      // Relations and notes are in no file.
      expect(text).not.toContain("Zqlrelation");
    }
    expect([...seen].sort()).toEqual(seenBy[who]);
  },
);

test("nothing of a made file lies in plain in the database or in a log", async () => {
  expect(world.scan.hits(world.app.logs.join("\n"))).toEqual([]);
  expect(await hitsAtRest(world, logFrom)).toEqual([
    { where: "core.person", keys: ["occupation"] },
  ]);
});
