import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, expect, it } from "vitest";
import { byteas, integers, reals, smallints, texts, uuids } from "../../server/db/binary-arrays.ts";
import { nearIds } from "../../server/db/near-ids.ts";
import { startTestApp, type TestApp } from "../support/app.ts";

let app: TestApp;
let admin: pg.Client;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

it("brings every kind of array to the database as it was given", async () => {
  const id = randomUUID();
  const found = await admin.query(
    `select $1::uuid[] as ids, $2::text[] as texts, $3::bytea[] as bytes, $4::integer[] as whole,
       $5::smallint[] as small, $6::real[] as real`,
    [
      uuids([id, null, id.toUpperCase()]),
      texts(["", null, "NULL", 'a"b\\c,{}', "Añez 東 😀\n", undefined]),
      byteas([Buffer.from([0, 255, 92]), null, new Uint8Array([1])]),
      integers([-2_147_483_648, null, 2_147_483_647]),
      smallints([-3, 4]),
      reals([1.5, null, 0.1]),
    ],
  );
  expect(found.rows[0]).toEqual({
    ids: [id, null, id],
    texts: ["", null, "NULL", 'a"b\\c,{}', "Añez 東 😀\n", null],
    bytes: [Buffer.from([0, 255, 92]), null, Buffer.from([1])],
    whole: [-2_147_483_648, null, 2_147_483_647],
    small: [-3, 4],
    real: [1.5, null, 0.1],
  });
  const empty = await admin.query("select $1::uuid[] as ids, $2::text[] as texts", [
    uuids([]),
    texts([]),
  ]);
  expect(empty.rows[0]).toEqual({ ids: [], texts: [] });
  expect(() => uuids(["not an id"])).toThrow("not an id");
});

it("gives ids of one kind, side by side and in no order", async () => {
  const ids = nearIds(2_000);
  expect(new Set(ids).size).toBe(2_000);
  expect(new Set(ids.map((id) => id.slice(0, 13))).size).toBe(1);
  for (const id of ids) {
    expect(id).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
  }
  expect(ids).not.toEqual([...ids].sort());
  expect(nearIds(1)[0]?.slice(0, 13)).not.toBe(ids[0]?.slice(0, 13));
  const sorted = await admin.query(
    "select array_agg(u order by u)::text[] as ids from unnest($1::uuid[]) u",
    [uuids(ids)],
  );
  expect(sorted.rows[0].ids).toEqual([...ids].sort());
});
