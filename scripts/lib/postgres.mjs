// The private PostgreSQL cluster of a data folder: started once, shared by who holds it, stopped by
// the last. Never the system's cluster.
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { takeLock } from "./locks.mjs";
import { PlainError } from "./plain.mjs";
import { findPlace, give, MARKER, settlePlace } from "./postgres-place.mjs";
import { endPostmaster, readPostmaster } from "./postgres-process.mjs";
import { ensurePostgres } from "./postgres-programs.mjs";
import {
  ADMIN,
  answers,
  DATABASE,
  HOST,
  makeCluster,
  startFresh,
  waitReady,
} from "./postgres-server.mjs";
import { isAlive, processIdentity } from "./processes.mjs";

export { freePort } from "./postgres-server.mjs";

function madeWith(data) {
  const file = join(data, "PG_VERSION");
  return existsSync(file) ? Number.parseInt(readFileSync(file, "utf8"), 10) : undefined;
}

/** Places this process holds, found again even when the data folder was deleted meanwhile. */
const held = new Map();

const leaseFolder = (folder) => join(folder, "leases");

function liveLeases(folder) {
  const leases = existsSync(leaseFolder(folder)) ? readdirSync(leaseFolder(folder)) : [];
  return leases.filter((name) => {
    if (isAlive(name)) return true;
    rmSync(join(leaseFolder(folder), name), { force: true });
    return false;
  });
}

function clusterOf(place, found, extra) {
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
  const place = await settlePlace(dir, { throwAway });
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
    held.set(dir, place);
    return clusterOf(place, found, { reused });
  } finally {
    lock.release();
  }
}

/** The running cluster of a data folder, undefined when it does not run. Starts nothing. */
export async function runningCluster(dir) {
  const place = findPlace(dir);
  const found = place && readPostmaster(place.data);
  if (!found?.ready || !(await answers(found.port))) return undefined;
  return clusterOf(place, found, { reused: true });
}

/**
 * Gives this process's hold up and stops the cluster, unless another process still holds it.
 * @param dir the data folder given to startCluster
 * @param options `force` stops it whoever holds it
 * @returns {Promise<boolean>} true when it is stopped
 */
export async function stopCluster(dir, { force = false } = {}) {
  const place = findPlace(dir) ?? held.get(dir);
  if (!place || !existsSync(place.folder)) return true;
  const lock = await takeLock(join(place.folder, "lock"), () => 180_000);
  try {
    rmSync(join(leaseFolder(place.folder), processIdentity(process.pid)), { force: true });
    if (liveLeases(place.folder).length > 0 && !force) return false;
    return await endPostmaster(place.data);
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
