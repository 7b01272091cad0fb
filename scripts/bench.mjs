// npm run bench [-- SIZE …]: measures the running product on a private database of its own and
// prints one JSON object. Sizes are people on record (default 1000 10000 100000).
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/plain.mjs";
import { ensurePostgres } from "./lib/postgres-programs.mjs";
import { projectRoot } from "./lib/project.mjs";

await runScript(async () => {
  checkNode();
  await ensurePackages(projectRoot, { dev: true });
  await ensurePostgres();
  const { tsImport } = await import("tsx/esm/api");
  const { benchProduct } = await tsImport("../bench/product.ts", import.meta.url);
  const sizes = process.argv.slice(2).map(Number).filter(Number.isInteger);
  const result = await benchProduct(sizes.length > 0 ? sizes : [1000, 10_000, 100_000]);
  process.stdout.write(`${JSON.stringify(result, null, 2)}\n`);
  return 0;
});
