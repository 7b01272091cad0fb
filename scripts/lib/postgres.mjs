// The private PostgreSQL cluster: on loopback only, never the system's cluster, no unix socket.
import { spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import {
  appendFileSync,
  closeSync,
  existsSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from "node:fs";
import { createConnection, createServer } from "node:net";
import { join } from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { takeLock, writeWhole } from "./locks.mjs";
import { PlainError } from "./plain.mjs";
import { findPlace, give, MARKER, settlePlace } from "./postgres-place.mjs";
import { ensurePostgres } from "./postgres-programs.mjs";
import {
  endProcess,
  isAlive,
  lastLines,
  processArguments,
  processIdentity,
  runCaptured,
} from "./processes.mjs";

const ADMIN = "strandline_admin";
const DATABASE = "strandline";
const HOST = "127.0.0.1";
const LOG_LIMIT = 10_000_000;
// PG* variables of the caller would reach the server; it gets none of them.
const ENV = { PATH: process.env.PATH, LC_ALL: "C.UTF-8", TZ: "UTC" };

/** Values of persons stand in statements, parameters and DETAIL lines: none reaches the log. */
const SETTINGS = {
  listen_addresses: `'${HOST}'`,
  unix_socket_directories: "''",
  password_encryption: "'scram-sha-256'",
  log_error_verbosity: "terse",
  log_min_error_statement: "panic",
  log_parameter_max_length: "0",
  log_parameter_max_length_on_error: "0",
  log_statement: "none",
  log_min_duration_statement: "-1",
  log_timezone: "'UTC'",
  timezone: "'UTC'",
  jit: "off",
};
/** For clusters whose content may be lost: tests. */
const UNSAFE = { fsync: "off", synchronous_commit: "off", full_page_writes: "off" };

/** A port of 127.0.0.1 that nobody uses now. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.on("error", reject);
    server.listen(0, HOST, () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}

function portIsFree(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.on("error", () => resolve(false));
    server.listen(port, HOST, () => server.close(() => resolve(true)));
  });
}

/** True when a PostgreSQL server answers: it is asked for TLS and says yes or no in one byte. */
function answers(port) {
  return new Promise((resolve) => {
    const socket = createConnection({ host: HOST, port });
    const done = (result) => {
      socket.destroy();
      resolve(result);
    };
    socket.setTimeout(2_000, () => done(false));
    socket.on("error", () => done(false));
    socket.on("close", () => done(false));
    socket.on("connect", () => socket.write(Buffer.from([0, 0, 0, 8, 4, 210, 22, 47])));
    socket.on("data", (data) => done(data[0] === 0x4e || data[0] === 0x53));
  });
}

/** What postmaster.pid says, if the process it names is really the server of this folder. */
function readPostmaster(data) {
  let lines;
  try {
    lines = readFileSync(join(data, "postmaster.pid"), "utf8").split("\n");
  } catch (error) {
    if (error.code === "ENOENT") return undefined;
    throw error;
  }
  const pid = Math.abs(Number(lines[0]));
  const identity = processIdentity(pid);
  if (!identity || !processArguments(pid).includes(data)) return undefined;
  return { pid, identity, port: Number(lines[3]), ready: lines[7]?.trim() === "ready" };
}

async function waitReady(data, ms, stillStarting) {
  const end = Date.now() + ms;
  while (Date.now() < end) {
    const found = readPostmaster(data);
    if (found?.ready && (await answers(found.port))) return found;
    if (!found && !stillStarting()) return undefined;
    await sleep(20);
  }
  return undefined;
}

async function makeCluster({ folder, data, account }, bin) {
  rmSync(data, { recursive: true, force: true });
  const passwordFile = join(folder, "password");
  writeWhole(passwordFile, `${randomBytes(24).toString("base64url")}\n`);
  give(passwordFile, account);
  const options = { ...account, cwd: "/", env: ENV };
  const made = await runCaptured(
    join(bin, "initdb"),
    [
      ...["-D", data, "-U", ADMIN, "--auth-host=scram-sha-256", "--auth-local=scram-sha-256"],
      ...[`--pwfile=${passwordFile}`, "--encoding=UTF8", "--locale=C.UTF-8", "--data-checksums"],
      "--no-instructions",
    ],
    options,
  );
  if (made.code !== 0) throw new PlainError(`initdb failed:\n${lastLines(made.output, 5)}`);
  appendFileSync(join(data, "postgresql.conf"), "\ninclude 'strandline.conf'\n");
  writeFileSync(join(data, "strandline.conf"), "");
  give(join(data, "strandline.conf"), account);
  const created = await runCaptured(
    join(bin, "postgres"),
    ["--single", "-j", "-D", data, "template1"],
    { ...options, input: `CREATE DATABASE ${DATABASE};\n\n` },
  );
  if (created.code !== 0 || /ERROR|FATAL/.test(created.output)) {
    throw new PlainError(`the database could not be made:\n${lastLines(created.output, 5)}`);
  }
  writeFileSync(join(data, MARKER), `${new Date().toISOString()}\n`);
  give(join(data, MARKER), account);
}

async function launch({ folder, data, account }, bin, port, throwAway) {
  const settings = { ...SETTINGS, ...(throwAway ? UNSAFE : {}), port };
  const lines = Object.entries(settings).map(([name, value]) => `${name} = ${value}\n`);
  const file = join(data, "strandline.conf");
  writeFileSync(file, lines.join(""), { mode: 0o600 });
  give(file, account);

  const logFile = join(folder, "log");
  if (existsSync(logFile) && statSync(logFile).size > LOG_LIMIT) {
    renameSync(logFile, `${logFile}.1`);
  }
  const log = openSync(logFile, "a", 0o600);
  give(logFile, account);
  const began = statSync(logFile).size;
  // A session of its own: Ctrl-C at the terminal must not reach the database before the server.
  const child = spawn(join(bin, "postgres"), ["-D", data], {
    ...account,
    cwd: "/",
    env: ENV,
    detached: true,
    stdio: ["ignore", log, log],
  });
  closeSync(log);
  let over = false;
  child.on("error", () => {
    over = true;
  });
  child.on("exit", () => {
    over = true;
  });
  const found = await waitReady(data, 120_000, () => !over);
  child.unref();
  if (found) return { found };
  return { trouble: lastLines(readFileSync(logFile).subarray(began).toString(), 4) };
}

async function startFresh(place, bin, wishedPort, throwAway) {
  const portFile = join(place.folder, "port");
  const kept = existsSync(portFile) ? Number(readFileSync(portFile, "utf8")) : undefined;
  let trouble = "";
  // After a kill -9 the old children may need a moment to notice; a port may be lost meanwhile.
  for (let attempt = 0; attempt < 5; attempt += 1) {
    rmSync(join(place.data, "postmaster.pid"), { force: true });
    let port = wishedPort ?? kept;
    if (!port || attempt > 2 || !(await portIsFree(port))) {
      if (wishedPort) throw new PlainError(`port ${wishedPort} for PostgreSQL is taken`);
      port = await freePort();
    }
    writeWhole(portFile, `${port}\n`);
    const outcome = await launch(place, bin, port, throwAway);
    if (outcome.found) return outcome.found;
    trouble = outcome.trouble;
    await sleep(500);
  }
  throw new PlainError(
    `PostgreSQL does not start (log: ${join(place.folder, "log")}):\n${trouble}`,
  );
}

function madeWith(data) {
  const file = join(data, "PG_VERSION");
  return existsSync(file) ? Number.parseInt(readFileSync(file, "utf8"), 10) : undefined;
}

const leaseFolder = (folder) => join(folder, "leases");

function liveLeases(folder) {
  const leases = existsSync(leaseFolder(folder)) ? readdirSync(leaseFolder(folder)) : [];
  return leases.filter((name) => {
    if (isAlive(name)) return true;
    rmSync(join(leaseFolder(folder), name), { force: true });
    return false;
  });
}

function describe(place, found, extra) {
  const password = readFileSync(join(place.folder, "password"), "utf8").trim();
  const url = `postgres://${ADMIN}:${password}@${HOST}:${found.port}/${DATABASE}`;
  return { url, port: found.port, identity: found.identity, dir: place.folder, ...extra };
}

/**
 * Starts the cluster of a data folder, or joins it when it already runs, and holds it open for
 * this process until stopCluster.
 * @param dir data folder; the cluster is kept in its `postgres` (or outside, see settlePlace)
 * @param options `port` instead of a kept or free one; `throwAway` for tests: content may be lost
 * @returns {Promise<{url: string, port: number, identity: string, dir: string, reused: boolean}>}
 *   url of the superuser
 */
export async function startCluster(dir, { port, throwAway = false } = {}) {
  // The first look for programs installs them, and with them the user the place may belong to.
  const before = findPlace(dir);
  const server = await ensurePostgres(before && madeWith(before.data));
  const place = settlePlace(dir);
  const lock = await takeLock(join(place.folder, "lock"), () => 180_000);
  try {
    let found = await waitReady(place.data, 120_000, () => false);
    const reused = Boolean(found);
    if (!found) {
      if (!existsSync(join(place.data, MARKER))) {
        // Only a server that once ran leaves postmaster.opts: that is no half-made cluster.
        if (existsSync(join(place.data, "postmaster.opts"))) {
          throw new PlainError(`${place.data} holds a database that this program did not make`);
        }
        await makeCluster(place, server.bin);
      }
      found = await startFresh(place, server.bin, port, throwAway);
    }
    mkdirSync(leaseFolder(place.folder), { recursive: true, mode: 0o700 });
    give(leaseFolder(place.folder), place.account);
    writeFileSync(join(leaseFolder(place.folder), processIdentity(process.pid)), "");
    return describe(place, found, { reused });
  } finally {
    lock.release();
  }
}

/** The running cluster of a data folder, undefined when it does not run. Starts nothing. */
export async function runningCluster(dir) {
  const place = findPlace(dir);
  const found = place && readPostmaster(place.data);
  if (!found?.ready || !(await answers(found.port))) return undefined;
  return describe(place, found, { reused: true });
}

/**
 * Gives this process's hold up and stops the cluster, unless another process still holds it.
 * @param dir the data folder given to startCluster
 * @param options `force` stops it whoever holds it
 * @returns {Promise<boolean>} true when it is stopped
 */
export async function stopCluster(dir, { force = false } = {}) {
  const place = findPlace(dir);
  if (!place) return true;
  const lock = await takeLock(join(place.folder, "lock"), () => 180_000);
  try {
    rmSync(join(leaseFolder(place.folder), processIdentity(process.pid)), { force: true });
    if (liveLeases(place.folder).length > 0 && !force) return false;
    const found = readPostmaster(place.data);
    if (!found) return true;
    // Fast, then immediate shutdown; the next start recovers from either.
    return await endProcess(found.identity, [
      ["SIGINT", 30_000],
      ["SIGQUIT", 10_000],
      ["SIGKILL", 5_000],
    ]);
  } finally {
    lock.release();
  }
}

/** Stops the cluster of a data folder and deletes it, also when it lies outside. Tests only. */
export async function removeCluster(dir) {
  const place = findPlace(dir);
  if (!place) return;
  await stopCluster(dir, { force: true });
  rmSync(place.folder, { recursive: true, force: true });
}
