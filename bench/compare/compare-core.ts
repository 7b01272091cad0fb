import { execFile } from "node:child_process";
import { existsSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import type { CoreTime } from "../core/bench-core.ts";
import { BOUNDS, type Bound } from "./bounds.ts";
import { type GraphSize, makePairs } from "./make-pairs.ts";

const run = promisify(execFile);
const ROOT = join(import.meta.dirname, "../..");
const REFERENCE = join(import.meta.dirname, "reference.py");
/** Debian's own, for which the two packages are made; another Python does not find them. */
const PYTHON = existsSync("/usr/bin/python3") ? "/usr/bin/python3" : "python3";
const LIMITS = { maxBuffer: 2 ** 24, timeout: 1_800_000 };

type Reference = Record<string, { ms: number; value: unknown }>;

/** Whether a module of the reference can be loaded. */
async function has(module: string): Promise<boolean> {
  return run(PYTHON, ["-c", `import ${module}`]).then(
    () => true,
    () => false,
  );
}

/** Times of the core in a process of its own, with the most memory it held. */
async function coreTimes(file: string, names: readonly string[]) {
  const script = join(ROOT, "bench/compare/core-process.mjs");
  const { stdout } = await run(process.execPath, [script, file, names.join(",")], LIMITS);
  return JSON.parse(stdout) as { times: Record<string, CoreTime>; megabytes: number };
}

async function referenceTimes(file: string, names: readonly string[], library: string[] = []) {
  const args = [REFERENCE, file, names.join(","), ...library];
  return JSON.parse((await run(PYTHON, args, LIMITS)).stdout) as Reference;
}

const short = (value: number) => Number(value.toPrecision(3)).toString();
const sum = (times: Record<string, { ms: number }>, names: readonly string[]) =>
  names.reduce((total, name) => total + (times[name]?.ms ?? Number.NaN), 0);

function row(bound: Bound, ours: number, other: number | null, ratio: number): string {
  const isHeld = bound.least === undefined ? ratio <= bound.most : ratio >= bound.least;
  const limit = bound.least === undefined ? `≤ ${bound.most}` : `≥ ${bound.least}`;
  const cells = [
    bound.words,
    short(ours),
    other === null ? "–" : short(other),
    short(ratio),
    limit,
  ];
  return `| ${[...cells, isHeld ? "held" : "**missed**"].join(" | ")} |`;
}

/** One size: makes the graph, times both sides in turn, and says how the bounds stand. */
async function compareSize(folder: string, size: GraphSize, networkx: boolean): Promise<string[]> {
  const bounds = BOUNDS.filter(({ people }) => people === size.people);
  const names = [...new Set(bounds.flatMap((bound) => bound.names))];
  const file = join(folder, `${size.people}.csv`);
  makePairs(file, size, 1);
  const { times, megabytes } = await coreTimes(file, names);
  const isCompared = bounds.some(({ against }) => against === "igraph");
  const igraph = isCompared ? await referenceTimes(file, names) : {};
  const lines = [
    "",
    `${size.people} people, ${size.pairs} pairs (most memory of the core's process: ${megabytes} MB)`,
    "",
    "| measure | core, ms | other, ms | ratio | bound | |",
    "|---|---|---|---|---|---|",
  ];
  for (const bound of bounds) {
    const all = Object.fromEntries(
      Object.entries(times).map(([name, time]) => [name, { ms: time.msAllWorkers ?? time.ms }]),
    );
    const ours = sum(bound.workers === "all" ? all : times, bound.names);
    if (bound.against === "igraph") {
      const other = sum(igraph, bound.names);
      lines.push(row(bound, ours, other, bound.isRate ? other / ours : ours / other));
    } else if (bound.against === "core") {
      const alone = sum(times, bound.names);
      lines.push(row(bound, ours, alone, alone / ours));
    } else if (bound.against === "networkx" && networkx) {
      const other = sum(await referenceTimes(file, bound.names, ["networkx"]), bound.names);
      lines.push(row(bound, ours, other, other / ours));
    } else if (bound.against === "seconds") {
      lines.push(row(bound, ours, null, ours / 1000));
    } else if (bound.against === "megabytes") {
      lines.push(row(bound, ours, null, megabytes));
    } else if (bound.against === "modularity") {
      const value = times.communities?.value as { modularity: number } | undefined;
      const other = Number(igraph.communities?.value);
      lines.push(
        row(bound, value?.modularity ?? Number.NaN, other, other - (value?.modularity ?? 0)),
      );
    } else lines.push(`| ${bound.words} | – | – | – | – | networkx is absent |`);
  }
  rmSync(file);
  return lines;
}

/**
 * Times the core beside igraph's C library and networkx on the same made-up graphs, in one run, and
 * prints the ratios as tables beside their bounds.
 *
 * @param sizes people of the sizes to run; all when empty
 */
export async function compareCore(sizes: readonly number[], say: (line: string) => void) {
  if (!(await has("igraph"))) {
    say(`igraph is absent: install Debian's python3-igraph (looked for by ${PYTHON})`);
    return 2;
  }
  const networkx = await has("networkx");
  if (!networkx) say("networkx is absent (Debian's python3-networkx): its rows are left out");
  const folder = mkdtempSync(join(tmpdir(), "compare-core-"));
  try {
    for (const size of SIZES) {
      if (sizes.length > 0 && !sizes.includes(size.people)) continue;
      for (const line of await compareSize(folder, size, networkx)) say(line);
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  return 0;
}

const SIZES: readonly GraphSize[] = [
  { people: 5_000, pairs: 15_000 },
  { people: 10_000, pairs: 20_000 },
  { people: 100_000, pairs: 300_000 },
  { people: 1_000_000, pairs: 3_000_000 },
];
