// npm run bench:compare [-- SIZE …]: the numeric core beside igraph and networkx in one run.
// Sizes are people: 5000, 10000, 100000, 1000000 (default all). Needs Debian's python3-igraph, and
// python3-networkx for one row.
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { runScript, say } from "./lib/plain.mjs";
import { projectRoot } from "./lib/project.mjs";

await runScript(async () => {
  checkNode();
  await ensurePackages(projectRoot, { dev: false });
  const { tsImport } = await import("tsx/esm/api");
  const { compareCore } = await tsImport("../bench/compare/compare-core.ts", import.meta.url);
  return await compareCore(process.argv.slice(2).map(Number).filter(Number.isInteger), say);
});
