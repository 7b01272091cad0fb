import Graph from "graphology";
import betweennessCentrality from "graphology-metrics/centrality/betweenness.js";
import closenessCentrality from "graphology-metrics/centrality/closeness.js";
import eigenvectorOfGraphology from "graphology-metrics/centrality/eigenvector.js";
import { describe, expect, it } from "vitest";
import {
  betweenness,
  closeness,
  components,
  eigenvectorCentrality,
  pathFigures,
} from "../../shared/core/index.ts";
import { allDistances, betweennessByDefinition } from "./support/all-distances.ts";
import { expectClose } from "./support/close-to.ts";
import { davis } from "./support/davis.ts";
import { graphOf, type Links, randomLinks, seeded } from "./support/graphs.ts";
import { florentine, karate, lesMiserables } from "./support/published-networks.ts";

/** A tree: everyone but the first met one of those before them. */
const tree = (n: number, seed: number): Links => {
  const next = seeded(seed);
  return Array.from({ length: n - 1 }, (_, k) => [k + 1, Math.floor(next() * (k + 1))] as const);
};

const chain = (n: number): Links => Array.from({ length: n - 1 }, (_, u) => [u, u + 1] as const);

const NETWORKS = [
  { name: "karate club", ...karate() },
  { name: "Les Misérables", ...lesMiserables() },
  { name: "women and events", ...davis() },
  { name: "Florentine marriages", ...florentine() },
  { name: "a chain of 70", n: 70, links: chain(70) },
  { name: "a circle of 67", n: 67, links: [...chain(67), [66, 0] as const] },
  ...[3, 5, 8].map((seed) => ({ name: `a tree, seed ${seed}`, n: 60, links: tree(60, seed) })),
  // A dense middle with long branches hanging from it.
  { name: "a hairy knot", n: 90, links: [...randomLinks(20, 0.3, 4), ...chain(90).slice(19)] },
  ...[0.02, 0.03, 0.05, 0.1, 0.3, 0.9].flatMap((p) =>
    [1, 2, 3].map((seed) => ({
      name: `70 people, p ${p}, seed ${seed}`,
      n: 70,
      links: randomLinks(70, p, seed),
    })),
  ),
];

describe.each(NETWORKS)("$name against its definition", ({ n, links }) => {
  const graph = graphOf(n, links);
  const table = allDistances(n, links);
  const finite = table.distance.map((row, u) => row.filter((d, v) => v !== u && d !== Infinity));
  const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

  it("has the same path figures", () => {
    const figures = pathFigures(graph);
    const all = finite.flat();
    const counts = figures.distanceCounts;
    expect(Array.from(counts)).toEqual(
      Array.from(counts, (_, d) => all.filter((distance) => distance === d).length / 2),
    );
    expect(figures.diameter.value).toBe(Math.max(...all));
    expect(figures.meanPath.value).toBeCloseTo(sum(all) / all.length, 12);
    expect(figures.reachableShare.value).toBeCloseTo(all.length / (n * (n - 1)), 12);
    expect(figures.efficiency.value).toBeCloseTo(sum(all.map((d) => 1 / d)) / (n * (n - 1)), 12);
  });

  it("has the same betweenness", () => {
    expectClose(betweenness(graph), betweennessByDefinition(n, table));
  });

  it("has the same closeness in all three forms", () => {
    const { harmonic, wassermanFaust, withinGroup } = closeness(graph);
    expectClose(
      harmonic.value,
      finite.map((row) => sum(row.map((d) => 1 / d)) / (n - 1)),
    );
    expectClose(
      wassermanFaust.value,
      finite.map((row) => (row.length === 0 ? 0 : row.length ** 2 / sum(row) / (n - 1))),
    );
    expect(withinGroup.map((value) => value === null)).toEqual(finite.map((row) => !row.length));
    expectClose(
      withinGroup.map((value) => value ?? 0),
      finite.map((row) => (row.length === 0 ? 0 : row.length / sum(row))),
    );
  });

  it("has an eigenvector that is one, positive and of unit length", () => {
    const answer = eigenvectorCentrality(graph).value;
    const people = Array.from(answer?.people ?? []);
    const x = new Map(people.map((person, k) => [person, answer?.centrality[k] ?? 0]));
    expect(people.length).toBe(components(graph).sizes[0]);
    expect(Math.min(...x.values())).toBeGreaterThan(0);
    expect(sum([...x.values()].map((value) => value ** 2))).toBeCloseTo(1, 12);
    const { offsets, neighbours } = graph;
    expectClose(
      people.map((u) =>
        sum(Array.from(neighbours.slice(offsets[u], offsets[u + 1]), (v) => x.get(v) ?? 0)),
      ),
      people.map((u) => (answer?.eigenvalue ?? 0) * (x.get(u) ?? 0)),
    );
  });
});

// Source of the expected values: graphology-metrics 2.4.2. Its rows are built from simple graphs
// here (parallel pairs and loops corrupt them) and path counts stay far below 2^32 (they wrap).
describe.each(NETWORKS)("$name against graphology", ({ n, links }) => {
  const graph = graphOf(n, links);
  const theirs = new Graph({ type: "undirected" });
  for (let u = 0; u < n; u++) theirs.addNode(u);
  for (const [a, b] of links) theirs.mergeEdge(a, b);
  const byPerson = (values: Record<string, number>) =>
    Array.from({ length: n }, (_, u) => values[u] ?? Number.NaN);

  it("has the same betweenness and closeness", () => {
    const raw = betweennessCentrality(theirs, { normalized: false, getEdgeWeight: null });
    expectClose(betweenness(graph), byPerson(raw));
    const { wassermanFaust, withinGroup } = closeness(graph);
    expectClose(
      wassermanFaust.value,
      byPerson(closenessCentrality(theirs, { wassermanFaust: true })),
    );
    expectClose(
      withinGroup.map((value) => value ?? 0),
      byPerson(closenessCentrality(theirs)),
    );
  });

  it("has the same eigenvector when there is one group", () => {
    if (components(graph).sizes.length > 1) return;
    const options = { getEdgeWeight: null, maxIterations: 100_000, tolerance: 1e-13 };
    expectClose(
      eigenvectorCentrality(graph).value?.centrality ?? null,
      byPerson(eigenvectorOfGraphology(theirs, options)),
      1e-7,
    );
  });
});
