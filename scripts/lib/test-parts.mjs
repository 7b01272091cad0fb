// The parts of `npm test`: how each is run and how its result is counted.
import { spawn } from "node:child_process";
import { mkdirSync, readFileSync, rmSync } from "node:fs";
import { join } from "node:path";
import { say } from "./plain.mjs";
import { projectRoot } from "./project.mjs";

const RESULTS = join(projectRoot, ".test-data", "results");
const PROGRAMS = {
  biome: "node_modules/@biomejs/biome/bin/biome",
  tsc: "node_modules/typescript/bin/tsc",
  vitest: "node_modules/vitest/vitest.mjs",
  playwright: "node_modules/@playwright/test/cli.js",
};
const MINUTE = 60_000;

/** The caller's settings must not lead a test to the caller's database or server. */
function testEnvironment(extra) {
  const foreign =
    /^(STRANDLINE_|PG[A-Z]|VITEST|PLAYWRIGHT_|E2E_|(DATABASE_URL|PORT|HOST|NODE_ENV)$)/;
  const own = Object.entries(process.env).filter(([name]) => !foreign.test(name));
  return { ...Object.fromEntries(own), ...extra };
}

/**
 * Runs one program of node_modules with its output shown.
 * @returns {Promise<string | undefined>} undefined when it ended with 0, else why not
 */
function show(program, args, { minutes, env, running }) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [PROGRAMS[program], ...args], {
      cwd: projectRoot,
      env: testEnvironment(env),
      stdio: ["ignore", "inherit", "inherit"],
      detached: true,
    });
    running.child = child;
    const end = (signal) => {
      try {
        process.kill(-child.pid, signal);
      } catch (error) {
        if (error.code !== "ESRCH") throw error;
      }
    };
    let late = false;
    const timers = [
      setTimeout(() => {
        late = true;
        // The program alone first: its own clean-up stops what it started.
        child.kill("SIGINT");
      }, minutes * MINUTE),
      setTimeout(() => end("SIGKILL"), minutes * MINUTE + 30_000),
    ];
    const done = (why) => {
      timers.forEach(clearTimeout);
      running.child = undefined;
      resolve(late ? `not ready after ${minutes} minutes` : why);
    };
    child.on("error", (error) => done(error.message));
    child.on("exit", (code, signal) => done(code === 0 ? undefined : (signal ?? `exit ${code}`)));
  });
}

async function check(program, args, running) {
  const trouble = await show(program, args, { minutes: 8, running });
  return trouble
    ? { passed: 0, failed: 1, skipped: [], faults: [`${program}: ${trouble}`] }
    : { passed: 1, failed: 0, skipped: [], faults: [] };
}

function readResults(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch {
    return undefined;
  }
}

/** A part that crashed, or that ran no test at all, has failed whatever it counted. */
function settle(name, counted, trouble) {
  const results = counted ?? { passed: 0, failed: 0, skipped: [], faults: [] };
  const faults = [...results.faults];
  if (results.failed === 0 && faults.length === 0) {
    if (trouble) faults.push(`${name}: ${trouble}`);
    else if (results.passed === 0) faults.push(`${name}: no test was run`);
  }
  return { ...results, failed: results.failed + faults.length, faults };
}

async function vitest(name, args, { minutes, zone, running }) {
  const file = join(RESULTS, `${name.replaceAll("/", "-")}.json`);
  rmSync(file, { force: true });
  const env = { VITEST_RESULTS: file, ...(zone ? { TZ: zone } : {}) };
  const reporters = ["--reporter=default", "--reporter=./scripts/lib/vitest-results.mjs"];
  const trouble = await show("vitest", ["run", ...args, ...reporters], { minutes, env, running });
  return settle(name, readResults(file), trouble);
}

function* playwrightTests(suite, path = []) {
  const here = suite.title ? [...path, suite.title] : path;
  for (const spec of suite.specs ?? []) {
    for (const test of spec.tests) yield { name: [...here, spec.title].join(" > "), test };
  }
  for (const inner of suite.suites ?? []) yield* playwrightTests(inner, here);
}

function countPlaywright(report) {
  if (!report) return undefined;
  const results = { passed: 0, failed: 0, skipped: [], faults: [] };
  for (const suite of report.suites) {
    for (const { name, test } of playwrightTests(suite)) {
      if (test.status === "expected") results.passed += 1;
      else if (test.status === "skipped") {
        const reason = test.annotations.find((a) => a.type === "skip" || a.type === "fixme");
        results.skipped.push({ name, reason: reason?.description });
      } else results.failed += 1;
    }
  }
  for (const error of report.errors) {
    results.faults.push(`e2e: ${String(error.message).split("\n")[0]}`);
  }
  return results;
}

async function e2e(running) {
  const file = join(RESULTS, "e2e.json");
  rmSync(file, { force: true });
  const trouble = await show("playwright", ["test"], {
    minutes: 20,
    env: { E2E_RESULTS: file },
    running,
  });
  return settle("e2e", countPlaywright(readResults(file)), trouble);
}

const zones = ["Pacific/Kiritimati", "America/Los_Angeles"];

/** Name → steps; each step is [title, run(running) → {passed, failed, skipped, faults}]. */
const PARTS = {
  checks: [
    ["lint and format (Biome)", (running) => check("biome", ["check", "."], running)],
    ["types (TypeScript)", (running) => check("tsc", ["--noEmit", "-p", "."], running)],
  ],
  core: [
    [
      "core, architecture and client",
      (running) =>
        vitest("core", ["--project", "core", "--project", "client"], { minutes: 12, running }),
    ],
  ],
  api: [
    [
      "API, policy and server",
      (running) => vitest("api", ["--project", "api"], { minutes: 25, running }),
    ],
    ...zones.map((zone) => [
      `API under TZ=${zone}`,
      (running) =>
        vitest(`api in ${zone}`, ["--project", "api", ".zones.test.ts"], {
          minutes: 8,
          zone,
          running,
        }),
    ]),
  ],
  e2e: [["browser", e2e]],
};

/** Names of the parts a caller may choose. */
export const partNames = Object.keys(PARTS).filter((name) => name !== "checks");

/**
 * Runs the parts in order and adds their counts up.
 * @param names of PARTS
 * @param running `child` is set to the process that runs now
 */
export async function runParts(names, running) {
  mkdirSync(RESULTS, { recursive: true });
  const total = { passed: 0, failed: 0, skipped: [], faults: [] };
  for (const [title, run] of names.flatMap((name) => PARTS[name])) {
    say(`\n── ${title}`);
    const results = await run(running);
    total.passed += results.passed;
    total.failed += results.failed;
    total.skipped.push(...results.skipped);
    total.faults.push(...results.faults);
    if (running.stopped) break;
  }
  return total;
}
