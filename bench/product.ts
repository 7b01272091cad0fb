import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync } from "node:fs";
import { join, resolve } from "node:path";
import { gzipSync } from "node:zlib";
import { startCluster, stopCluster } from "../scripts/lib/postgres.mjs";
import { shiftDay } from "../server/clock.ts";
import {
  benchOutbreak,
  HELD_CASES,
  LAST_DAY,
  makeAccounts,
  makeDatabase,
  signIn,
  storeOutbreak,
} from "./support/bench-database.ts";
import { startServer, stopServer } from "./support/bench-server.ts";
import { benchExports } from "./support/exports.ts";
import { benchFollowUp } from "./support/follow-up.ts";
import { spread } from "./support/http-client.ts";
import { heldCases, submitInterview } from "./support/interviews.ts";
import { benchLists } from "./support/lists.ts";
import { benchPreviews } from "./support/previews.ts";

// Fixed, so that two runs measure the same data.
const SEED = 7;
const ROOT = resolve(import.meta.dirname, "..");
const FOLDER = join(ROOT, ".test-data/bench");
const INTERVIEWS = HELD_CASES;
const ROLES = ["tracer", "supervisor", "epidemiologist", "officer"] as const;

interface Prepared {
  databaseUrl: string;
  investigationId: string;
  people: number;
  pairs: number;
}

async function prepare(clusterUrl: string, size: number): Promise<Prepared> {
  const database = await makeDatabase(clusterUrl, `bench_${size}`, FOLDER);
  const { client } = database;
  const [tracer = "", supervisor = "", epidemiologist = "", officer = ""] = await makeAccounts(
    database,
    ROLES,
  );
  // The million checks of the largest size would take longer to load than all else to measure.
  const outbreak = benchOutbreak(SEED, size, size < 100_000);
  const investigationId = await storeOutbreak(database, "Bench", outbreak, {
    tracer,
    supervisor,
    epidemiologist,
    officer,
  });
  await client.query("analyze");
  const counts = await client.query(
    `select (select count(*) from core.person) as people, (select count(*) from core.contact_pair) as pairs`,
  );
  await client.end();
  return {
    databaseUrl: database.url,
    investigationId,
    people: Number(counts.rows[0].people),
    pairs: Number(counts.rows[0].pairs),
  };
}

async function measure(prepared: Prepared) {
  const base = `/api/investigations/${prepared.investigationId}`;
  let server = await startServer(prepared.databaseUrl, FOLDER);
  const tracer = await signIn(server.origin, "tracer");
  const supervisor = await signIn(server.origin, "supervisor");
  const cold = (await supervisor.call("GET", `${base}/network/summary`)).ms;
  const cases = await heldCases(tracer, base);
  const answered: number[] = [];
  const visible: number[] = [];
  const current: number[] = [];
  const clusters: number[] = [];
  for (let round = 0; round < INTERVIEWS; round++) {
    const made = await submitInterview(tracer, base, cases, round);
    if (round >= 10) answered.push(made.ms);
    const sent = performance.now();
    for (;;) {
      const groups = await supervisor.call<{ graphVersion: number }>(
        "GET",
        `${base}/groups?pageSize=10`,
      );
      if (groups.body.graphVersion >= made.graphVersion) break;
      if (performance.now() - sent > 10_000)
        throw new Error("the groups did not follow within 10 s");
    }
    if (round >= 10) visible.push(performance.now() - sent);
    const summary = await supervisor.call("GET", `${base}/network/summary`);
    if (round >= 10) current.push(summary.ms);
    const proposed = await supervisor.call("GET", `${base}/clusters?pageSize=10`);
    if (round >= 10) clusters.push(proposed.ms);
  }
  const asOf: number[] = [];
  for (let back = 0; back < 20; back++) {
    const day = shiftDay(LAST_DAY, back - 19);
    asOf.push(
      (
        await supervisor.call(
          "GET",
          `${base}/network/summary?population=all&asOf=${day}&from=${shiftDay(LAST_DAY, -34)}&to=${day}`,
        )
      ).ms,
    );
  }
  const groups: number[] = [];
  for (let page = 1; page <= 20; page++) {
    groups.push((await supervisor.call("GET", `${base}/groups?page=${page}`)).ms);
  }
  const clients = {
    tracer,
    supervisor,
    epidemiologist: await signIn(server.origin, "epidemiologist"),
    officer: await signIn(server.origin, "officer"),
  };
  const lineList = await benchLists(clients, base);
  const followUp = await benchFollowUp(base, { tracer, supervisor });
  const previews = await benchPreviews(supervisor, base);
  // Files are given out only soon after a password was given.
  const files = await benchExports(await signIn(server.origin, "officer"), base);
  await stopServer(server);
  server = await startServer(prepared.databaseUrl, FOLDER);
  const again = await signIn(server.origin, "supervisor");
  const coldAgain = (await again.call("GET", `${base}/network/summary`)).ms;
  await stopServer(server);
  return {
    people: prepared.people,
    pairs: prepared.pairs,
    interviewMs: spread(answered),
    groupsFollowMs: spread(visible),
    summaryCurrentMs: spread(current),
    groupsPageMs: spread(groups),
    clustersAfterInterviewMs: spread(clusters),
    summaryRangeMs: spread(asOf),
    summaryColdMs: [Math.round(cold), Math.round(coldAgain)],
    lineList,
    followUp,
    previewMs: previews,
    exports: files,
    serverReadyMs: server.readyMs,
  };
}

/** Compressed size of the scripts in the built client, kB (1000 bytes), largest first. */
function clientScripts(): Record<string, number> | null {
  const folder = join(ROOT, "dist/client/assets");
  if (!existsSync(folder)) return null;
  const sizes = readdirSync(folder)
    .filter((name) => name.endsWith(".js"))
    .map(
      (name) =>
        [
          name.replace(/-[\w-]{8}\.js$/, ""),
          Math.round(gzipSync(readFileSync(join(folder, name))).length / 100) / 10,
        ] as const,
    );
  return Object.fromEntries(sizes.sort((a, b) => b[1] - a[1]).slice(0, 20));
}

/**
 * Loads each size into a database of its own and measures the product over HTTP, one request at a
 * time: a 12-contact interview, how soon the groups show it, and the report. Loopback only.
 */
export async function benchProduct(sizes: readonly number[]) {
  rmSync(FOLDER, { recursive: true, force: true });
  mkdirSync(FOLDER, { recursive: true });
  const cluster = await startCluster(FOLDER);
  try {
    const results = [];
    for (const size of sizes) results.push(await measure(await prepare(cluster.url, size)));
    const first = results[0];
    const last = results.at(-1);
    return {
      node: process.version,
      results,
      interviewP95Ratio:
        first && last
          ? Math.round((last.interviewMs.p95 / first.interviewMs.p95) * 100) / 100
          : null,
      clientScriptsKb: clientScripts(),
    };
  } finally {
    await stopCluster(FOLDER);
  }
}
