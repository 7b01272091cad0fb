// Where a private cluster lives and which user of the machine runs it.
import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import {
  chownSync,
  existsSync,
  lstatSync,
  mkdirSync,
  readFileSync,
  realpathSync,
  renameSync,
  rmdirSync,
  rmSync,
  statSync,
} from "node:fs";
import { join } from "node:path";
import { writeWhole } from "./locks.mjs";
import { PlainError, say } from "./plain.mjs";
import { endPostmaster } from "./postgres-process.mjs";
import { makeDataFolder } from "./project.mjs";

/** Present once initdb and the first database are complete; without it a cluster is half-made. */
export const MARKER = "strandline-complete";

const isRoot = () => process.getuid?.() === 0;

function debianAccount() {
  const number = (flag) => Number(spawnSync("id", [flag, "postgres"]).stdout?.toString().trim());
  const account = { uid: number("-u"), gid: number("-g") };
  if (!account.uid || !account.gid) {
    throw new PlainError("this machine has no user postgres; start as an ordinary user instead");
  }
  return account;
}

/** PostgreSQL refuses to run as root: root hands it to the folder's owner or to `postgres`. */
function accountFor(folder, parent) {
  if (!isRoot()) return {};
  for (const path of [folder, parent]) {
    if (!existsSync(path)) continue;
    const { uid, gid } = statSync(path);
    if (uid !== 0) return { uid, gid };
  }
  return debianAccount();
}

/** Gives a path that root made to the database's user. */
export function give(path, account) {
  if (account.uid !== undefined) chownSync(path, account.uid, account.gid);
}

function canEnter(folder, account) {
  const test = 'cd "$1" && test -w . && test -x .';
  return spawnSync("/bin/sh", ["-c", test, "sh", folder], { ...account, cwd: "/" }).status === 0;
}

function readPointer(file, real) {
  if (!existsSync(file)) return undefined;
  const { path, madeFor } = JSON.parse(readFileSync(file, "utf8"));
  if (!existsSync(path)) return undefined;
  // The folder it was made for still stands elsewhere: this is a copy and gets its own cluster.
  if (madeFor !== real && existsSync(madeFor)) return undefined;
  return path;
}

function outsidePath(real) {
  const key = createHash("sha256").update(real).digest("hex").slice(0, 12);
  return `/var/lib/strandline-${key}`;
}

async function makeOutside(pointer, real, account, throwAway) {
  const path = outsidePath(real);
  if (existsSync(path)) {
    await endPostmaster(join(path, "data"));
    if (throwAway) rmSync(path, { recursive: true, force: true });
  }
  if (existsSync(path)) {
    // Its keys and passwords went with the old data folder; a database is never thrown away.
    const kept = `${path}-kept-${Date.now()}`;
    renameSync(path, kept);
    say(`An earlier database of this folder is kept as ${kept}`);
  }
  mkdirSync(path, { mode: 0o700 });
  give(path, account);
  writeWhole(pointer, JSON.stringify({ path, madeFor: real }));
  return path;
}

/** Where the cluster of a data folder is, without making anything: undefined when there is none. */
export function findPlace(dir) {
  if (!existsSync(dir)) return undefined;
  const real = realpathSync(dir);
  const inside = join(real, "postgres");
  const folder = readPointer(join(real, "postgres-at.json"), real) ?? inside;
  return existsSync(folder) ? { folder, data: join(folder, "data") } : undefined;
}

/**
 * The folder of the cluster for a data folder, made when missing, and the account that runs it.
 * A data folder closed to that account gets a folder outside, keyed by a hash of its path.
 * @returns {Promise<{folder: string, data: string, account: {uid?: number, gid?: number}}>}
 */
export async function settlePlace(dir, { throwAway = false } = {}) {
  const real = realpathSync(makeDataFolder(dir));
  const pointer = join(real, "postgres-at.json");
  const inside = join(real, "postgres");
  const place = (folder, account) => ({ folder, data: join(folder, "data"), account });

  if (!isRoot()) {
    const foreign = [real, inside].find(
      (path) => existsSync(path) && lstatSync(path).uid !== process.getuid(),
    );
    if (foreign ?? existsSync(pointer)) {
      throw new PlainError(
        `${foreign ?? real} belongs to another user; start as that user or set STRANDLINE_DATA to a folder of your own`,
      );
    }
    mkdirSync(inside, { recursive: true, mode: 0o700 });
    return place(inside, {});
  }

  const outside = readPointer(pointer, real);
  if (outside) {
    writeWhole(pointer, JSON.stringify({ path: outside, madeFor: real }));
    return place(outside, accountFor(outside, real));
  }
  const account = accountFor(inside, real);
  const fresh = !existsSync(inside);
  if (fresh) {
    mkdirSync(inside, { mode: 0o700 });
    give(inside, account);
  }
  if (canEnter(inside, account)) return place(inside, account);
  if (existsSync(join(inside, "data"))) {
    throw new PlainError(
      `the database in ${inside} is closed to its user; open the folders above it (chmod o+x)`,
    );
  }
  rmdirSync(inside);
  return place(await makeOutside(pointer, real, account, throwAway), account);
}
