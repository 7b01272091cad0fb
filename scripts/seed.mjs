// npm run seed -- --people N --investigation NAME: loads an invented outbreak of any size into a new
// investigation of this installation, whether it runs or not.
import { existsSync } from "node:fs";
import { join } from "node:path";
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { complain, PlainError, runScript, say } from "./lib/plain.mjs";
import { startCluster, stopCluster } from "./lib/postgres.mjs";
import { dataFolder, projectRoot } from "./lib/project.mjs";
import { checkSettings } from "./lib/settings.mjs";

await runScript(async () => {
  checkNode();
  checkSettings(process.env);
  await ensurePackages(projectRoot, { dev: false });
  const { tsImport } = await import("tsx/esm/api");
  const { readArguments, USAGE } = await tsImport("./seed/read-arguments.ts", import.meta.url);
  const args = process.argv.slice(2);
  try {
    if (!readArguments(args)) {
      say(USAGE);
      return 0;
    }
  } catch (error) {
    throw new PlainError(`${error.message.split("\n")[0]}; --help tells the options`);
  }
  const data = dataFolder(process.env);
  if (!existsSync(join(data, "secrets.json"))) {
    throw new PlainError(`${data} holds no installation; run npm start once first`);
  }
  const { seed } = await tsImport("./seed/seed.ts", import.meta.url);
  const given = process.env.DATABASE_URL;
  const cluster = given ? undefined : await startCluster(data);
  let broken = false;
  // Broken off, nothing stays behind: no half-loaded data (one transaction), no database running.
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) {
    process.on(signal, () => {
      if (broken) return;
      broken = true;
      complain("broken off; nothing was loaded");
      const stopped = cluster ? stopCluster(data) : Promise.resolve();
      void stopped.finally(() => process.exit(1));
    });
  }
  try {
    const trouble = await seed(given ?? cluster.url, data, args, say);
    if (trouble) throw new PlainError(trouble);
    return 0;
  } finally {
    if (cluster) await stopCluster(data);
  }
});
