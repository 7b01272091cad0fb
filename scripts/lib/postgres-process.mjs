// The server process of a cluster, told apart from a stranger that got its old pid.
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { endProcess, processArguments, processIdentity } from "./processes.mjs";

/** What postmaster.pid says, if the process it names is really the server of this folder. */
export function readPostmaster(data) {
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

/** Ends the server of a cluster: fast, then immediate shutdown; a start recovers from either. */
export async function endPostmaster(data) {
  const found = readPostmaster(data);
  if (!found) return true;
  return endProcess(found.identity, [
    ["SIGINT", 30_000],
    ["SIGQUIT", 10_000],
    ["SIGKILL", 5_000],
  ]);
}
