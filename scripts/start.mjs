// npm start, npm run dev: everything from a fresh clone to a running product, and its clean end.
import { spawn } from "node:child_process";
import { readFileSync, rmSync } from "node:fs";
import { createServer } from "node:net";
import { join } from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { ensureClientBuild } from "./lib/client-build.mjs";
import { LockHeldError, takeLock, writeWhole } from "./lib/locks.mjs";
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { complain, PlainError, runScript, say } from "./lib/plain.mjs";
import { startCluster, stopCluster } from "./lib/postgres.mjs";
import { endProcess, isAlive, processIdentity, startedBy, stopCaptured } from "./lib/processes.mjs";
import { dataFolder, makeDataFolder, projectRoot } from "./lib/project.mjs";
import { checkSettings } from "./lib/settings.mjs";

/** The server's exit code for a boot it refused in plain words. */
const REFUSED = 78;
const SERVER_GRACE_MS = 15_000;
/** The terminal and npm may both pass on one Ctrl-C: signals this close together are one. */
const SAME_SIGNAL_MS = 1_000;
const DATABASE_RESTARTS = 5;

function readArguments(args) {
  const unknown = args.find((arg) => arg !== "--dev");
  if (unknown) throw new PlainError(`unknown argument ${unknown}; only --dev is known`);
  return { dev: args.includes("--dev") };
}

/** One start at a time for a data folder; one that is just stopping is waited for. */
async function takeStartLock(data, address) {
  try {
    return await takeLock(join(data, "start.lock"), (holder) => (holder.stopping ? 60_000 : 1_500));
  } catch (error) {
    if (!(error instanceof LockHeldError)) throw error;
    const { pid, address: theirs } = error.holder;
    throw new PlainError(
      `already running for this data folder (process ${pid}, ${theirs ?? address})`,
    );
  }
}

/** The server of a start that was killed may still live: nobody else would ever end it. */
async function endOrphan(serverFile) {
  let identity;
  try {
    identity = readFileSync(serverFile, "utf8").trim();
  } catch (error) {
    if (error.code === "ENOENT") return;
    throw error;
  }
  if (isAlive(identity)) {
    say("Ending the server that an earlier start left behind …");
    await endProcess(identity, [
      ["SIGTERM", SERVER_GRACE_MS],
      ["SIGKILL", 5_000],
    ]);
  }
  rmSync(serverFile, { force: true });
}

function checkPort(host, port) {
  const reasons = {
    EADDRINUSE: `port ${port} on ${host} is taken by another program; set PORT to a free one`,
    EACCES: `port ${port} may not be used by this user; set PORT to one above 1023`,
    EADDRNOTAVAIL: `HOST ${host} is not an address of this machine`,
    ENOTFOUND: `HOST ${host} is not an address of this machine`,
  };
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.on("error", (error) =>
      reject(new PlainError(reasons[error.code] ?? `HOST ${host}: ${error.code}`)),
    );
    probe.listen(port, host, () => probe.close(resolve));
  });
}

/**
 * Resolves when this start is asked to end: by a signal, or because npm, which started it, is gone.
 * @returns {{asked: Promise<string>, onHarder(action: () => void): void, isAsked(): boolean}}
 */
function listenForEnd() {
  let first = 0;
  let harder = () => {};
  let resolve;
  const asked = new Promise((done) => {
    resolve = done;
  });
  const ask = (why) => {
    if (first === 0) {
      first = Date.now();
      stopCaptured();
      resolve(why);
    } else if (Date.now() - first > SAME_SIGNAL_MS) {
      harder();
    }
  };
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => ask(signal));
  if (process.env.npm_lifecycle_event) {
    const starters = startedBy();
    const watch = setInterval(() => {
      if (starters.every(isAlive)) return;
      clearInterval(watch);
      if (first === 0) ask("npm is gone");
    }, 500);
    watch.unref();
  }
  return {
    asked,
    isAsked: () => first !== 0,
    onHarder: (action) => {
      harder = action;
    },
  };
}

function startServer({ databaseUrl, data, dev, serverFile }) {
  const env = {
    ...process.env,
    DATABASE_URL: databaseUrl,
    STRANDLINE_DATA: data,
    STRANDLINE_DEV: dev ? "1" : "0",
    NODE_ENV: dev ? "development" : "production",
  };
  // A process group of its own: the terminal's Ctrl-C comes through this script, once.
  const child = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], {
    cwd: projectRoot,
    env,
    detached: true,
    stdio: ["ignore", "inherit", "inherit"],
  });
  const ended = new Promise((resolve) => {
    child.on("error", (error) => resolve({ code: 1, why: error.message }));
    child.on("exit", (code, signal) => resolve({ code: code ?? 1, why: signal }));
  });
  const identity = processIdentity(child.pid);
  if (identity) writeWhole(serverFile, `${identity}\n`);
  return { identity, ended };
}

/** Brings a killed database up again on its port, so that the server's pools find it. */
async function watchDatabase(data, cluster, over) {
  let known = cluster;
  for (let restarts = 0; !over(); ) {
    await sleep(500);
    if (over() || isAlive(known.identity)) continue;
    restarts += 1;
    if (restarts > DATABASE_RESTARTS) throw new PlainError("the database keeps dying; stopping");
    complain("the database was gone; starting it again");
    known = await startCluster(data, { port: known.port });
  }
}

async function serve({ data, address, dev, lock, end }) {
  const given = process.env.DATABASE_URL;
  const cluster = given ? undefined : await startCluster(data);
  const serverFile = join(data, "server.pid");
  try {
    if (end.isAsked()) return 0;
    if (!dev) await ensureClientBuild(projectRoot);
    if (end.isAsked()) return 0;
    const databaseUrl = given ?? cluster.url;
    lock.update({ address });
    const server = startServer({ databaseUrl, data, dev, serverFile });
    let over = false;
    const watched = cluster
      ? watchDatabase(data, cluster, () => over).catch((error) => error)
      : new Promise(() => {});
    const first = await Promise.race([
      server.ended.then((outcome) => ({ outcome })),
      end.asked.then((why) => ({ why })),
      watched.then((trouble) => ({ trouble })),
    ]);
    over = true;
    lock.update({ address, stopping: true });
    if (first.outcome) {
      const { code, why } = first.outcome;
      // The server has said in one line why it does not start.
      if (code === REFUSED) return 1;
      if (code !== 0 || why) complain(`the server ended (${why ?? `exit code ${code}`})`);
      return code;
    }
    if (first.trouble) complain(first.trouble.message);
    else say("Stopping …");
    end.onHarder(() => void endProcess(server.identity, [["SIGKILL", 5_000]]));
    await endProcess(server.identity, [
      ["SIGTERM", SERVER_GRACE_MS],
      ["SIGKILL", 5_000],
    ]);
    end.onHarder(() => {});
    return first.trouble ? 1 : 0;
  } finally {
    lock.update({ address, stopping: true });
    rmSync(serverFile, { force: true });
    if (cluster) await stopCluster(data);
  }
}

await runScript(async () => {
  checkNode();
  const { dev } = readArguments(process.argv.slice(2));
  checkSettings({ ...process.env, STRANDLINE_DEV: dev ? "1" : "0" });
  const host = process.env.HOST ?? "127.0.0.1";
  const port = Number(process.env.PORT ?? 4700);
  const address = `http://${host.includes(":") ? `[${host}]` : host}:${port}`;
  const data = makeDataFolder(dataFolder(process.env));
  const end = listenForEnd();
  const lock = await takeStartLock(data, address);
  try {
    await endOrphan(join(data, "server.pid"));
    await checkPort(host, port);
    await ensurePackages(projectRoot, { dev: false });
    if (end.isAsked()) return 0;
    return await serve({ data, address, dev, lock, end });
  } catch (error) {
    // Ctrl-C also reaches the npm or Vite that runs: their failure is then no news.
    if (!end.isAsked()) throw error;
    return 0;
  } finally {
    lock.release();
  }
});
