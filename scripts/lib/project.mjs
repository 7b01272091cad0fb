// Where the project and its data live.
import { mkdirSync } from "node:fs";
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
  try {
    mkdirSync(dir, { recursive: true, mode: process.getuid?.() === 0 ? 0o711 : 0o700 });
  } catch (error) {
    throw new PlainError(`the data folder ${dir} cannot be made (${error.code})`);
  }
  return dir;
}
