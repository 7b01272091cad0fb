import { sql } from "drizzle-orm";
import { afterAll, beforeAll, expect, test } from "vitest";
import { type Tx, withTx } from "../../../server/db/with-tx.ts";
import { sqlState } from "../../../server/http/translate-error.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let tracer: Member;
let stranger: Member;
let mine: string;
let theirs: string;

beforeAll(async () => {
  app = await startTestApp();
  const investigationId = await buildInvestigation(app);
  tracer = await signInAs(app, "tracer", investigationId);
  stranger = await signInAs(app, "tracer", investigationId);
  mine = await register(tracer);
  theirs = await register(stranger);
  await submit(stranger, theirs, { contacts: [contactRow({ lastExposure: "2024-01-05" })] });
});

afterAll(async () => {
  await app?.close();
});

/** Runs a statement as the tracer's own login, in the tracer's context; rolled back afterwards. */
async function asTracer(statement: ReturnType<typeof sql>): Promise<Record<string, unknown>[]> {
  const [live] = await asAdmin<{ nonce: string }>(
    app,
    "select nonce from auth.ctx_live where account_id = $1 order by expires_at desc limit 1",
    [tracer.accountId],
  );
  const undone = new Error("undone");
  let rows: Record<string, unknown>[] = [];
  const work = async (tx: Tx) => {
    rows = (await tx.execute(statement)).rows;
    throw undone;
  };
  await withTx({ pool: app.pools.tracer, nonce: live?.nonce ?? null }, work).catch((error) => {
    if (error !== undone) throw error;
  });
  return rows;
}

const stateOf = (statement: ReturnType<typeof sql>) =>
  asTracer(statement).then(
    () => null,
    (error: unknown) => sqlState(error),
  );

test("the tracer's login makes no pair with a person out of scope", async () => {
  expect(
    await stateOf(sql`select * from core.pairs_for(${mine}::uuid, array[${theirs}::uuid])`),
  ).toBe("42501");
  expect(
    await stateOf(sql`select * from core.pairs_for(${theirs}::uuid, array[${mine}::uuid])`),
  ).toBe("42501");
  const [low, high] = [mine, theirs].sort();
  expect(
    await stateOf(
      sql`insert into core.contact_pair (id, investigation_id, person_a, person_b)
          values (gen_random_uuid(), ${tracer.investigationId}, ${low}, ${high})`,
    ),
  ).toBe("42501");
  expect(
    await stateOf(sql`select * from core.pairs_for(${mine}::uuid, array[${mine}::uuid])`),
  ).toBe("23514");
});

test("it reads neither others' interviews and follow-up nor what happened to the whole graph", async () => {
  expect(await asTracer(sql`select id from core.interview`)).toEqual([]);
  expect(await asTracer(sql`select * from core.follow_up_days(null)`)).toEqual([]);
  expect(await stateOf(sql`select person_a from core.graph_change`)).toBe("42501");
  expect(await stateOf(sql`select * from core.match_review`)).toBe("42501");
  expect(await stateOf(sql`select * from identity.interview_draft`)).toBe("42501");
});

test("it changes no person out of scope, and asks no scope but its own", async () => {
  const change = (id: string) =>
    asTracer(sql`update core.person set interview_state = 'refused' where id = ${id} returning id`);
  expect(await change(theirs)).toEqual([]);
  expect(await change(mine)).toEqual([{ id: mine }]);
  const near = sql`select core.ctx_near(${stranger.accountId}::uuid, ${tracer.investigationId}::uuid, 'tracer', ${theirs}::uuid, false)`;
  expect(await stateOf(near)).toBe("42501");
  expect(await asTracer(sql`select core.ctx_may_name(${theirs}::uuid) as may`)).toEqual([
    { may: false },
  ]);
  expect(await asTracer(sql`select core.ctx_may_name(${mine}::uuid) as may`)).toEqual([
    { may: true },
  ]);
});

test("what one person may do agrees with the whole scope, for everyone on record", async () => {
  const contact = await register(stranger, { name: "Between Two", classification: "contact" });
  const supervisor = await signInAs(app, "supervisor", tracer.investigationId);
  for (const caseId of [mine, theirs]) {
    await submit(supervisor, caseId, { contacts: [contactRow({ personId: contact })] });
  }
  const people = await asAdmin<{ id: string }>(app, "select id from core.person");
  const named = await asTracer(sql`select unnest(core.ctx_named_people()) as id`);
  const scope = await asTracer(sql`select unnest(core.ctx_people()) as id`);
  expect(named.length).toBeGreaterThan(1);
  for (const { id } of people) {
    const [asked] = await asTracer(
      sql`select core.ctx_may_name(${id}::uuid) as named, core.ctx_can_link(${id}::uuid) as linked`,
    );
    expect(asked?.named).toBe(named.some((one) => one.id === id));
    // Everything this tracer recorded is in scope here, so both ways of asking agree.
    expect(asked?.linked).toBe(scope.some((one) => one.id === id));
  }
});
