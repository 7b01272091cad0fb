import { type ChildProcess, spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, rmSync } from "node:fs";
import { resolve } from "node:path";
import { freePort, removeCluster } from "../../scripts/lib/postgres.mjs";
import { isAlive, processIdentity } from "../../scripts/lib/processes.mjs";

const root = resolve(import.meta.dirname, "../..");
const testData = resolve(root, ".test-data");
const READY_MS = 240_000;

async function removeData(folder: string): Promise<void> {
  await removeCluster(folder);
  rmSync(folder, { recursive: true, force: true });
}

/** Data of runs that were killed before their tear-down. */
async function removeLeftOvers(): Promise<void> {
  if (!existsSync(testData)) return;
  for (const name of readdirSync(testData)) {
    if (name.startsWith("e2e-") && !isAlive(name.slice(4))) {
      await removeData(resolve(testData, name));
    }
  }
}

function productEnvironment(extra: Record<string, string>): NodeJS.ProcessEnv {
  const foreign = /^(STRANDLINE_|PG[A-Z]|(DATABASE_URL|HOST|PORT|NODE_ENV)$)/;
  const own = Object.entries(process.env).filter(([name]) => !foreign.test(name));
  return { ...Object.fromEntries(own), ...extra };
}

function waitReady(child: ChildProcess, address: string): Promise<void> {
  return new Promise((ready, fail) => {
    let output = "";
    const lastOutput = () => output.slice(-3_000);
    const timer = setTimeout(
      () => fail(new Error(`the product was not ready in time:\n${lastOutput()}`)),
      READY_MS,
    );
    const read = (chunk: Buffer) => {
      output += chunk.toString();
      if (!output.includes(`Strandline is ready at ${address}`)) return;
      clearTimeout(timer);
      ready();
    };
    child.stdout?.on("data", read);
    child.stderr?.on("data", read);
    child.on("exit", (code) => {
      clearTimeout(timer);
      fail(new Error(`the product ended with ${code} before it was ready:\n${lastOutput()}`));
    });
  });
}

function stopProduct(child: ChildProcess): Promise<void> {
  return new Promise((done) => {
    if (child.exitCode !== null || child.signalCode !== null) return done();
    const timer = setTimeout(() => child.kill("SIGKILL"), 40_000);
    child.on("exit", () => {
      clearTimeout(timer);
      done();
    });
    child.kill("SIGTERM");
  });
}

/**
 * Starts the real product with `scripts/start.mjs` on a free port with data of its own, and tells
 * the tests where it is: E2E_BASE_URL, E2E_PASSWORD (of the demo accounts), E2E_DATA (its folder).
 */
async function globalSetup(): Promise<() => Promise<void>> {
  await removeLeftOvers();
  const data = resolve(testData, `e2e-${processIdentity(process.pid)}`);
  mkdirSync(data, { recursive: true, mode: 0o711 });
  const port = await freePort();
  const address = `http://127.0.0.1:${port}`;
  const password = randomBytes(18).toString("base64url");
  const child = spawn(process.execPath, ["scripts/start.mjs"], {
    cwd: root,
    env: productEnvironment({
      PORT: String(port),
      STRANDLINE_DATA: data,
      STRANDLINE_DEMO_PASSWORD: password,
      // The product ends by itself when the process that started it through npm is gone; this
      // run counts as npm, so that a killed test run leaves no server behind.
      npm_lifecycle_event: "test:e2e",
    }),
    stdio: ["ignore", "pipe", "pipe"],
  });
  const tearDown = async () => {
    await stopProduct(child);
    await removeData(data);
  };
  try {
    await waitReady(child, address);
  } catch (error) {
    await tearDown();
    throw error;
  }
  process.env.E2E_BASE_URL = address;
  process.env.E2E_PASSWORD = password;
  process.env.E2E_DATA = data;
  return tearDown;
}

// biome-ignore lint/style/noDefaultExport: Playwright loads a global set-up by its default export.
export default globalSetup;
