import { loadavg } from "node:os";
import { setTimeout as sleep } from "node:timers/promises";
import pg from "pg";
import {
  benchOutbreak,
  makeAccounts,
  makeDatabase,
  signIn,
  storeOutbreak,
} from "./bench-database.ts";
import { type BenchServer, startServer, stopServer } from "./bench-server.ts";
import { type BenchClient, spread } from "./http-client.ts";
import { importFiles } from "./import-files.ts";
import { heldCases, submitInterview } from "./interviews.ts";
import { processorTime } from "./processor-time.ts";
import { residentMemory } from "./resident-memory.ts";

const SEED = 7;
/** People already on record in each of the two investigations. */
const BEFORE = 1000;
const INTERVIEW_EVERY_MS = 500;
const MOST_MS = 30 * 60_000;

const seconds = (ms: number) => Math.round(ms / 100) / 10;

/** What an import answers, as far as it is used here. */
interface Imported {
  id: string;
  state: string;
  problemCount: number;
  counts: Record<string, number>;
}

/** Processor time so far, s. */
type Processors = () => { server: number; database: number };

/** One file from upload to its end; where the time went, in seconds. */
async function bringIn(
  supervisor: BenchClient,
  base: string,
  kind: "people" | "pairs",
  csv: string,
  processors: Processors,
) {
  const before = processors();
  const started = performance.now();
  const staged = await supervisor.upload<Imported>(`${base}/imports`, { kind }, csv);
  const stagedAt = performance.now();
  await supervisor.call("POST", `${base}/imports/${staged.body.id}/commit`, {});
  for (;;) {
    const { body } = await supervisor.call<Imported>("GET", `${base}/imports/${staged.body.id}`);
    if (body.state === "committed") {
      const done = performance.now();
      const after = processors();
      return {
        rows: body.counts.rows,
        problems: body.problemCount,
        stagingS: seconds(stagedAt - started),
        commitS: seconds(done - stagedAt),
        totalS: seconds(done - started),
        // A loaded machine stretches the times above, not these.
        processorS: {
          server: Math.round(10 * (after.server - before.server)) / 10,
          database: Math.round(10 * (after.database - before.database)) / 10,
        },
      };
    }
    if (body.state !== "committing") throw new Error(`the import of ${kind} is ${body.state}`);
    if (performance.now() - started > MOST_MS) throw new Error("the import did not end in time");
    await sleep(250);
  }
}

/** A tracer who submits an interview every half second until told to stop. */
function interviewing(tracer: BenchClient, base: string, cases: readonly string[]) {
  const taken: number[] = [];
  let running = true;
  let mark = 0;
  const ended = (async () => {
    for (
      let round = 0;
      running && cases.length > 0 && round < MOST_MS / INTERVIEW_EVERY_MS;
      round++
    ) {
      const { ms } = await submitInterview(tracer, base, cases, round);
      taken.push(ms);
      await sleep(Math.max(0, INTERVIEW_EVERY_MS - ms));
    }
  })();
  return {
    /** The interviews since the last call. */
    take() {
      const part = taken.slice(mark);
      mark = taken.length;
      return spread(part);
    },
    async stop() {
      running = false;
      await ended;
    },
  };
}

/** Process id of a cluster's postmaster. */
async function databasePid(clusterUrl: string): Promise<number> {
  const client = new pg.Client({ connectionString: clusterUrl });
  await client.connect();
  const found = await client.query(
    "select split_part(pg_read_file('postmaster.pid'), E'\\n', 1)::int as pid",
  );
  await client.end();
  return found.rows[0].pid;
}

/** Waits until the groups show the graph's version; the graph in memory is then the record's. */
async function graphFollows(supervisor: BenchClient, base: string): Promise<number> {
  const started = performance.now();
  const { body: now } = await supervisor.call<{ graphVersion: number }>("GET", base);
  for (;;) {
    const groups = await supervisor.call<{ graphVersion: number }>(
      "GET",
      `${base}/groups?pageSize=10`,
    );
    if (groups.body.graphVersion >= now.graphVersion) return performance.now() - started;
    if (performance.now() - started > MOST_MS) throw new Error("the groups did not follow");
    await sleep(50);
  }
}

async function openInvestigation(server: BenchServer, name: string, base: string) {
  const tracer = await signIn(server.origin, name);
  return { tracer, base, cases: await heldCases(tracer, base) };
}

/**
 * Brings in a file of people and one of their contact pairs through the running server, while a
 * tracer of the same investigation and one of another submit interviews; then starts the server
 * anew on what is stored.
 *
 * @param clusterUrl superuser of a durable cluster
 * @param folder data folder for the secrets
 */
export async function measureImport(
  clusterUrl: string,
  folder: string,
  size: { people: number; pairs: number; interviews: boolean },
  nodeOptions: readonly string[] = [],
) {
  const database = await makeDatabase(clusterUrl, "bench_import", folder);
  const [here = "", there = "", leader = "", other = ""] = await makeAccounts(database, [
    "here",
    "there",
    "supervisor",
    "other",
  ]);
  const store = (name: string, seed: number, tracer: string, supervisor: string) =>
    storeOutbreak(database, name, benchOutbreak(seed, BEFORE), { tracer, supervisor });
  const base = `/api/investigations/${await store("Here", SEED + 1, here, leader)}`;
  const away = `/api/investigations/${await store("There", SEED + 2, there, other)}`;
  await database.client.query("analyze");
  await database.client.end();
  // Some more than wanted, since the generator lands within a few per cent.
  const files = importFiles(
    benchOutbreak(SEED, Math.round(size.people * 1.03)),
    size.people,
    size.pairs,
  );
  const load = [loadavg()[0]];

  let server = await startServer(database.url, folder, nodeOptions);
  try {
    const pid = server.child.pid as number;
    const supervisor = await signIn(server.origin, "supervisor");
    await supervisor.call("GET", `${base}/network/summary`);
    const memoryIdle = residentMemory(pid).now;
    const mine = await openInvestigation(server, "here", base);
    const theirs = await openInvestigation(server, "there", away);
    const postmaster = await databasePid(clusterUrl);
    const processors = () => ({ server: processorTime(pid), database: processorTime(postmaster) });
    const begin = size.interviews ? interviewing : () => interviewing(mine.tracer, mine.base, []);
    const same = begin(mine.tracer, mine.base, mine.cases);
    const apart = begin(theirs.tracer, theirs.base, theirs.cases);
    await sleep(5_000);
    const before = { same: same.take(), other: apart.take() };
    const people = await bringIn(supervisor, base, "people", files.people, processors);
    const duringPeople = { same: same.take(), other: apart.take() };
    const pairs = await bringIn(supervisor, base, "pairs", files.pairs, processors);
    const duringPairs = { same: same.take(), other: apart.take() };
    const groupsFollowS = seconds(await graphFollows(supervisor, base));
    await supervisor.call("GET", `${base}/network/summary`);
    const after = { same: same.take(), other: apart.take() };
    await Promise.all([same.stop(), apart.stop()]);
    const memory = residentMemory(pid);
    load.push(loadavg()[0]);
    await stopServer(server);

    server = await startServer(database.url, folder);
    const again = await signIn(server.origin, "supervisor");
    const cold = await again.call("GET", `${base}/network/summary`);
    return {
      node: process.version,
      load: load.map((one) => Math.round((one ?? 0) * 100) / 100),
      fileMb: [files.people, files.pairs].map((text) => Math.round(text.length / 1e5) / 10),
      people,
      pairs,
      togetherS: Math.round((people.totalS + pairs.totalS) * 10) / 10,
      interviewMs: { before, duringPeople, duringPairs, after },
      groupsFollowS,
      serverMb: { idle: memoryIdle, most: memory.most, afterwards: memory.now },
      again: {
        readyMs: server.readyMs,
        firstSummaryMs: Math.round(cold.ms),
        serverMb: residentMemory(server.child.pid as number).now,
      },
    };
  } finally {
    await stopServer(server);
  }
}
