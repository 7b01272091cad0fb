import { buildGraph, type Graph, type PairEnds } from "../../../shared/core/index.ts";

export type Links = readonly (readonly [number, number])[];

/** Ends of links as the core takes them. */
export function endsOf(links: Links): PairEnds {
  return {
    a: Int32Array.from(links, ([a]) => a),
    b: Int32Array.from(links, ([, b]) => b),
  };
}

export const graphOf = (n: number, links: Links): Graph => buildGraph(n, endsOf(links));

/** "01 12" → [[0, 1], [1, 2]]: the notation of the hand graphs. */
export const linksOf = (text: string): Links =>
  text
    .split(" ")
    .filter((part) => part !== "")
    .map((part) => [Number(part[0]), Number(part[1])] as const);

/** Repeatable numbers in [0, 1): a linear congruence, good enough to scatter pairs. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 4294967296;
  };
}

/** Each of the possible pairs of n people with probability p. */
export function randomLinks(n: number, p: number, seed: number): Links {
  const next = seeded(seed);
  const links: [number, number][] = [];
  for (let a = 0; a < n; a++) for (let b = a + 1; b < n; b++) if (next() < p) links.push([a, b]);
  return links;
}

/** Every person's contacts as sets, straight from the links: the brute-force view of a graph. */
export function contactSets(n: number, links: Links): Set<number>[] {
  const sets = Array.from({ length: n }, () => new Set<number>());
  for (const [a, b] of links) {
    sets[a]?.add(b);
    sets[b]?.add(a);
  }
  return sets;
}
