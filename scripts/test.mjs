// npm test [core|api|e2e]: set-up, every part, one plain line of counts at the end.
import { existsSync } from "node:fs";
import { join } from "node:path";
import { LockHeldError, takeLock } from "./lib/locks.mjs";
import { checkNode, ensurePackages, installDebianPackages } from "./lib/packages.mjs";
import { PlainError, runScript, say } from "./lib/plain.mjs";
import { settlePlace } from "./lib/postgres-place.mjs";
import { ensurePostgres } from "./lib/postgres-programs.mjs";
import { makeDataFolder, projectRoot } from "./lib/project.mjs";
import { partNames, runParts } from "./lib/test-parts.mjs";

const CHROMIUM = "/usr/bin/chromium";

function chooseParts(args) {
  const unknown = args.find((arg) => !partNames.includes(arg));
  if (unknown !== undefined || args.length > 1) {
    throw new PlainError(`usage: test [${partNames.join("|")}]`);
  }
  return args.length === 1 ? args : ["checks", ...partNames];
}

/** Fails with one line when a tool is missing and cannot be installed: no test is skipped for it. */
async function setUp(parts) {
  await ensurePackages(projectRoot, { dev: true });
  if (parts.includes("api") || parts.includes("e2e")) {
    await ensurePostgres();
    await settlePlace(join(projectRoot, ".test-data"), { throwAway: true });
  }
  if (parts.includes("e2e") && !existsSync(CHROMIUM)) {
    await installDebianPackages(["chromium", "fonts-liberation"], "Chromium");
  }
}

function stopOnSignal(running) {
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) {
    process.on(signal, () => {
      running.stopped = true;
      running.child?.kill("SIGINT");
    });
  }
}

/** Two runs of a part would write over each other's results. */
async function lockParts(parts) {
  const folder = makeDataFolder(join(projectRoot, ".test-data"));
  const locks = [];
  for (const part of parts) {
    try {
      locks.push(await takeLock(join(folder, `test-${part}.lock`), () => 0));
    } catch (error) {
      if (!(error instanceof LockHeldError)) throw error;
      throw new PlainError(`the ${part} tests already run (process ${error.holder.pid})`);
    }
  }
  process.on("exit", () => {
    for (const lock of locks) lock.release();
  });
}

await runScript(async () => {
  const parts = chooseParts(process.argv.slice(2));
  checkNode();
  await lockParts(parts);
  await setUp(parts);
  const running = { child: undefined, stopped: false };
  stopOnSignal(running);
  const { passed, failed, skipped, faults } = await runParts(parts, running);
  if (faults.length > 0 || skipped.length > 0) say("");
  for (const fault of faults) say(`fault: ${fault}`);
  for (const { name, reason } of skipped) say(`skipped: ${name}: ${reason ?? "no reason given"}`);
  if (running.stopped) say("stopped before the end");
  say("");
  say(
    `${passed} passed, ${failed} failed${skipped.length > 0 ? `, ${skipped.length} skipped` : ""}`,
  );
  return failed > 0 || running.stopped ? 1 : 0;
});
