import { existsSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join, resolve } from "node:path";
import pg from "pg";
import { afterAll, describe, expect, it } from "vitest";
import {
  removeCluster,
  runningCluster,
  startCluster,
  stopCluster,
} from "../../scripts/lib/postgres.mjs";
import { isAlive } from "../../scripts/lib/processes.mjs";

// A cluster of its own, since it is killed again and again; as durable as the real one.
const folder = resolve(import.meta.dirname, "../../.test-data", `cluster-${process.pid}`);
afterAll(async () => {
  await removeCluster(folder);
  rmSync(folder, { recursive: true, force: true });
});

async function ask(url: string, text: string): Promise<unknown[]> {
  const client = new pg.Client({ connectionString: url });
  client.on("error", () => {});
  await client.connect();
  try {
    return (await client.query({ text, rowMode: "array" })).rows.flat();
  } finally {
    await client.end();
  }
}

async function killServer(identity: string): Promise<void> {
  process.kill(Number.parseInt(identity, 10), "SIGKILL");
  for (let turn = 0; isAlive(identity) && turn < 200; turn += 1) {
    await new Promise((done) => setTimeout(done, 10));
  }
}

describe("private cluster", () => {
  it("is made once, on loopback, with a password and a silent log", async () => {
    expect(await runningCluster(folder)).toBeUndefined();
    const first = await startCluster(folder);
    expect(first.reused).toBe(false);
    const second = await startCluster(folder);
    expect(second).toMatchObject({ reused: true, url: first.url, identity: first.identity });
    const settings = await ask(
      first.url,
      `select name || '=' || setting from pg_settings where name in ('listen_addresses',
        'unix_socket_directories', 'log_error_verbosity', 'log_min_error_statement',
        'log_parameter_max_length', 'log_parameter_max_length_on_error', 'fsync',
        'data_checksums', 'log_statement') order by name`,
    );
    expect(settings).toEqual([
      "data_checksums=on",
      "fsync=on",
      "listen_addresses=127.0.0.1",
      "log_error_verbosity=terse",
      "log_min_error_statement=panic",
      "log_parameter_max_length=0",
      "log_parameter_max_length_on_error=0",
      "log_statement=none",
      "unix_socket_directories=",
    ]);
    const wrong = new URL(first.url);
    wrong.password = "guess";
    await expect(ask(wrong.href, "select 1")).rejects.toMatchObject({ code: "28P01" });
  });

  it("writes no value of a failed statement to its log", async () => {
    const cluster = await startCluster(folder);
    await ask(cluster.url, "create table canary (name text primary key)");
    await ask(cluster.url, "insert into canary values ('Canary Quillfeather')");
    await expect(
      ask(cluster.url, "insert into canary values ('Canary Quillfeather')"),
    ).rejects.toMatchObject({ code: "23505" });
    const log = readFileSync(join(cluster.dir, "log"), "utf8");
    expect(log).toContain("duplicate key");
    expect(log).not.toContain("Quillfeather");
  });

  it("recovers from kill -9 with its data, on the same port", async () => {
    const cluster = await startCluster(folder);
    await killServer(cluster.identity);
    expect(await runningCluster(folder)).toBeUndefined();
    const again = await startCluster(folder);
    expect(again).toMatchObject({ reused: false, port: cluster.port });
    expect(await ask(again.url, "select name from canary")).toEqual(["Canary Quillfeather"]);
  });

  it("is not fooled by a pid file that names a stranger", async () => {
    const cluster = await startCluster(folder);
    await killServer(cluster.identity);
    const pidFile = join(cluster.dir, "data", "postmaster.pid");
    const lines = readFileSync(pidFile, "utf8").split("\n");
    writeFileSync(pidFile, [String(process.pid), ...lines.slice(1)].join("\n"));
    const again = await startCluster(folder);
    expect(await ask(again.url, "select count(*)::int from canary")).toEqual([1]);
  });

  it("starts one server for several that ask at once, and stops with the last", async () => {
    expect(await stopCluster(folder)).toBe(true);
    const all = await Promise.all([1, 2, 3].map(() => startCluster(folder)));
    expect(new Set(all.map((cluster) => cluster.identity)).size).toBe(1);
    expect(await stopCluster(folder)).toBe(true);
    expect(await runningCluster(folder)).toBeUndefined();
  });

  it("makes a half-made cluster anew and refuses one of somebody else", async () => {
    const cluster = await startCluster(folder);
    await stopCluster(folder);
    const data = join(cluster.dir, "data");
    rmSync(join(data, "strandline-complete"));
    await expect(startCluster(folder)).rejects.toThrow("did not make");
    rmSync(join(data, "postmaster.opts"));
    rmSync(join(data, "global"), { recursive: true });
    const again = await startCluster(folder);
    expect(existsSync(join(data, "strandline-complete"))).toBe(true);
    expect(await ask(again.url, "select to_regclass('canary')")).toEqual([null]);
  });
});
