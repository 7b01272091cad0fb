import { spawn, spawnSync } from "node:child_process";
import { once } from "node:events";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { LockHeldError, takeLock } from "../../scripts/lib/locks.mjs";
import { packagesComplete } from "../../scripts/lib/packages.mjs";
import { freePort } from "../../scripts/lib/postgres.mjs";
import { isAlive, processIdentity } from "../../scripts/lib/processes.mjs";

const root = resolve(import.meta.dirname, "../..");
const folder = mkdtempSync(join(tmpdir(), "strandline-scripts-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function start(env: Record<string, string>, args: string[] = []) {
  const run = spawnSync(process.execPath, ["scripts/start.mjs", ...args], {
    cwd: root,
    env: { PATH: process.env.PATH, STRANDLINE_DATA: join(folder, "data"), ...env },
    encoding: "utf8",
    timeout: 20_000,
  });
  return { code: run.status, out: run.stdout, lines: run.stderr.trimEnd().split("\n") };
}

describe("processes", () => {
  it("tells a living process from a recycled pid and from a dead one", async () => {
    const child = spawn(process.execPath, ["-e", "setTimeout(() => {}, 60000)"]);
    const identity = processIdentity(child.pid ?? 0);
    expect(isAlive(identity)).toBe(true);
    expect(isAlive(`${child.pid}:1`)).toBe(false);
    child.kill("SIGKILL");
    await once(child, "exit");
    expect(isAlive(identity)).toBe(false);
    expect(isAlive(undefined)).toBe(false);
  });
});

describe("locks", () => {
  it("has one owner, who may be waited for", async () => {
    const file = join(folder, "one.lock");
    const first = await takeLock(file, () => 0);
    await expect(takeLock(file, () => 100)).rejects.toBeInstanceOf(LockHeldError);
    first.update({ note: "stopping" });
    const waiting = takeLock(file, (holder) => (holder.note === "stopping" ? 10_000 : 0));
    first.release();
    const second = await waiting;
    second.release();
    expect(existsSync(file)).toBe(false);
  });

  it("passes from a dead owner, a recycled pid and a damaged file to the next", async () => {
    const file = join(folder, "stale.lock");
    const stale = [
      JSON.stringify({ pid: 999_999_999, identity: "999999999:1" }),
      JSON.stringify({ pid: process.pid, identity: `${process.pid}:1` }),
      "{",
    ];
    for (const text of stale) {
      writeFileSync(file, text);
      const lock = await takeLock(file, () => 0);
      expect(JSON.parse(readFileSync(file, "utf8")).identity).toBe(processIdentity(process.pid));
      lock.release();
    }
  });

  it("is held by one at a time when several want it at once", async () => {
    const file = join(folder, "many.lock");
    writeFileSync(file, JSON.stringify({ pid: 1, identity: "1:never" }));
    let holders = 0;
    let most = 0;
    const work = async () => {
      const lock = await takeLock(file, () => 20_000);
      holders += 1;
      most = Math.max(most, holders);
      await new Promise((done) => setTimeout(done, 5));
      holders -= 1;
      lock.release();
    };
    await Promise.all(Array.from({ length: 8 }, work));
    expect(most).toBe(1);
  });
});

describe("npm packages", () => {
  const project = join(folder, "project");
  const entry = { version: "1.0.0" };

  function install(wanted: Record<string, object>, have: Record<string, object> | undefined) {
    rmSync(project, { recursive: true, force: true });
    mkdirSync(join(project, "node_modules"), { recursive: true });
    writeFileSync(
      join(project, "package-lock.json"),
      JSON.stringify({ packages: { "": {}, ...wanted } }),
    );
    if (!have) return;
    for (const path of Object.keys(have)) mkdirSync(join(project, path), { recursive: true });
    writeFileSync(
      join(project, "node_modules/.package-lock.json"),
      JSON.stringify({ packages: have }),
    );
  }

  it("are complete when every package of the lock is there in its version", () => {
    install({ "node_modules/a": entry }, { "node_modules/a": entry });
    expect(packagesComplete(project, { dev: true })).toBe(true);
    rmSync(join(project, "node_modules/a"), { recursive: true });
    expect(packagesComplete(project, { dev: true })).toBe(false);
  });

  it("are incomplete after a broken-off installation and with another version", () => {
    install({ "node_modules/a": entry }, undefined);
    expect(packagesComplete(project, { dev: true })).toBe(false);
    install({ "node_modules/a": entry }, { "node_modules/a": { version: "0.9.0" } });
    expect(packagesComplete(project, { dev: true })).toBe(false);
  });

  it("may lack other platforms' packages, and those of development when only started", () => {
    install(
      {
        "node_modules/a": entry,
        "node_modules/b": { ...entry, optional: true },
        "node_modules/c": { ...entry, dev: true },
      },
      { "node_modules/a": entry },
    );
    expect(packagesComplete(project, { dev: false })).toBe(true);
    expect(packagesComplete(project, { dev: true })).toBe(false);
  });
});

describe("npm start", () => {
  it.each([
    [{ PORT: "abc" }, "PORT"],
    [{ HOST: "0.0.0.0" }, "STRANDLINE_PUBLIC_URL"],
    [{ STRANDLINE_NEW: "1" }, "STRANDLINE_NEW"],
    [{ STRANDLINE_DATA: "/dev/null/data" }, "data folder"],
    [{ DATABASE_URL: "file:///etc/passwd" }, "DATABASE_URL"],
  ])("stops with one line and touches nothing for %j", (env, word) => {
    const { code, out, lines } = start(env as Record<string, string>);
    expect(code).toBe(1);
    expect(out).toBe("");
    expect(lines).toHaveLength(1);
    expect(lines[0]).toMatch(/^strandline: /);
    expect(lines[0]).toContain(word);
    expect(existsSync(join(folder, "data"))).toBe(false);
  });

  it("stops with one line for an unknown argument", () => {
    expect(start({}, ["--devel"])).toMatchObject({
      code: 1,
      lines: ["strandline: unknown argument --devel; only --dev is known"],
    });
  });

  it("names a port that another program holds", async () => {
    const port = await freePort();
    const other = createServer();
    other.listen(port, "127.0.0.1");
    await once(other, "listening");
    const { code, lines } = start({ PORT: String(port) });
    other.close();
    expect(code).toBe(1);
    expect(lines).toEqual([
      `strandline: port ${port} on 127.0.0.1 is taken by another program; set PORT to a free one`,
    ]);
  });

  it("leaves a running start alone and says where it is", async () => {
    const data = join(folder, "busy");
    mkdirSync(data);
    const lock = await takeLock(join(data, "start.lock"), () => 0);
    lock.update({ address: "http://127.0.0.1:4799" });
    const { code, lines } = start({ STRANDLINE_DATA: data });
    lock.release();
    expect(code).toBe(1);
    expect(lines).toHaveLength(1);
    expect(lines[0]).toContain(`process ${process.pid}, http://127.0.0.1:4799`);
  });
});
