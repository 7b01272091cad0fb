// What the machine must have: npm packages, Debian packages.
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { takeLock } from "./locks.mjs";
import { PlainError, say } from "./plain.mjs";
import { lastLines, runCaptured } from "./processes.mjs";
import { makeDataFolder } from "./project.mjs";

const OLDEST_NODE = [20, 19];

/** Stops with one line when Node.js is too old to run the rest. */
export function checkNode() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major > OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor >= OLDEST_NODE[1])) return;
  throw new PlainError(
    `Node.js ${OLDEST_NODE.join(".")} or newer is needed, this is ${process.versions.node}`,
  );
}

function readJson(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch {
    return undefined;
  }
}

/**
 * True when node_modules holds what package-lock.json asks for. npm writes its own account of an
 * installation (node_modules/.package-lock.json) as its last step, so a broken-off `npm ci` and a
 * newer lock both show here.
 */
export function packagesComplete(root, { dev }) {
  const wanted = readJson(join(root, "package-lock.json"))?.packages;
  const have = readJson(join(root, "node_modules", ".package-lock.json"))?.packages;
  if (!wanted) throw new PlainError("package-lock.json is missing or damaged");
  if (!have) return false;
  return Object.entries(wanted).every(([path, entry]) => {
    if (path === "" || (entry.dev && !dev)) return true;
    const found = have[path];
    // Optional packages of other platforms are never installed.
    if (!found) return Boolean(entry.optional || entry.devOptional);
    return found.version === entry.version && existsSync(join(root, path));
  });
}

/** Installs the npm packages of the lock file when they are missing or another version. */
export async function ensurePackages(root, { dev }) {
  if (packagesComplete(root, { dev })) return;
  const folder = makeDataFolder(join(root, ".data"));
  const lock = await takeLock(join(folder, "install.lock"), () => 900_000);
  try {
    if (packagesComplete(root, { dev })) return;
    say("Installing npm packages (npm ci), about a minute …");
    const npm = process.env.npm_execpath;
    const args = ["ci", ...(dev ? ["--include=dev"] : [])];
    const byNode = npm && /npm-cli\.c?js$/.test(npm);
    const { code, output } = await runCaptured(
      byNode ? process.execPath : "npm",
      byNode ? [npm, ...args] : args,
      { cwd: root, mayStop: true },
    );
    if (code !== 0) {
      throw new PlainError(`npm ci failed (exit code ${code}):\n${lastLines(output)}`);
    }
  } finally {
    lock.release();
  }
}

/**
 * Installs Debian packages as root; says what to run when this user may not.
 * @param names package names
 * @param what what is missing, in words
 */
export async function installDebianPackages(names, what) {
  const command = `apt-get install -y --no-install-recommends ${names.join(" ")}`;
  if (process.getuid?.() !== 0 || !existsSync("/usr/bin/apt-get")) {
    throw new PlainError(`${what} is missing. Run as root: apt-get update && ${command}`);
  }
  say(`Installing ${what} from Debian's packages …`);
  const env = { ...process.env, DEBIAN_FRONTEND: "noninteractive", LC_ALL: "C.UTF-8" };
  const patient = ["-o", "DPkg::Lock::Timeout=300", "-o", "Acquire::Retries=3"];
  const steps = [
    [...patient, "-qq", "update"],
    [...patient, "-qq", ...command.split(" ").slice(1)],
  ];
  for (const args of steps) {
    const { code, output } = await runCaptured("apt-get", args, {
      env,
      // Out of the terminal's reach: broken off half-way it would leave dpkg to be mended by hand.
      detached: true,
    });
    // A failed update alone may leave lists that still do: only the installation decides.
    if (code !== 0 && args !== steps[0]) {
      throw new PlainError(`${what} could not be installed (${command}):\n${lastLines(output, 6)}`);
    }
  }
}
