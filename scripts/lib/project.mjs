// Where the project and its data live.
import { accessSync, constants, existsSync, mkdirSync, statSync } from "node:fs";
import { dirname, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { PlainError } from "./plain.mjs";

/** Top folder of the checkout. */
export const projectRoot = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

/** Folder of the data: STRANDLINE_DATA (relative to the caller's folder) or `.data`. */
export function dataFolder(env) {
  if (!env.STRANDLINE_DATA) return resolve(projectRoot, ".data");
  return resolve(env.INIT_CWD ?? process.cwd(), env.STRANDLINE_DATA);
}

/**
 * Makes a data folder. Root's may be passed through (not listed) by the database's own user;
 * an existing folder keeps its rights.
 */
export function makeDataFolder(dir) {
  const mode = process.getuid?.() === 0 ? 0o711 : 0o700;
  // One level at a time: Node's recursive mkdir never ends where the system refuses with ENOENT.
  const missing = [];
  for (let path = dir; !existsSync(path) && path !== dirname(path); path = dirname(path)) {
    missing.unshift(path);
  }
  try {
    for (const path of missing) makeFolder(path, mode);
    if (!statSync(dir).isDirectory()) throw Object.assign(new Error(), { code: "ENOTDIR" });
  } catch (error) {
    throw new PlainError(`the data folder ${dir} cannot be made (${error.code})`);
  }
  try {
    accessSync(dir, constants.W_OK | constants.X_OK);
  } catch {
    throw new PlainError(
      `the data folder ${dir} belongs to another user; start as that user or set STRANDLINE_DATA to a folder of your own`,
    );
  }
  return dir;
}

function makeFolder(path, mode) {
  try {
    mkdirSync(path, { mode });
  } catch (error) {
    if (error.code !== "EEXIST") throw error;
  }
}
