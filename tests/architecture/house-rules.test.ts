import { existsSync, readdirSync, readFileSync, statSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));
const ZONES = ["src", "server", "shared", "drizzle", "tests", "scripts", "bench"];

function filesBelow(folder: string): string[] {
  if (!existsSync(join(ROOT, folder))) return [];
  return readdirSync(join(ROOT, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|tsx|mts|mjs)$/.test(entry.name))
    .map((entry) => relative(ROOT, join(entry.parentPath, entry.name)))
    .filter((path) => !path.includes("migrations/meta"));
}

const FILES = ZONES.flatMap(filesBelow);
const text = (path: string) => readFileSync(join(ROOT, path), "utf8");
const code = (path: string) => text(path).replace(/\/\*[\s\S]*?\*\/|(^|[^:])\/\/.*$/gm, "$1");

/** Modules a file imports, as paths of the tree (packages stay as they are written). */
function importsOf(path: string): string[] {
  const source = code(path);
  const found = [
    ...source.matchAll(/^\s*(?:import|export)\b[^"';]*?\bfrom\s*["']([^"']+)["']/gm),
    ...source.matchAll(/\bimport\s*\(\s*["']([^"']+)["']\s*\)/g),
    ...source.matchAll(/^\s*import\s*["']([^"']+)["']/gm),
  ];
  return found.map(([, name]) =>
    name?.startsWith(".") ? relative(ROOT, resolve(ROOT, dirname(path), name)) : (name ?? ""),
  );
}

const feature = (path: string) => /^(?:src|server)\/features\/([^/]+)\//.exec(path)?.[1];

describe("directions of import", () => {
  const offending = (from: RegExp, allowed: (target: string, path: string) => boolean) =>
    FILES.filter((path) => from.test(path)).flatMap((path) =>
      importsOf(path)
        .filter((target) => !allowed(target, path))
        .map((target) => `${path} → ${target}`),
    );

  it("finds files in every zone", () => {
    for (const zone of ["src", "server", "shared", "drizzle", "tests"]) {
      expect(FILES.filter((path) => path.startsWith(`${zone}/`)).length, zone).toBeGreaterThan(5);
    }
  });

  it("the numeric core imports only itself", () => {
    expect(offending(/^shared\/core\//, (target) => target.startsWith("shared/core/"))).toEqual([]);
  });

  it("shared imports zod and itself", () => {
    const allowed = (target: string) => target === "zod" || target.startsWith("shared/");
    expect(offending(/^shared\//, allowed)).toEqual([]);
  });

  it("the client imports neither server nor database", () => {
    expect(offending(/^src\//, (target) => !/^(server|drizzle)\//.test(target))).toEqual([]);
    expect(offending(/^src\//, (target) => !target.startsWith("node:"))).toEqual([]);
  });

  it("the server does not import the client", () => {
    expect(offending(/^server\//, (target) => !target.startsWith("src/"))).toEqual([]);
  });

  it("no client feature imports another", () => {
    const allowed = (target: string, path: string) =>
      !feature(target) || feature(target) === feature(path);
    expect(offending(/^src\/features\//, allowed)).toEqual([]);
  });

  it("a server feature uses another's store only", () => {
    const allowed = (target: string, path: string) =>
      !feature(target) || feature(target) === feature(path) || /\/store\.ts$/.test(target);
    expect(offending(/^server\/features\//, allowed)).toEqual([]);
  });
});

describe("house style", () => {
  it("no file is over 400 lines", () => {
    const long = FILES.filter((path) => text(path).split("\n").length > 400);
    expect(long).toEqual([]);
  });

  it("file names are kebab-case", () => {
    const name = (path: string) => path.split("/").at(-1) ?? "";
    expect(FILES.filter((path) => !/^[a-z0-9.-]+$/.test(name(path)))).toEqual([]);
  });

  it("no default exports and no barrels but the core's", () => {
    // Playwright and Vitest load these two by their default export.
    const demanded = ["tests/e2e/global-setup.ts", "scripts/lib/vitest-results.mjs"];
    const defaults = FILES.filter(
      (path) => /^\s*export default/m.test(code(path)) && !demanded.includes(path),
    );
    const barrels = FILES.filter(
      (path) => /\/index\.tsx?$/.test(path) && path !== "shared/core/index.ts",
    );
    expect({ defaults, barrels }).toEqual({ defaults: [], barrels: [] });
  });

  it("calls that must not be there are not", () => {
    const banned: [RegExp, RegExp][] = [
      [/dangerouslySetInnerHTML|innerHTML\s*=/, /^src\//],
      [/db\.transaction\(|\.transaction\(/, /^server\//],
      [/Math\.random|Date\.now|new Date\(\)/, /^shared\/core\//],
      [/new Date\(\)/, /^server\/(?!clock\.ts)/],
      [/\breq(?:uest)?\.(?:body|query)\b/, /^server\/features\//],
      [/console\.(?:log|error|warn)/, /^(?:server|shared)\//],
    ];
    const found = banned.flatMap(([pattern, zone]) =>
      FILES.filter((path) => zone.test(path) && pattern.test(code(path))).map(
        (path) => `${path}: ${pattern}`,
      ),
    );
    expect(found).toEqual([]);
  });

  it("nothing is left unfinished", () => {
    const marks = new RegExp(["TO", "DO|FIX", "ME|not imple", "mented|coming s", "oon"].join(""));
    const found = FILES.filter((path) => !path.startsWith("tests/") && marks.test(text(path)));
    expect(found).toEqual([]);
  });
});

describe("what the repository holds", () => {
  it("has the layout of the house", () => {
    const wanted = [
      "README.md",
      "DEVELOPERS.md",
      "package.json",
      "vite.config.ts",
      "tailwind.config.ts",
      "drizzle.config.ts",
      "public/fonts",
      ".ci/run",
      "docs/decisions",
      "docs/dependencies.md",
    ];
    expect(wanted.filter((path) => !existsSync(join(ROOT, path)))).toEqual([]);
    expect(statSync(join(ROOT, ".ci/run")).mode & 0o100).toBe(0o100);
  });

  it("records no download address in the lockfile", () => {
    expect(text("package-lock.json").includes('"resolved"')).toBe(false);
  });

  it("lists every dependency with what it is for", () => {
    const packages = JSON.parse(text("package.json"));
    const names = Object.keys({ ...packages.dependencies, ...packages.devDependencies });
    const list = text("docs/dependencies.md");
    expect(names.filter((name) => !list.includes(`\`${name}\``))).toEqual([]);
  });
});
