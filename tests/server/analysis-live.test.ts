import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, inject, it } from "vitest";
import { type Analysis, createAnalysis } from "../../server/analysis/analysis.ts";
import { createPools, endPools, loginUrl, type Pools } from "../../server/db/pools.ts";
import { type Dispatcher, startDispatcher } from "../../server/events/dispatcher.ts";
import { createLiveHub, type LiveHub, type LiveMessage } from "../../server/events/live-hub.ts";
import { createTestDatabase, TEST_PASSWORDS, type TestDatabase } from "../support/database.ts";
import { StoredGraph } from "../support/stored-graph.ts";

let database: TestDatabase;
let pools: Pools;
let analysis: Analysis;
let hub: LiveHub;
let dispatcher: Dispatcher;
const log = { error: () => {}, warn: () => {} };

async function startAgain(): Promise<void> {
  const systemUrl = loginUrl(database.adminUrl, "system", TEST_PASSWORDS.system);
  analysis = createAnalysis({ pools, log });
  hub = createLiveHub();
  dispatcher = await startDispatcher({ pools, systemUrl, analysis, hub, log });
}

beforeAll(async () => {
  database = await createTestDatabase(inject("adminUrl"));
  pools = createPools(database.adminUrl, TEST_PASSWORDS, () => {});
  await startAgain();
});

afterAll(async () => {
  await dispatcher.stop();
  await analysis.stop();
  await endPools(pools);
  await database.drop();
});

async function shapes(graph: StoredGraph) {
  const found = await analysis.groups(graph.id);
  return (found?.groups ?? []).map(({ id, size, cases, contacts, past }) => ({
    id,
    size,
    cases,
    contacts,
    grown: size - past,
  }));
}

/** Waits, within two seconds, until something holds. */
async function until(holds: () => boolean): Promise<void> {
  for (let turn = 0; turn < 200 && !holds(); turn++) {
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
  expect(holds()).toBe(true);
}

const EARLY = "2026-01-01T00:00:00Z";

/** A case with contacts, entered as one interview. */
async function interviewed(graph: StoredGraph, contacts: number, recordedAt?: string) {
  const [index = "", ...others] = await graph.people([
    { classification: "confirmed", recordedAt },
    ...Array.from({ length: contacts }, () => ({ classification: "contact", recordedAt })),
  ]);
  await graph.interview(index, "complete", recordedAt);
  await graph.tellings(others.map((b) => ({ a: index, b, namedBy: index, recordedAt })));
  const version = await graph.changed(
    { kind: "interview", a: index },
    ...others.map((b) => ({ kind: "person", a: b })),
    ...others.map((b) => ({ kind: "pair", a: index, b })),
  );
  return { index, others, version };
}

describe("live groups", () => {
  it("follows interviews, merges, classification and withdrawal without reading the graph anew", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    const first = await interviewed(graph, 3, EARLY);
    const alone = await shapes(graph);
    expect(alone).toMatchObject([{ size: 4, cases: 1, contacts: 3, grown: 0 }]);
    const idOfSmaller = alone[0]?.id;
    expect([first.index, ...first.others]).toContain(idOfSmaller);
    const second = await interviewed(graph, 12);
    await until(() => analysis.version(graph.id) === second.version);
    expect(await shapes(graph)).toEqual([
      { id: expect.any(String), size: 13, cases: 1, contacts: 12, grown: 13 },
      { id: idOfSmaller, size: 4, cases: 1, contacts: 3, grown: 0 },
    ]);
    const idOfLarger = (await shapes(graph))[0]?.id;

    // A pair across joins them: the larger part keeps its id.
    const bridge = { a: first.index, b: second.index };
    await graph.tellings([{ ...bridge, namedBy: first.index }]);
    let version = await graph.changed({ kind: "pair", ...bridge });
    await until(() => analysis.version(graph.id) === version);
    expect(await shapes(graph)).toEqual([
      { id: idOfLarger, size: 17, cases: 2, contacts: 15, grown: 13 },
    ]);

    const [contact = ""] = second.others;
    await graph.classify(contact, "confirmed", new Date().toISOString());
    version = await graph.changed({ kind: "classification", a: contact });
    await until(() => analysis.version(graph.id) === version);
    expect(await shapes(graph)).toMatchObject([{ size: 17, cases: 3, contacts: 14 }]);

    // Withdrawing the bridge takes them apart again.
    await graph.withdraw(bridge.a, bridge.b);
    version = await graph.changed({ kind: "withdrawn", ...bridge });
    await until(() => analysis.version(graph.id) === version);
    expect(await shapes(graph)).toMatchObject([
      { id: idOfLarger, size: 13, cases: 2, contacts: 11, grown: 13 },
      { id: idOfSmaller, size: 4, cases: 1, contacts: 3, grown: 0 },
    ]);

    // A withdrawn person leaves the group and takes its pairs along.
    await graph.client.query("update core.person set withdrawn_at = now() where id = $1", [
      first.index,
    ]);
    version = await graph.changed({ kind: "withdrawn", a: first.index });
    await until(() => analysis.version(graph.id) === version);
    expect(await shapes(graph)).toMatchObject([{ size: 13 }]);
    await graph.close();
  });

  it("gives the same groups, ids and growth after a restart", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    const made: { index: string }[] = [];
    for (let turn = 0; turn < 6; turn++) made.push(await interviewed(graph, 2 + turn));
    const joins = [0, 2, 3].map((k) => ({ a: made[k]?.index ?? "", b: made[k + 1]?.index ?? "" }));
    for (const join of joins) {
      await graph.tellings([join]);
      await graph.changed({ kind: "pair", ...join });
      await shapes(graph);
      await analysis.follow(graph.id);
    }
    const before = await shapes(graph);
    expect(before.map(({ size }) => size)).toEqual([18, 8, 7]);
    await dispatcher.stop();
    await analysis.stop();
    await startAgain();
    expect(await shapes(graph)).toEqual(before);
    await graph.close();
  });

  it("agrees with a whole reading after many random steps", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    const ids = await graph.people(Array.from({ length: 60 }, () => ({ recordedAt: EARLY })));
    await graph.changed({ kind: "bulk" });
    await analysis.groups(graph.id);
    let state = 7;
    const next = (below: number) => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      return Math.floor((state / 4294967296) * below);
    };
    const standing: { a: string; b: string }[] = [];
    for (let turn = 0; turn < 120; turn++) {
      if (turn % 3 === 2 && standing.length > 0) {
        const [pair] = standing.splice(next(standing.length), 1);
        if (!pair) continue;
        await graph.withdraw(pair.a, pair.b);
        await graph.changed({ kind: "withdrawn", ...pair });
      } else {
        const [a = "", b = ""] = [ids[next(60)], ids[next(60)]];
        const known = standing.some((p) => [p.a, p.b].includes(a) && [p.a, p.b].includes(b));
        if (a === b || known) continue;
        await graph.tellings([{ a, b }]);
        await graph.changed({ kind: "exposure", a, b });
        standing.push({ a, b });
      }
      await analysis.follow(graph.id);
    }
    const whole = createAnalysis({ pools, log });
    const sizes = async (from: Analysis) =>
      (await from.groups(graph.id))?.groups.map(({ size, past }) => [size, past]).sort();
    expect(await sizes(analysis)).toEqual(await sizes(whole));
    const distinct = new Set((await shapes(graph)).map(({ id }) => id));
    expect(distinct.size).toBe((await shapes(graph)).length);
    await whole.stop();
    await graph.close();
  });
});

describe("dispatcher", () => {
  it("tells the streams of an investigation after its graph has followed", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    await graph.changed({ kind: "bulk" });
    await analysis.groups(graph.id);
    const heard: [LiveMessage, number | null][] = [];
    const leave = hub.subscribe(graph.id, {
      tell: (message) => heard.push([message, analysis.version(graph.id)]),
      end: () => {},
    });
    const { version } = await interviewed(graph, 2);
    await until(() => heard.some(([message]) => message.version === version));
    const mine = heard.find(([message]) => message.version === version);
    expect(mine).toEqual([{ topic: "graph", id: null, version }, version]);
    leave();
    await until(() => true);
    const { rows } = await graph.client.query(
      "select count(*)::int as n from core.outbox where done_at is null and investigation_id = $1",
      [graph.id],
    );
    expect(rows[0].n).toBe(0);
    await graph.close();
  });

  it("hears changes after its connection was cut, and those made meanwhile", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    await graph.changed({ kind: "bulk" });
    await analysis.groups(graph.id);
    await graph.client.query(
      `select pg_terminate_backend(pid) from pg_stat_activity
       where query ilike 'listen %' and datname = current_database()`,
    );
    const { version } = await interviewed(graph, 2);
    await until(() => analysis.version(graph.id) === version);
    const again = await interviewed(graph, 1);
    await until(() => analysis.version(graph.id) === again.version);
    await graph.close();
  });

  it("answers null for an investigation that is not there", async () => {
    expect(await analysis.groups(randomUUID())).toBeNull();
  });
});
