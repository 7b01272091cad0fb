import { type ChildProcess, spawn } from "node:child_process";
import { resolve } from "node:path";
import { freePort } from "../../scripts/lib/postgres.mjs";
import { BenchClient } from "./http-client.ts";
import { type BenchRole, FOLDER, PASSWORD } from "./prepare.ts";

const ROOT = resolve(import.meta.dirname, "../..");

/** Starts the real server on a database; ready when it says so. */
export async function startServer(
  databaseUrl: string,
): Promise<{ child: ChildProcess; origin: string; readyMs: number }> {
  const port = await freePort();
  const started = performance.now();
  const child = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], {
    cwd: ROOT,
    stdio: ["ignore", "pipe", "inherit"],
    env: {
      ...process.env,
      NODE_ENV: "production",
      PORT: String(port),
      HOST: "127.0.0.1",
      DATABASE_URL: databaseUrl,
      STRANDLINE_DATA: FOLDER,
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

/** Ends it and waits until it has gone. */
export async function stopServer(child: ChildProcess): Promise<void> {
  const ended = new Promise<void>((done) => child.once("exit", () => done()));
  child.kill("SIGTERM");
  await ended;
}

/** Signs in as the account of a role and acts in it. */
export async function signIn(origin: string, role: BenchRole): Promise<BenchClient> {
  const client = new BenchClient(origin);
  await client.call("POST", "/api/session", { email: `${role}@bench.example`, password: PASSWORD });
  return client;
}
