import Graph from "graphology";
import { connectedComponents } from "graphology-components";
import { undirectedDensity } from "graphology-metrics/graph/density.js";
import { describe, expect, it } from "vitest";
import {
  components,
  degreeCounts,
  density,
  isolates,
  triangles,
  twoPaths,
} from "../../shared/core/index.ts";
import { contactSets, graphOf, type Links, randomLinks } from "./support/graphs.ts";
import { karate, lesMiserables } from "./support/published-networks.ts";

function graphologyOf(n: number, links: Links): Graph {
  const graph = new Graph({ type: "undirected" });
  for (let u = 0; u < n; u++) graph.addNode(u);
  for (const [a, b] of links) graph.mergeEdge(a, b);
  return graph;
}

const NETWORKS = [
  { name: "karate club", ...karate() },
  { name: "Les Misérables", ...lesMiserables() },
  ...[0.02, 0.05, 0.1, 0.3, 0.9].flatMap((p) =>
    [1, 2, 3].map((seed) => ({
      name: `40 people, p ${p}, seed ${seed}`,
      n: 40,
      links: randomLinks(40, p, seed),
    })),
  ),
];

// Source of the expected values: graphology-components 1.5.4 and graphology-metrics 2.4.2.
describe.each(NETWORKS)("$name against graphology", ({ n, links }) => {
  const ours = graphOf(n, links);
  const theirs = graphologyOf(n, links);

  it("has the same groups", () => {
    const { component, sizes } = components(ours);
    const groups = connectedComponents(theirs).map((group) => group.map(Number));
    expect(Array.from(sizes)).toEqual(groups.map((group) => group.length).sort((a, b) => b - a));
    for (const group of groups) {
      expect(new Set(group.map((u) => component[u])).size).toBe(1);
    }
  });

  it("has the same density and degrees", () => {
    expect(density(ours.n, ours.m).value).toBeCloseTo(undirectedDensity(theirs), 14);
    const counts = Array.from(degreeCounts(ours));
    const degrees = theirs.nodes().map((node) => theirs.degree(node));
    expect(counts).toEqual(counts.map((_, k) => degrees.filter((degree) => degree === k).length));
    expect(isolates(ours)).toBe(degrees.filter((degree) => degree === 0).length);
  });
});

// Counting every set of three people from the links themselves.
describe.each(NETWORKS)("$name against brute force", ({ n, links }) => {
  it("has the same triangles and 2-paths", () => {
    const contacts = contactSets(n, links);
    let closed = 0;
    let paths = 0;
    for (let u = 0; u < n; u++) {
      for (let v = u + 1; v < n; v++) {
        for (let w = v + 1; w < n; w++) {
          const pairs =
            Number(contacts[u]?.has(v)) + Number(contacts[u]?.has(w)) + Number(contacts[v]?.has(w));
          // Three people hold one 2-path with two of their pairs, and three with all of them.
          if (pairs === 2) paths += 1;
          if (pairs === 3) {
            closed++;
            paths += 3;
          }
        }
      }
    }
    const graph = graphOf(n, links);
    expect(triangles(graph)).toBe(closed);
    expect(twoPaths(graph)).toBe(paths);
  });
});
