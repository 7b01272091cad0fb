import { closeSync, openSync, writeSync } from "node:fs";
import { createStream } from "../../shared/core/index.ts";

export type GraphSize = { readonly people: number; readonly pairs: number };

/** Share of the pairs that are those of households of four, all of whose people meet. */
const HOUSEHOLD_SHARE = 0.3;

/**
 * Writes a made-up contact network as a pairs file: households of four with all their pairs, the
 * rest at random with unequal activity (a tenth of the people hold a third of the random ends), so
 * that groups, triangles, cores and communities have something to find. Repeatable by its seed.
 */
export function makePairs(file: string, { people, pairs }: GraphSize, seed: number): void {
  const stream = createStream(seed, 0);
  const seen = new Set<number>();
  const descriptor = openSync(file, "w");
  try {
    let lines: string[] = ["ref_a,ref_b"];
    const flush = () => {
      writeSync(descriptor, `${lines.join("\n")}\n`);
      lines = [];
    };
    const add = (u: number, v: number) => {
      const key = Math.min(u, v) * people + Math.max(u, v);
      if (u === v || seen.has(key)) return;
      seen.add(key);
      lines.push(`p${u},p${v}`);
      if (lines.length >= 65536) flush();
    };
    const atHome = Math.floor(pairs * HOUSEHOLD_SHARE);
    let home = 0;
    for (; home + 3 < people && seen.size + 6 <= atHome; home += 4) {
      for (let u = home; u < home + 4; u++) for (let v = u + 1; v < home + 4; v++) add(u, v);
    }
    const active = Math.max(2, Math.floor(people / 10));
    const stride = Math.floor(people / active);
    const anyone = () =>
      stream.next() < 1 / 3 ? stride * stream.below(active) : stream.below(people);
    // A file of pairs knows only people with a pair: everyone outside a household gets one.
    for (let u = home; u < people; u++) add(u, stream.below(people));
    while (seen.size < pairs) add(anyone(), anyone());
    flush();
  } finally {
    closeSync(descriptor);
  }
}
