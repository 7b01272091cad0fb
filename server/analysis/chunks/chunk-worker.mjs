// A worker thread does not inherit the loader that reads TypeScript, so it brings its own.
import { register } from "tsx/esm/api";

register();
await import("./chunk-thread.ts");
