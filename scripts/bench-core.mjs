// npm run --silent bench:core -- --pairs FILE [--only NAME,NAME]
// Times of the numeric core on the pairs of a file, as one JSON object.
import { aside, callersFolder, printEnd } from "./lib/output.mjs";
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/plain.mjs";
import { projectRoot } from "./lib/project.mjs";

await runScript(async () => {
  checkNode();
  await aside(() => ensurePackages(projectRoot, { dev: false }));
  const { tsImport } = await import("tsx/esm/api");
  const { benchCore } = await tsImport("../bench/core/bench-core.ts", import.meta.url);
  return printEnd(await benchCore(process.argv.slice(2), callersFolder("bench:core")));
});
