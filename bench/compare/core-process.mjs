// bench:core in a process of its own, with the most memory it held: core-process.mjs FILE NAMES
import { tsImport } from "tsx/esm/api";

const { benchCore } = await tsImport("../core/bench-core.ts", import.meta.url);
const [file, names] = process.argv.slice(2);
const { output, complaints } = await benchCore(["--pairs", file, "--only", names], process.cwd());
if (output === null) throw new Error(complaints.join("; "));
const times = JSON.parse(output);
// maxRSS is in kilobytes.
const megabytes = Math.round(process.resourceUsage().maxRSS / 1024);
process.stdout.write(JSON.stringify({ times, megabytes }));
