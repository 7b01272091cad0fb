import { type ChildProcess, spawn } from "node:child_process";
import { randomUUID } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync } from "node:fs";
import { join, resolve } from "node:path";
import { gzipSync } from "node:zlib";
import pg from "pg";
import { generateOutbreak } from "../drizzle/seed/generator/generate-outbreak.ts";
import { loadOutbreak } from "../drizzle/seed/load-outbreak.ts";
import { freePort, startCluster, stopCluster } from "../scripts/lib/postgres.mjs";
import { loadSecrets } from "../server/config/secrets.ts";
import { migrate } from "../server/db/migrate.ts";
import { hashPassword } from "../server/features/session/password.ts";
import { createKeyRing } from "../server/identity/keys.ts";
import { BenchClient, spread } from "./support/http-client.ts";

// Fixed, so that two runs measure the same data.
const SEED = 7;
const LAST_DAY = "2026-05-20";
const PASSWORD = "only for measuring, never kept";
const ROOT = resolve(import.meta.dirname, "..");
const FOLDER = join(ROOT, ".test-data/bench");
const INTERVIEWS = 60;
const ROLES = ["tracer", "supervisor"] as const;

interface Prepared {
  databaseUrl: string;
  investigationId: string;
  people: number;
  pairs: number;
}

async function prepare(clusterUrl: string, size: number): Promise<Prepared> {
  const name = `bench_${size}`;
  const admin = new pg.Client({ connectionString: clusterUrl });
  await admin.connect();
  await admin.query(`drop database if exists ${name} with (force)`);
  await admin.query(`create database ${name}`);
  await admin.end();
  const url = new URL(clusterUrl);
  url.pathname = `/${name}`;
  const secrets = loadSecrets(FOLDER);
  await migrate(url.toString(), secrets.logins);
  const keys = createKeyRing(secrets.masterKey);
  const client = new pg.Client({ connectionString: url.toString() });
  await client.connect();
  await client.query("begin");
  const accounts = new Map<string, string>();
  const hash = await hashPassword(PASSWORD);
  for (const role of ROLES) {
    const id = randomUUID();
    await client.query(
      "insert into auth.account (id, email, display_name, password_hash) values ($1, $2, $3, $4)",
      [id, `${role}@bench.example`, role, hash],
    );
    accounts.set(role, id);
  }
  const settings = {
    monitoringDays: 14,
    infectiousBefore: 2,
    infectiousAfter: 10,
    incubationMin: 2,
    incubationMax: 10,
  };
  const outbreak = generateOutbreak({
    seed: SEED,
    people: size,
    days: 35,
    lastDay: LAST_DAY,
    tracers: ["first", "second", "third"],
    pairsPerPerson: 3,
    followUpChecks: false,
    ...settings,
  });
  const id = randomUUID();
  await client.query(
    `insert into core.investigation (id, name, invented, time_zone, country_code, population_at_risk,
       infectious_before, infectious_after, incubation_min, incubation_max, monitoring_days)
     values ($1, 'Bench', true, 'UTC', 'GB', $2, 2, 10, 2, 10, 14)`,
    [id, outbreak.story.populationAtRisk],
  );
  const wrapped = keys.wrapFresh(id);
  await client.query(
    "insert into identity.data_key (investigation_id, wrapped_key) values ($1, $2)",
    [id, wrapped],
  );
  for (const role of ROLES) {
    await client.query(
      "insert into core.member (id, investigation_id, account_id, role) values ($1, $2, $3, $4)",
      [randomUUID(), id, accounts.get(role), role],
    );
  }
  const tracers = new Map([["first", accounts.get("tracer") as string]]);
  await loadOutbreak(
    {
      client,
      keys: keys.unwrap(id, wrapped),
      investigationId: id,
      accounts: tracers,
      country: "GB",
    },
    outbreak,
  );
  // A tracer holds a day's work, not a third of an outbreak.
  await client.query(
    "update core.person set assigned_account_id = null where investigation_id = $1",
    [id],
  );
  await client.query(
    `update core.person set assigned_account_id = $2 where id in (
       select id from core.person where investigation_id = $1
         and classification in ('confirmed', 'probable', 'suspected') order by id limit $3)`,
    [id, accounts.get("tracer"), INTERVIEWS],
  );
  await client.query("commit");
  await client.query("analyze");
  const counts = await client.query(
    `select (select count(*) from core.person) as people, (select count(*) from core.contact_pair) as pairs`,
  );
  await client.end();
  return {
    databaseUrl: url.toString(),
    investigationId: id,
    people: Number(counts.rows[0].people),
    pairs: Number(counts.rows[0].pairs),
  };
}

async function startServer(
  databaseUrl: string,
): Promise<{ child: ChildProcess; origin: string; readyMs: number }> {
  const port = await freePort();
  const started = performance.now();
  const child = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], {
    cwd: ROOT,
    stdio: ["ignore", "pipe", "inherit"],
    env: {
      ...process.env,
      NODE_ENV: "production",
      PORT: String(port),
      HOST: "127.0.0.1",
      DATABASE_URL: databaseUrl,
      STRANDLINE_DATA: FOLDER,
      STRANDLINE_DEMO: "0",
      STRANDLINE_LOG_LEVEL: "warn",
    },
  });
  await new Promise<void>((done, fail) => {
    child.once("exit", () => fail(new Error("the server ended before it was ready")));
    child.stdout?.on("data", (chunk: Buffer) => chunk.includes("is ready") && done());
  });
  return {
    child,
    origin: `http://127.0.0.1:${port}`,
    readyMs: Math.round(performance.now() - started),
  };
}

async function stopServer(child: ChildProcess): Promise<void> {
  const ended = new Promise<void>((done) => child.once("exit", () => done()));
  child.kill("SIGTERM");
  await ended;
}

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

async function signIn(origin: string, role: string): Promise<BenchClient> {
  const client = new BenchClient(origin);
  await client.call("POST", "/api/session", { email: `${role}@bench.example`, password: PASSWORD });
  return client;
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
