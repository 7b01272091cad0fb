// npm run --silent measure -- --pairs FILE [--people FILE] [--population N] [--seed N]
// The network report of one or two CSV files, without a database. Works on a fresh clone.
// Standard output carries the JSON and nothing else.
import { checkNode, ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/plain.mjs";
import { projectRoot } from "./lib/project.mjs";

/** Runs `work` with everything it says on standard output sent to standard error instead. */
async function aside(work) {
  const write = process.stdout.write;
  process.stdout.write = process.stderr.write.bind(process.stderr);
  try {
    return await work();
  } finally {
    process.stdout.write = write;
  }
}

/** npm runs scripts in the project's folder and tells the caller's; a direct call is in it. */
function callersFolder() {
  const { npm_lifecycle_event: event, INIT_CWD: folder } = process.env;
  return event === "measure" && folder ? folder : process.cwd();
}

await runScript(async () => {
  checkNode();
  await aside(() => ensurePackages(projectRoot, { dev: false }));
  const { tsImport } = await import("tsx/esm/api");
  const { measure } = await tsImport("./measure/measure.ts", import.meta.url);
  const { output, complaints, code } = measure(process.argv.slice(2), callersFolder());
  if (complaints.length > 0) process.stderr.write(`${complaints.join("\n")}\n`);
  if (output !== null) process.stdout.write(`${output}\n`);
  return code;
});
