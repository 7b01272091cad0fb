import { type ChildProcess, spawn } from "node:child_process";
import { randomInt, randomUUID } from "node:crypto";
import { mkdirSync } from "node:fs";
import { cpus } from "node:os";
import { join, resolve } from "node:path";
import pg from "pg";
import { freePort, startCluster, stopCluster } from "../scripts/lib/postgres.mjs";
import { loadSecrets } from "../server/config/secrets.ts";
import { migrate } from "../server/db/migrate.ts";
import { hashPassword } from "../server/features/session/password.ts";
import { spread } from "./support/http-client.ts";
import { mannWhitney } from "./support/mann-whitney.ts";

const ROOT = resolve(import.meta.dirname, "..");
const FOLDER = join(ROOT, ".test-data/bench");
const DATABASE = "bench_sign_in";
const KNOWN = "known@bench.example";
/** Pairs between two clearings of the counts of failures, which would close the door otherwise. */
const PAIRS_A_ROUND = 5;
const WARM_UP = 10;

type Side = "known" | "unknown";

async function prepare(clusterUrl: string): Promise<{ url: string; admin: pg.Client }> {
  const cluster = new pg.Client({ connectionString: clusterUrl });
  await cluster.connect();
  await cluster.query(`drop database if exists ${DATABASE} with (force)`);
  await cluster.query(`create database ${DATABASE}`);
  await cluster.end();
  const url = new URL(clusterUrl);
  url.pathname = `/${DATABASE}`;
  await migrate(url.toString(), loadSecrets(FOLDER).logins);
  const admin = new pg.Client({ connectionString: url.toString() });
  await admin.connect();
  await admin.query(
    "insert into auth.account (id, email, display_name, password_hash) values ($1, $2, 'Known', $3)",
    [randomUUID(), KNOWN, await hashPassword("only for measuring, never kept")],
  );
  return { url: url.toString(), admin };
}

async function startServer(databaseUrl: string): Promise<{ child: ChildProcess; origin: string }> {
  const port = await freePort();
  const child = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], {
    cwd: ROOT,
    stdio: ["ignore", "pipe", "inherit"],
    env: {
      PATH: process.env.PATH,
      NODE_ENV: "production",
      PORT: String(port),
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
  return { child, origin: `http://127.0.0.1:${port}` };
}

async function timed(
  origin: string,
  path: string,
  status: number,
  body: Record<string, string>,
): Promise<number> {
  const started = performance.now();
  const answer = await fetch(`${origin}${path}`, {
    method: "POST",
    headers: { Origin: origin, "Content-Type": "application/json" },
    body: JSON.stringify(body),
  });
  await answer.arrayBuffer();
  const ms = performance.now() - started;
  if (answer.status !== status) throw new Error(`${path} answered ${answer.status}`);
  return ms;
}

/** Times one kind of request for a known and an unknown address in turn, the order drawn at random. */
async function compare(admin: pg.Client, pairs: number, ask: (email: string) => Promise<number>) {
  const times: Record<Side, number[]> = { known: [], unknown: [] };
  for (let pair = -WARM_UP; pair < pairs; pair += 1) {
    if (pair % PAIRS_A_ROUND === 0) await admin.query("delete from auth.attempt");
    const order: Side[] = randomInt(2) === 0 ? ["known", "unknown"] : ["unknown", "known"];
    for (const side of order) {
      const ms = await ask(side === "known" ? KNOWN : `nobody${randomInt(1e9)}@bench.example`);
      if (pair >= 0) times[side].push(ms);
    }
  }
  const known = spread(times.known);
  const unknown = spread(times.unknown);
  const { u, p } = mannWhitney(times.known, times.unknown);
  const difference = Math.round((known.median - unknown.median) * 10) / 10;
  return { known, unknown, medianDifference: difference, u, p: Number(p.toPrecision(3)) };
}

/**
 * Measures whether the time of a refused sign-in, or of asking for a reset, tells known addresses
 * from unknown ones: a real server on a private database, `pairs` requests of each kind and side.
 * Times in milliseconds. A finding, no verdict: the machine's other work is in it.
 */
export async function measureSignIn(pairs: number) {
  mkdirSync(FOLDER, { recursive: true });
  const cluster = await startCluster(FOLDER);
  let child: ChildProcess | undefined;
  let admin: pg.Client | undefined;
  try {
    const prepared = await prepare(cluster.url);
    admin = prepared.admin;
    const server = await startServer(prepared.url);
    child = server.child;
    const { origin } = server;
    const signIn = await compare(admin, pairs, (email) =>
      timed(origin, "/api/session", 401, { email, password: "a password that is wrong" }),
    );
    const reset = await compare(admin, pairs, (email) =>
      timed(origin, "/api/password-resets", 202, { email }),
    );
    return { node: process.version, cpus: cpus().length, pairs, signIn, reset };
  } finally {
    if (child && child.exitCode === null) {
      const ended = new Promise<void>((done) => child?.once("exit", () => done()));
      child.kill("SIGTERM");
      await ended;
    }
    await admin?.end();
    await stopCluster(FOLDER);
  }
}
