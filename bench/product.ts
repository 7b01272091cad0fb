import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync } from "node:fs";
import { join, resolve } from "node:path";
import { gzipSync } from "node:zlib";
import { startCluster, stopCluster } from "../scripts/lib/postgres.mjs";
import { spread } from "./support/http-client.ts";
import { FOLDER, INTERVIEWS, type Prepared, prepare } from "./support/prepare.ts";
import { signIn, startServer, stopServer } from "./support/server.ts";

const ROOT = resolve(import.meta.dirname, "..");

/** Days of an outbreak: the largest runs for more than a year. */
const daysOf = (people: number) => (people >= 100_000 ? 400 : 35);

function contacts(round: number): Record<string, unknown>[] {
  return Array.from({ length: 12 }, (_, index) => ({
    name: `Benchcontact ${round} ${index}`,
    phone: `+44 20 7946 ${String(round * 12 + index).padStart(4, "0")}`,
    setting: ["household", "workplace", "social"][index % 3],
    place: index % 3 === 1 ? "Bench Works" : null,
    firstExposure: "2026-05-16",
    lastExposure: "2026-05-18",
    minutes: 30 + index,
    physical: index % 2 === 0,
    indoors: true,
    relation: "colleague",
  }));
}

async function measure(prepared: Prepared) {
  const base = `/api/investigations/${prepared.investigationId}`;
  let server = await startServer(prepared.databaseUrl);
  const tracer = await signIn(server.origin, "tracer");
  const supervisor = await signIn(server.origin, "supervisor");
  const cold = (await supervisor.call("GET", `${base}/network/summary`)).ms;
  const queue = await tracer.call<{ items: { id: string; can: { interview?: boolean } }[] }>(
    "GET",
    `${base}/people?pageSize=200&classification=case&assigned=me`,
  );
  const cases = queue.body.items.filter((person) => person.can.interview);
  const answered: number[] = [];
  const visible: number[] = [];
  const current: number[] = [];
  const clusters: number[] = [];
  for (let round = 0; round < INTERVIEWS; round++) {
    const person = cases[round % cases.length];
    if (!person) throw new Error("the tracer holds no case");
    const made = await tracer.call<{ graphVersion: number }>("POST", `${base}/interviews`, {
      personId: person.id,
      outcome: "complete",
      channel: "telephone",
      contacts: contacts(round),
    });
    if (round >= 10) answered.push(made.ms);
    const sent = performance.now();
    for (;;) {
      const groups = await supervisor.call<{ graphVersion: number }>(
        "GET",
        `${base}/groups?pageSize=10`,
      );
      if (groups.body.graphVersion >= made.body.graphVersion) break;
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
    const day = `2026-05-${String(1 + back).padStart(2, "0")}`;
    asOf.push(
      (
        await supervisor.call(
          "GET",
          `${base}/network/summary?population=all&asOf=${day}&from=2026-04-16&to=${day}`,
        )
      ).ms,
    );
  }
  const groups: number[] = [];
  for (let page = 1; page <= 20; page++) {
    groups.push((await supervisor.call("GET", `${base}/groups?page=${page}`)).ms);
  }
  const lists: number[] = [];
  for (let page = 1; page <= 20; page++) {
    lists.push((await supervisor.call("GET", `${base}/people?page=${page}&sort=-onsetDate`)).ms);
  }
  await stopServer(server.child);
  server = await startServer(prepared.databaseUrl);
  const again = await signIn(server.origin, "supervisor");
  const coldAgain = (await again.call("GET", `${base}/network/summary`)).ms;
  await stopServer(server.child);
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
    lineListPageMs: spread(lists),
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
    for (const size of sizes)
      results.push(await measure(await prepare(cluster.url, size, daysOf(size))));
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
