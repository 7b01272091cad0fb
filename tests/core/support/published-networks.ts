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

type LinkFile = { nodes: unknown[]; links: { source: number; target: number }[] };

/** Knuth 1993, *The Stanford GraphBase*: co-appearance in Les Misérables (vega-datasets). */
export function lesMiserables(): PublishedNetwork {
  const file = new URL("../../../node_modules/vega-datasets/data/miserables.json", import.meta.url);
  const { nodes, links } = JSON.parse(readFileSync(file, "utf8")) as LinkFile;
  return { n: nodes.length, links: links.map(({ source, target }) => [source, target] as const) };
}
