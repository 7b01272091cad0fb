// One owner at a time, by a file that holds the owner's identity.
import { randomUUID } from "node:crypto";
import { linkSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { setTimeout as sleep } from "node:timers/promises";
import { isAlive, processIdentity } from "./processes.mjs";

/** Someone else, who is alive, holds the lock. `holder` is what they wrote into it. */
export class LockHeldError extends Error {
  constructor(file, holder) {
    super(`${file} is held by process ${holder.pid}`);
    this.holder = holder;
  }
}

function readHolder(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    if (error.code === "ENOENT") return undefined;
    if (error instanceof SyntaxError) return { pid: 0, identity: "" };
    throw error;
  }
}

/** Writes a file whole under another name first, so that nobody ever reads half of it. */
export function writeWhole(file, text, mode = 0o600) {
  const draft = `${file}.${process.pid}.${randomUUID().slice(0, 8)}`;
  writeFileSync(draft, text, { mode });
  renameSync(draft, file);
}

function tryTake(file, text) {
  const draft = `${file}.${process.pid}.${randomUUID().slice(0, 8)}`;
  writeFileSync(draft, text, { mode: 0o600, flag: "wx" });
  try {
    // A hard link fails when the name exists and shows the content at once: no half-written lock.
    linkSync(draft, file);
    return true;
  } catch (error) {
    if (error.code === "EEXIST") return false;
    throw error;
  } finally {
    rmSync(draft, { force: true });
  }
}

/** Takes the lock of a dead owner away, unless a living one slipped in between. */
function clearStale(file, stale) {
  const aside = `${file}.stale.${process.pid}.${randomUUID().slice(0, 8)}`;
  try {
    renameSync(file, aside);
  } catch (error) {
    if (error.code === "ENOENT") return;
    throw error;
  }
  const moved = readHolder(aside);
  if (moved && moved.identity !== stale.identity) {
    try {
      linkSync(aside, file);
    } catch (error) {
      if (error.code !== "EEXIST") throw error;
    }
  }
  rmSync(aside, { force: true });
}

/**
 * Takes the lock, waiting for a living owner as long as `patience` says.
 * @param file path of the lock
 * @param patience (holder) → milliseconds to wait for that owner, from now
 * @returns {{update(extra: object): void, release(): void}}
 * @throws LockHeldError when the owner outlasts the patience
 */
export async function takeLock(file, patience) {
  const mine = { pid: process.pid, identity: processIdentity(process.pid) };
  const began = Date.now();
  for (;;) {
    if (tryTake(file, JSON.stringify(mine))) break;
    const holder = readHolder(file);
    if (!holder) continue;
    if (!isAlive(holder.identity)) clearStale(file, holder);
    else if (Date.now() - began > patience(holder)) throw new LockHeldError(file, holder);
    else await sleep(50);
  }
  return {
    update: (extra) => writeWhole(file, JSON.stringify({ ...mine, ...extra })),
    release: () => {
      if (readHolder(file)?.identity === mine.identity) rmSync(file, { force: true });
    },
  };
}
