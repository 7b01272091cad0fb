import { sql } from "drizzle-orm";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, inject, it } from "vitest";
import { createPools, endPools, type Pools } from "../../server/db/pools.ts";
import { savepoint, TxLostError, withTx } from "../../server/db/with-tx.ts";
import { keepHouse } from "../../server/jobs/housekeeping.ts";
import { createTestDatabase, TEST_PASSWORDS, type TestDatabase } from "../support/database.ts";

let database: TestDatabase;
let pools: Pools;
let admin: pg.Client;

beforeAll(async () => {
  database = await createTestDatabase(inject("adminUrl"));
  pools = createPools(database.adminUrl, TEST_PASSWORDS, () => {});
  admin = new pg.Client({ connectionString: database.adminUrl });
  await admin.connect();
  await admin.query("create table public.kept (n integer primary key)");
  await admin.query("grant select, insert on public.kept to strandline_auth");
});
afterAll(async () => {
  await admin.end();
  await endPools(pools);
  await database.drop();
});

const auth = () => ({ pool: pools.auth, nonce: null });
const insert = (n: number) => sql`insert into public.kept (n) values (${n})`;
const kept = async () =>
  (await admin.query("select n from public.kept order by n")).rows.map((row) => row.n);

describe("withTx", () => {
  it("does not call a swallowed failure a success", async () => {
    const lost = withTx(auth(), async (tx) => {
      await tx.execute(insert(1));
      await tx.execute(insert(1)).catch(() => {});
      return "all is well";
    });
    await expect(lost).rejects.toBeInstanceOf(TxLostError);
    expect(await kept()).toEqual([]);
  });

  it("lets a part fail behind a savepoint and keeps the rest", async () => {
    await withTx(auth(), async (tx) => {
      await tx.execute(insert(2));
      const part = await savepoint(tx, () => tx.execute(insert(2)));
      expect(part.ok).toBe(false);
      await tx.execute(insert(3));
    });
    expect(await kept()).toEqual([2, 3]);
  });

  it("runs every statement on one backend", async () => {
    await withTx(auth(), async (tx) => {
      const pid = async () =>
        (await tx.execute<{ pid: number }>(sql`select pg_backend_pid() as pid`)).rows[0]?.pid;
      expect(new Set([await pid(), await pid(), await pid()]).size).toBe(1);
    });
  });

  it("gives a killed connection away and goes on serving", async () => {
    for (let round = 0; round < 12; round++) {
      const killed = withTx(auth(), async (tx) => {
        const found = await tx.execute<{ pid: number }>(sql`select pg_backend_pid() as pid`);
        await admin.query("select pg_terminate_backend($1)", [found.rows[0]?.pid]);
        await tx.execute(sql`select 1`);
      });
      await expect(killed).rejects.toThrow();
    }
    const alive = await withTx(auth(), (tx) => tx.execute<{ one: number }>(sql`select 1 as one`));
    expect(alive.rows).toEqual([{ one: 1 }]);
    expect(pools.auth.waitingCount).toBe(0);
  });

  it("survives beginnings that fail", async () => {
    const broken = { pool: pools.auth, nonce: "not a nonce" };
    for (let round = 0; round < 20; round++) {
      await expect(
        withTx(broken, (tx) => tx.execute(sql`select core.ctx_user()`)),
      ).rejects.toThrow();
    }
    expect((await withTx(auth(), (tx) => tx.execute(sql`select 1 as one`))).rows).toEqual([
      { one: 1 },
    ]);
  });

  it("gives instants as ISO strings and days as text", async () => {
    const { rows } = await withTx(auth(), (tx) =>
      tx.execute(
        sql`select timestamptz '2026-05-03 10:00:00.5+02' as at, date '2026-05-03' as day`,
      ),
    );
    expect(rows).toEqual([{ at: "2026-05-03T08:00:00.500Z", day: "2026-05-03" }]);
  });
});

describe("housekeeping", () => {
  it("deletes what has run out and nothing else", async () => {
    await admin.query(
      `insert into auth.session (sid, sess, expire) values ('old', '{}', now() - interval '1 minute'), ('live', '{}', now() + interval '1 hour')`,
    );
    await admin.query(
      `insert into auth.idempotency (account_id, key, route, request_hash, status, receipt, recorded_at)
       values (gen_random_uuid(), gen_random_uuid(), 'r', 'h', 201, '{}', now() - interval '25 hours'),
              (gen_random_uuid(), gen_random_uuid(), 'r', 'h', 201, '{}', now())`,
    );
    await admin.query(
      `insert into core.outbox (investigation_id, topic, done_at) values
         (gen_random_uuid(), 'graph', now() - interval '2 days'), (gen_random_uuid(), 'graph', null)`,
    );
    const warnings: unknown[] = [];
    await keepHouse(pools, { warn: (entry: unknown) => warnings.push(entry) } as never);
    const count = async (table: string) =>
      Number((await admin.query(`select count(*) from ${table}`)).rows[0].count);
    expect(warnings).toEqual([]);
    expect([
      await count("auth.session"),
      await count("auth.idempotency"),
      await count("core.outbox"),
    ]).toEqual([1, 1, 1]);
  });
});
