import { contactSets, type Links } from "./graphs.ts";

export type AllDistances = {
  /** Distance of each ordered pair; Infinity without a path. */
  readonly distance: readonly (readonly number[])[];
  /** Shortest paths of each ordered pair. */
  readonly paths: readonly (readonly number[])[];
};

const at = (table: readonly (readonly number[])[], u: number, v: number) => table[u]?.[v] ?? 0;

/** Floyd 1962 and Warshall 1962: no queue, no search, nothing in common with what is tested. */
export function allDistances(n: number, links: Links): AllDistances {
  const contacts = contactSets(n, links);
  const distance = contacts.map((mine, u) =>
    Array.from({ length: n }, (_, v) => (u === v ? 0 : mine.has(v) ? 1 : Infinity)),
  );
  for (let via = 0; via < n; via++) {
    for (const row of distance) {
      for (let v = 0; v < n; v++) {
        row[v] = Math.min(row[v] ?? Infinity, (row[via] ?? Infinity) + at(distance, via, v));
      }
    }
  }
  // Paths to v are the paths to those of its contacts who are one step nearer.
  const paths = distance.map((row, u) => {
    const counts = Array.from({ length: n }, (_, v): number => (u === v ? 1 : 0));
    const people = row.map((_, v) => v).filter((v) => v !== u && row[v] !== Infinity);
    for (const v of people.sort((x, y) => (row[x] ?? 0) - (row[y] ?? 0))) {
      for (const w of contacts[v] ?? []) {
        if ((row[w] ?? 0) + 1 === row[v]) counts[v] = (counts[v] ?? 0) + (counts[w] ?? 0);
      }
    }
    return counts;
  });
  return { distance, paths };
}

/** Freeman's definition, word for word: each unordered pair, the share of its paths through v. */
export function betweennessByDefinition(n: number, { distance, paths }: AllDistances): number[] {
  return Array.from({ length: n }, (_, v) => {
    let sum = 0;
    for (let s = 0; s < n; s++) {
      for (let t = s + 1; t < n; t++) {
        if (s === v || t === v || at(distance, s, t) === Infinity) continue;
        if (at(distance, s, v) + at(distance, v, t) !== at(distance, s, t)) continue;
        sum += (at(paths, s, v) * at(paths, v, t)) / at(paths, s, t);
      }
    }
    return sum;
  });
}
