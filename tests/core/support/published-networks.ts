import { readFileSync } from "node:fs";
import Graph from "graphology";
import florentineFamilies from "graphology-generators/social/florentine-families.js";
import karateClub from "graphology-generators/social/karate-club.js";
import type { Links } from "./graphs.ts";

export type PublishedNetwork = { readonly n: number; readonly links: Links };

function fromGraphology(graph: Graph): PublishedNetwork {
  const number = new Map(graph.nodes().map((node, k) => [node, k]));
  const at = (node: string) => number.get(node) ?? -1;
  return {
    n: graph.order,
    links: graph.mapEdges((_edge, _attributes, from, to) => [at(from), at(to)] as const),
  };
}

/** Zachary 1977, *An information flow model for conflict and fission in small groups*. */
export const karate = (): PublishedNetwork => fromGraphology(karateClub(Graph));

/** Padgett's marriages of Florentine families; Breiger & Pattison 1986. */
export const florentine = (): PublishedNetwork => fromGraphology(florentineFamilies(Graph));

// Gatherings that each of the 18 women came to.
const ATTENDED = `1 2 3 4 5 6 8 9 | 1 2 3 5 6 7 8 | 2 3 4 5 6 7 8 9 | 1 3 4 5 6 7 8 | 3 4 5 7 | 3 5 6 8 |
  5 6 7 8 | 6 8 9 | 5 7 8 9 | 7 8 9 12 | 8 9 10 12 | 8 9 10 12 13 14 | 7 8 9 10 12 13 14 |
  6 7 9 10 11 12 13 14 | 7 8 10 11 12 | 8 9 | 9 11 | 9 11`;

/**
 * Davis, Gardner & Gardner 1941, *Deep South*: women (0 … 17) and the gatherings they came to
 * (18 … 31).
 */
export function davis(): PublishedNetwork {
  const links = ATTENDED.split("|").flatMap((row, woman) =>
    row
      .trim()
      .split(/\s+/)
      .map((event) => [woman, 17 + Number(event)] as const),
  );
  return { n: 32, links };
}

/** The clubs that the karate club split into, by person in the order of `karate`. */
export const karateClubs = (): Int32Array => {
  const graph = karateClub(Graph);
  return Int32Array.from(graph.nodes(), (node) =>
    graph.getNodeAttribute(node, "club") === "Officer" ? 1 : 0,
  );
};

type LinkFile = { nodes: { group: number }[]; links: { source: number; target: number }[] };

function readMiserables(): LinkFile {
  const file = new URL("../../../node_modules/vega-datasets/data/miserables.json", import.meta.url);
  return JSON.parse(readFileSync(file, "utf8")) as LinkFile;
}

/** The `group` that the file gives each character of `lesMiserables`. */
export const miserablesGroups = (): Int32Array =>
  Int32Array.from(readMiserables().nodes, ({ group }) => group);

/** Knuth 1993, *The Stanford GraphBase*: co-appearance in Les Misérables (vega-datasets). */
export function lesMiserables(): PublishedNetwork {
  const { nodes, links } = readMiserables();
  return { n: nodes.length, links: links.map(({ source, target }) => [source, target] as const) };
}
