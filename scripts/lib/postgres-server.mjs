// Making, launching and probing a private PostgreSQL server: loopback only, no unix socket.
import { spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import {
  appendFileSync,
  closeSync,
  existsSync,
  openSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from "node:fs";
import { createConnection, createServer } from "node:net";
import { join } from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { writeWhole } from "./locks.mjs";
import { PlainError } from "./plain.mjs";
import { give, MARKER } from "./postgres-place.mjs";
import { readPostmaster } from "./postgres-process.mjs";
import { lastLines, runCaptured } from "./processes.mjs";

export const ADMIN = "strandline_admin";
export const DATABASE = "strandline";
export const HOST = "127.0.0.1";
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
export function answers(port) {
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

/** The server once it takes connections; undefined when it is not coming up. */
export async function waitReady(data, ms, stillStarting) {
  const end = Date.now() + ms;
  while (Date.now() < end) {
    const found = readPostmaster(data);
    if (found?.ready && (await answers(found.port))) return found;
    if (!found && !stillStarting()) return undefined;
    await sleep(20);
  }
  return undefined;
}

/** Makes the cluster and its database anew; the marker is written last. */
export async function makeCluster({ folder, data, account }, bin) {
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

/** Starts the server that does not run: kept port if free, several tries after a kill -9. */
export async function startFresh(place, bin, wishedPort, throwAway) {
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
