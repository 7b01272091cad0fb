// npm run --silent measure -- --pairs FILE [--people FILE] [--population N] [--attribute COLUMN]
//   [--replicates N] [--seed N] [--workers N] [--only NAME,NAME]
// The network report of one or two CSV files, without a database. Works on a fresh clone.
// Standard output carries the JSON and nothing else.
import { aside, callersFolder, printEnd } from "./lib/output.mjs";
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/plain.mjs";
import { projectRoot } from "./lib/project.mjs";

await runScript(async () => {
  checkNode();
  await aside(() => ensurePackages(projectRoot, { dev: false }));
  const { tsImport } = await import("tsx/esm/api");
  const { measure } = await tsImport("./measure/measure.ts", import.meta.url);
  return printEnd(await measure(process.argv.slice(2), callersFolder("measure")));
});
