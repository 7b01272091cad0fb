import { type ChildProcess, spawn } from "node:child_process";
import { resolve } from "node:path";
import { freePort } from "../../scripts/lib/postgres.mjs";

const ROOT = resolve(import.meta.dirname, "../..");

/** The real server as a process of its own. */
export interface BenchServer {
  child: ChildProcess;
  origin: string;
  /** From spawn to its ready line, ms. */
  readyMs: number;
}

/**
 * Starts the server on a database, on a free port of loopback.
 *
 * @param folder data folder with the secrets of that database
 * @param nodeOptions options for Node.js, e.g. to profile
 */
export async function startServer(
  databaseUrl: string,
  folder: string,
  nodeOptions: readonly string[] = [],
): Promise<BenchServer> {
  const port = await freePort();
  const started = performance.now();
  const child = spawn(process.execPath, ["--import", "tsx", ...nodeOptions, "server/main.ts"], {
    cwd: ROOT,
    stdio: ["ignore", "pipe", "inherit"],
    env: {
      ...process.env,
      NODE_ENV: "production",
      PORT: String(port),
      HOST: "127.0.0.1",
      DATABASE_URL: databaseUrl,
      STRANDLINE_DATA: folder,
      STRANDLINE_DEMO: "0",
      STRANDLINE_LOG_LEVEL: "warn",
    },
  });
  await new Promise<void>((done, fail) => {
    child.once("exit", () => fail(new Error("the server ended before it was ready")));
    child.stdout?.on("data", (chunk: Buffer) => chunk.includes("is ready") && done());
  });
  return {
    child,
    origin: `http://127.0.0.1:${port}`,
    readyMs: Math.round(performance.now() - started),
  };
}

/** Ends a server and waits until it is gone. */
export async function stopServer({ child }: Pick<BenchServer, "child">): Promise<void> {
  if (child.exitCode !== null) return;
  const ended = new Promise<void>((done) => child.once("exit", () => done()));
  child.kill("SIGTERM");
  await ended;
}
