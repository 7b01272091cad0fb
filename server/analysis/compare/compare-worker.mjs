import { setPriority } from "node:os";
// A worker thread does not inherit the loader that reads TypeScript, so it brings its own.
import { register } from "tsx/esm/api";

// On Linux this is the priority of the thread alone: people who work go before a comparison.
if (process.platform === "linux") setPriority(10);
register();
await import("./compare-jobs.ts");
