// The client in dist/, built again when one of its sources has changed.
import { createHash } from "node:crypto";
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { join, relative } from "node:path";
import { brotliCompressSync, constants, gzipSync } from "node:zlib";
import { takeLock } from "./locks.mjs";
import { PlainError, say } from "./plain.mjs";
import { firstLines, runCaptured } from "./processes.mjs";
import { makeDataFolder } from "./project.mjs";

// This file too: what it writes beside the build belongs to it.
const SOURCES = [
  "scripts/lib/client-build.mjs",
  "src",
  "shared",
  "public",
  "index.html",
  "package-lock.json",
  "tsconfig.json",
];

function* filesUnder(path) {
  if (!existsSync(path)) return;
  if (!statSync(path).isDirectory()) {
    yield path;
    return;
  }
  for (const name of readdirSync(path).sort()) yield* filesUnder(join(path, name));
}

/** Hash over every file the build reads: names and contents. */
function hashSources(root) {
  const configs = readdirSync(root).filter((n) => /^(vite|tailwind|postcss)\.config\./.test(n));
  const hash = createHash("sha256");
  for (const source of [...SOURCES, ...configs.sort()]) {
    for (const file of filesUnder(join(root, source))) {
      const content = readFileSync(file);
      hash.update(`${relative(root, file)}\0${content.length}\0`).update(content);
    }
  }
  return hash.digest("hex");
}

function isFresh(stamp, wanted) {
  return existsSync(stamp) && readFileSync(stamp, "utf8") === wanted;
}

/** Writes each text file's Brotli and gzip forms beside it, once, at the highest settings. */
function compressFiles(folder) {
  const quality = { params: { [constants.BROTLI_PARAM_QUALITY]: constants.BROTLI_MAX_QUALITY } };
  for (const file of [...filesUnder(folder)]) {
    if (!/\.(js|css|svg|html|webmanifest)$/.test(file)) continue;
    const content = readFileSync(file);
    writeFileSync(`${file}.br`, brotliCompressSync(content, quality));
    writeFileSync(`${file}.gz`, gzipSync(content, { level: 9 }));
  }
}

/** Builds the client with Vite when dist/ does not come from the present sources. */
export async function ensureClientBuild(root) {
  const stamp = join(root, "dist", ".stamp");
  if (isFresh(stamp, hashSources(root))) return;
  const folder = makeDataFolder(join(root, ".data"));
  const lock = await takeLock(join(folder, "build.lock"), () => 300_000);
  try {
    const wanted = hashSources(root);
    if (isFresh(stamp, wanted)) return;
    say("Building the client …");
    rmSync(stamp, { force: true });
    const vite = join(root, "node_modules", "vite", "bin", "vite.js");
    const { code, output } = await runCaptured(process.execPath, [vite, "build"], {
      cwd: root,
      env: { ...process.env, NODE_ENV: "production", NO_COLOR: "1" },
      timeoutMs: 300_000,
      mayStop: true,
    });
    if (code !== 0) throw new PlainError(`the client build failed:\n${firstLines(output)}`);
    compressFiles(join(root, "dist", "client"));
    writeFileSync(stamp, wanted);
  } finally {
    lock.release();
  }
}
