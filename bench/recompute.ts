import { readFileSync } from "node:fs";
import { isDeepStrictEqual } from "node:util";
import { recompute } from "../server/analysis/compare/recompute.ts";
import { comparisonFile } from "../server/analysis/compare/run-file.ts";
import { CORE_VERSION } from "../shared/core/index.ts";

// npx tsx bench/recompute.ts FILE: works a downloaded comparison out again and says whether every
// figure is the same. Ends with 0 when it is.
const [path] = process.argv.slice(2);
if (!path) throw new Error("give the file of a comparison");
const file = comparisonFile.parse(JSON.parse(readFileSync(path, "utf8")));
// As JSON, since that is what was stored.
const result: unknown = JSON.parse(JSON.stringify(recompute(file)));
const same = isDeepStrictEqual(result, file.result);
process.stdout.write(
  `${JSON.stringify({ same, replicates: file.run.replicates, coreOfFile: file.method.coreVersion, core: CORE_VERSION })}\n`,
);
process.exitCode = same ? 0 : 1;
