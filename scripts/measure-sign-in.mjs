// npm run measure:sign-in [-- PAIRS]: whether the time of a sign-in or of a reset request tells known
// addresses from unknown ones. Prints one JSON object; PAIRS is 20 to 2000 (default 500).
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { PlainError, runScript } from "./lib/plain.mjs";
import { ensurePostgres } from "./lib/postgres-programs.mjs";
import { projectRoot } from "./lib/project.mjs";

await runScript(async () => {
  checkNode();
  const [given = "500", ...more] = process.argv.slice(2);
  const pairs = /^\d{1,4}$/.test(given) ? Number(given) : 0;
  if (more.length > 0 || pairs < 20 || pairs > 2000) {
    throw new PlainError("measure:sign-in takes one whole number of pairs, 20 to 2000");
  }
  await ensurePackages(projectRoot, { dev: true });
  await ensurePostgres();
  const { tsImport } = await import("tsx/esm/api");
  const { measureSignIn } = await tsImport("../bench/sign-in.ts", import.meta.url);
  process.stdout.write(`${JSON.stringify(await measureSignIn(pairs), null, 2)}\n`);
  return 0;
});
