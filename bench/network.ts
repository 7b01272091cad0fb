import { randomBytes } from "node:crypto";
import { resolve } from "node:path";
import { monitorEventLoopDelay } from "node:perf_hooks";
import pg from "pg";
import { startCluster, stopCluster } from "../scripts/lib/postgres.mjs";
import { createAnalysis } from "../server/analysis/analysis.ts";
import { migrate } from "../server/db/migrate.ts";
import { createPools, endPools, loginUrl } from "../server/db/pools.ts";
import { LOGIN_NAMES, type LoginPasswords } from "../server/db/roles.ts";
import { startDispatcher } from "../server/events/dispatcher.ts";
import { createLiveHub } from "../server/events/live-hub.ts";
import { summaryQuery } from "../shared/contracts/network.ts";
import { storeInterview, storeNetwork } from "./support/stored-network.ts";

/**
 * Timings of the live graph and the network report on stored networks, as JSON: cold (nothing
 * loaded), current state after a change, ranges and as-of, and from the commit of a 12-contact
 * interview to its being readable in the groups. Sizes may be given as arguments.
 */
const SIZES = process.argv.length > 2 ? process.argv.slice(2).map(Number) : [1e3, 1e4, 1e5];
const RUNS = 20;
const FOLDER = resolve(import.meta.dirname, "../.test-data/postgres-bench");
const SETTINGS = {
  timeZone: "Pacific/Auckland",
  populationAtRisk: null,
  infectiousBefore: 2,
  infectiousAfter: 10,
};

const round = (ms: number) => Math.round(ms * 10) / 10;
function spread(values: number[]) {
  const sorted = [...values].sort((x, y) => x - y);
  const at = (share: number) => sorted[Math.ceil(share * sorted.length) - 1] ?? Number.NaN;
  return { medianMs: round(at(0.5)), p95Ms: round(at(0.95)), worstMs: round(at(1)) };
}

async function timed(work: () => Promise<unknown>): Promise<number> {
  const start = performance.now();
  await work();
  return performance.now() - start;
}

const secret = randomBytes(12).toString("hex");
const passwords = Object.fromEntries(LOGIN_NAMES.map((name) => [name, secret])) as LoginPasswords;
const log = { error: console.error, warn: console.error };

async function benchSize(adminUrl: string, people: number) {
  const client = new pg.Client({ connectionString: adminUrl });
  client.on("error", (error) => log.error(error.message));
  await client.connect();
  const id = await storeNetwork(client, people);
  const pools = createPools(adminUrl, passwords, (error) => log.error(error.message));
  const analysis = createAnalysis({ pools, log });
  const dispatcher = await startDispatcher({
    pools,
    systemUrl: loginUrl(adminUrl, "system", passwords.system),
    analysis,
    hub: createLiveHub(),
    log,
  });
  const ask = (query: Record<string, string>) =>
    timed(() => analysis.summary(id, summaryQuery.parse(query), SETTINGS));

  const cold = await ask({});
  const groups = await timed(() => analysis.groups(id));
  const delay = monitorEventLoopDelay({ resolution: 5 });
  delay.enable();
  const [follow, current, currentGroups, range, asOf, cases]: number[][] = [[], [], [], [], [], []];
  for (let run = 0; run < RUNS; run++) {
    const version = await storeInterview(client, id);
    const committed = performance.now();
    while ((analysis.version(id) ?? 0) < version) {
      await new Promise((done) => setImmediate(done));
    }
    currentGroups?.push(await timed(() => analysis.groups(id)));
    follow?.push(performance.now() - committed);
    current?.push(await ask({}));
    const back = new Date(Date.now() - (run + 1) * 86_400_000).toISOString().slice(0, 10);
    range?.push(await ask({ from: back }));
    asOf?.push(await ask({ asOf: back }));
    cases?.push(await ask({ asOf: back, population: "cases" }));
  }
  const picture = await timed(() => analysis.graph(id, summaryQuery.parse({}), SETTINGS));
  delay.disable();
  await dispatcher.stop();
  await analysis.stop();
  await endPools(pools);
  await client.end();
  return {
    people,
    coldMs: round(cold),
    firstGroupsMs: round(groups),
    interviewToGroups: spread(follow ?? []),
    groups: spread(currentGroups ?? []),
    current: spread(current ?? []),
    range: spread(range ?? []),
    asOf: spread(asOf ?? []),
    casesAsOf: spread(cases ?? []),
    pictureMs: round(picture),
    longestEventLoopDelayMs: round(delay.max / 1e6),
  };
}

const cluster = await startCluster(FOLDER, { throwAway: true });
try {
  await migrate(cluster.url, passwords);
  const results = [];
  for (const people of SIZES) results.push(await benchSize(cluster.url, people));
  process.stdout.write(`${JSON.stringify({ bench: "network", runs: RUNS, results }, null, 2)}\n`);
} finally {
  await stopCluster(FOLDER);
}
