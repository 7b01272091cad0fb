// Processes by identity (a pid alone may be recycled) and child processes with captured output.
import { spawn } from "node:child_process";
import { readFileSync } from "node:fs";
import { setTimeout as sleep } from "node:timers/promises";

/**
 * "pid:start time" of a living process, undefined when it is gone. The start time tells a
 * recycled pid from the process that was recorded. Where /proc is missing the pid stands alone.
 */
export function processIdentity(pid) {
  if (!Number.isInteger(pid) || pid <= 0) return undefined;
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (error.code !== "EPERM") return undefined;
  }
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    // The command name may hold blanks and brackets: the fields start after its last bracket.
    const fields = stat.slice(stat.lastIndexOf(")") + 2).split(" ");
    if (fields[0] === "Z") return undefined;
    return `${pid}:${fields[19]}`;
  } catch {
    return `${pid}:`;
  }
}

/** True while the very process of this identity lives. */
export function isAlive(identity) {
  const pid = Number.parseInt(String(identity ?? ""), 10);
  return Number.isInteger(pid) && processIdentity(pid) === identity;
}

/** The parent's pid, undefined when it cannot be read. */
function parentOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return Number(stat.slice(stat.lastIndexOf(")") + 2).split(" ")[1]);
  } catch {
    return undefined;
  }
}

/** Identities of whoever started this process: its parent and, behind a `sh -c`, that one's. */
export function startedBy() {
  const starters = [process.ppid];
  if (processArguments(process.ppid)[1] === "-c") starters.push(parentOf(process.ppid));
  return starters.map(processIdentity).filter(Boolean);
}

/** The argument list of a process, [] when it cannot be read. */
export function processArguments(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, "utf8").split("\0");
  } catch {
    return [];
  }
}

/** Waits until the process is gone; false when it still lives after `ms`. */
export async function waitGone(identity, ms) {
  const end = Date.now() + ms;
  while (isAlive(identity)) {
    if (Date.now() > end) return false;
    await sleep(25);
  }
  return true;
}

/**
 * Sends each signal in turn until the process is gone.
 * @param identity from processIdentity
 * @param steps pairs [signal, milliseconds to wait after it]
 */
export async function endProcess(identity, steps) {
  const pid = Number.parseInt(String(identity ?? ""), 10);
  for (const [signal, ms] of steps) {
    if (!isAlive(identity)) return true;
    try {
      process.kill(pid, signal);
    } catch (error) {
      if (error.code !== "ESRCH") throw error;
    }
    if (await waitGone(identity, ms)) return true;
  }
  return !isAlive(identity);
}

const stoppable = new Set();

/** Ends the commands that may be broken off; npm would first finish its work on any other signal. */
export function stopCaptured() {
  for (const child of stoppable) child.kill("SIGKILL");
}

/**
 * Runs a command to its end and keeps what it printed.
 * @returns {Promise<{code: number, output: string}>} code 127 when it could not be started
 */
export function runCaptured(
  command,
  args,
  { input, timeoutMs = 900_000, mayStop = false, ...options } = {},
) {
  return new Promise((resolve) => {
    const child = spawn(command, args, {
      ...options,
      stdio: [input === undefined ? "ignore" : "pipe", "pipe", "pipe"],
      timeout: timeoutMs,
      killSignal: "SIGKILL",
    });
    if (mayStop) {
      stoppable.add(child);
      child.on("close", () => stoppable.delete(child));
    }
    let output = "";
    const keep = (chunk) => {
      output = (output + chunk).slice(-200_000);
    };
    child.stdout.setEncoding("utf8").on("data", keep);
    child.stderr.setEncoding("utf8").on("data", keep);
    child.on("error", (error) => resolve({ code: 127, output: `${output}${error.message}` }));
    child.on("close", (code, signal) =>
      resolve({ code: code ?? 1, output: signal ? `${output}\n(ended by ${signal})` : output }),
    );
    if (input !== undefined) {
      child.stdin.on("error", () => {});
      child.stdin.end(input);
    }
  });
}

/** The last lines of a text, for a failure message. */
export function lastLines(text, count = 15) {
  return text.trimEnd().split("\n").slice(-count).join("\n");
}

/** The first lines of a text: where a compiler says what is wrong, before its own stack. */
export function firstLines(text, count = 20) {
  return text.trim().split("\n").slice(0, count).join("\n");
}
