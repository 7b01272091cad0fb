import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, expect, test } from "vitest";
import { CLASSIFICATIONS } from "../../../shared/vocabulary.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { StoredGraph } from "../../support/stored-graph.ts";

const PEOPLE = 14;
const STEPS = 60;

let app: TestApp;
let client: pg.Client;

beforeAll(async () => {
  app = await startTestApp();
  client = new pg.Client({ connectionString: app.adminUrl });
  client.on("error", () => {});
  await client.connect();
});

afterAll(async () => {
  await client?.end();
  await app?.close();
});

/** Whole numbers below `n`, the same for the same seed (mulberry32, public domain). */
function dice(seed: number) {
  let state = seed >>> 0;
  return (n: number): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) % n;
  };
}

/** What is stored beside what the definition says, for people on whom the two differ. */
async function differences(investigationId: string) {
  const found = await client.query(
    `with here as (select id from core.person where investigation_id = $1),
     said as (
       select d.person_id, d.day_zero,
         (p.classification is null or p.classification = 'contact') and not exists (
           select 1 from core.follow_end e
           where e.person_id = p.id and e.withdrawn_at is null) as open,
         exists (select 1 from core.follow_check y
           where y.person_id = p.id and y.symptoms = 'yes' and y.withdrawn_at is null
             and not exists (select 1 from core.follow_check n where n.person_id = p.id
               and n.symptoms = 'no' and n.day > y.day and n.withdrawn_at is null)) as symptomatic
       from core.day_zero_of(array(select id from here)) d
       join core.person p on p.id = d.person_id),
     kept as (
       select person_id, day_zero, open, symptomatic from core.follow_up
       where investigation_id = $1)
     (select 'said' as side, * from said except select 'said', * from kept)
     union all (select 'kept', * from kept except select 'kept', * from said)`,
    [investigationId],
  );
  return found.rows;
}

/** Words of who stands together must not depend on the order in which things were written. */
async function togetherDiffers(investigationId: string) {
  const read = async () =>
    (
      await client.query(
        "select person_id, together from core.follow_up where investigation_id = $1 order by 1",
        [investigationId],
      )
    ).rows;
  const kept = await read();
  await client.query(
    "select core.refresh_together(array(select person_id from core.follow_up where investigation_id = $1))",
    [investigationId],
  );
  expect(kept).toEqual(await read());
}

test.each([1, 2, 3, 4, 5, 6])(
  "whatever happens, the stored day 0 is the derived one (seed %i)",
  async (seed) => {
    const graph = await StoredGraph.make(app.adminUrl);
    const roll = dice(seed);
    const pick = <T>(list: readonly T[]): T => list[roll(list.length)] as T;
    const day = () => `2026-03-${String(1 + roll(28)).padStart(2, "0")}`;
    const classes = [null, ...CLASSIFICATIONS];
    const homes: string[] = [];
    for (let number = 901; number < 904; number += 1) {
      const id = randomUUID();
      homes.push(id);
      await client.query(
        "insert into core.place (id, investigation_id, number, setting) values ($1, $2, $3, 'household')",
        [id, graph.id, number],
      );
    }
    const people = await graph.people(
      Array.from({ length: PEOPLE }, () => ({ classification: pick(classes) })),
    );
    const one = () => pick(people);
    /** Changes a random part of the rows of a table, as a bulk statement would. */
    const some = (table: string, set: string) =>
      client.query(
        `update core.${table} t set ${set} where investigation_id = $1
         and abs(hashtext(t.id::text || $2)) % 4 = 0`,
        [graph.id, String(roll(1000))],
      );
    const steps: (() => Promise<unknown>)[] = [
      // Several tellings in one statement, as an interview or a file makes them.
      () => tell(1 + roll(5)),
      () => tell(1),
      () => tell(12),
      () => some("exposure", "withdrawn_at = now()"),
      () => some("exposure", "withdrawn_at = null"),
      () => some("exposure", `last_exposure = '${pick([day(), day(), "2026-03", "unknown"])}'`),
      () => some("exposure", "named_by = null"),
      () => some("contact_pair", "withdrawn_at = now()"),
      () => some("contact_pair", "withdrawn_at = null"),
      () => some("person", "withdrawn_at = now()"),
      () => some("person", "withdrawn_at = null"),
      () => some("person", `classification = '${pick(CLASSIFICATIONS)}'`),
      () => some("person", "classification = null"),
      () => some("person", "became_case = not became_case"),
      () => some("person", `household_id = '${pick(homes)}'`),
      () =>
        client.query(
          `insert into core.classification (id, investigation_id, person_id, classification,
           case_definition_version) values (gen_random_uuid(), $1, $2, 'contact', 1)`,
          [graph.id, one()],
        ),
      () =>
        client.query(
          `insert into core.follow_check (id, investigation_id, person_id, day, outcome, symptoms)
         values (gen_random_uuid(), $1, $2, $3, 'seen', $4)`,
          [graph.id, one(), day(), pick(["yes", "no", null])],
        ),
      () => some("follow_check", "withdrawn_at = now()"),
      () =>
        client.query(
          `insert into core.follow_end (id, investigation_id, person_id, reason, day)
         values (gen_random_uuid(), $1, $2, 'moved', $3) on conflict do nothing`,
          [graph.id, one(), day()],
        ),
      () => some("follow_end", "withdrawn_at = now()"),
      () =>
        client.query(
          `insert into identity.search_token (person_id, investigation_id, kind, token)
         values ($1, $2, 1, decode($3, 'hex')) on conflict do nothing`,
          [one(), graph.id, pick(["aa", "bb", "cc"])],
        ),
      () =>
        client.query("delete from identity.search_token where person_id = $1 and kind = 1", [
          one(),
        ]),
      async () => {
        people.push(...(await graph.people([{ classification: pick(classes) }])));
      },
    ];
    async function tell(count: number) {
      const rows = Array.from({ length: count }, () => {
        const a = one();
        const b = pick(people.filter((id) => id !== a));
        return {
          a,
          b,
          namedBy: pick([a, a, b, null]),
          last: pick([day(), day(), day(), "2026-03", null]),
        };
      });
      await graph.tellings(rows);
    }
    await tell(20);
    for (let step = 0; step < STEPS; step += 1) {
      const at = roll(steps.length);
      await steps[at]?.();
      expect(await differences(graph.id), `step ${step}, kind ${at}`).toEqual([]);
    }
    await togetherDiffers(graph.id);
    await graph.close();
  },
);

test("nobody but the triggers derives: the logins may call none of it", async () => {
  const found = await client.query<{ name: string; login: string }>(
    `select p.oid::regprocedure::text as name, l.rolname as login
     from pg_proc p cross join pg_roles l
     where p.proname in ('refresh_follow_up', 'refresh_together', 'day_zero_of')
       and l.rolname like 'strandline\\_%' and l.rolname not in ('strandline_owner', 'strandline_admin')
       and has_function_privilege(l.oid, p.oid, 'execute')`,
  );
  expect(found.rows).toEqual([]);
});
