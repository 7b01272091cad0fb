import type { Graph } from "../graph/build-graph.ts";
import { bitCount, ManySourceSearch, SOURCES_PER_PASS } from "../graph/many-source-search.ts";
import { type Relabelled, searchOrder } from "../graph/search-order.ts";
import { allChunks, checkParts, chunkRange } from "../graph/source-chunks.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** Per person of the ordered graph, over the sources of a chunk that reach them. */
export type ClosenessSums = {
  readonly reached: Float64Array;
  readonly steps: Float64Array;
  readonly inverse: Float64Array;
};

export type Closeness = {
  /** Harmonic: Σ 1/distance ÷ (n − 1). The one to show; 0 for an isolate. */
  readonly harmonic: Measured<Float64Array>;
  /** Wasserman & Faust: (r − 1)/(n − 1) · (r − 1)/Σ distance; 0 for an isolate. */
  readonly wassermanFaust: Measured<Float64Array>;
  /** Within the own group: (r − 1)/Σ distance; null for an isolate. Do not compare across groups. */
  readonly withinGroup: readonly (number | null)[];
};

/**
 * One part of the sources of a graph in search order (`searchOrder`), summed where they arrive:
 * distances go both ways, so what reaches a person from everyone is what they reach.
 *
 * @throws RangeError for a chunk that does not exist
 */
export function closenessChunk({ graph }: Relabelled, chunk: number): ClosenessSums {
  const { n } = graph;
  const [from, to] = chunkRange(n, chunk);
  const reached = new Float64Array(n);
  const steps = new Float64Array(n);
  const inverse = new Float64Array(n);
  const sources = Int32Array.from({ length: to - from }, (_, k) => from + k);
  const search = new ManySourceSearch(graph);
  const visit = (distance: number, people: Int32Array, count: number, fresh: Int32Array) => {
    const share = 1 / distance;
    for (let k = 0; k < count; k++) {
      const u = people[k]!;
      const here = bitCount(fresh[u]!);
      reached[u]! += here;
      steps[u]! += here * distance;
      inverse[u]! += here * share;
    }
  };
  for (let s = 0; s < sources.length; s += SOURCES_PER_PASS) {
    search.run(sources, s, Math.min(s + SOURCES_PER_PASS, sources.length), visit);
  }
  return { reached, steps, inverse };
}

/**
 * The three closeness values from all chunks, added in the order of their numbers.
 *
 * @throws RangeError unless every chunk is there
 */
export function closenessOf(ordered: Relabelled, parts: readonly ClosenessSums[]): Closeness {
  checkParts(parts);
  const { n } = ordered.graph;
  if (n < 2) {
    const none = undefinedBecause(n === 0 ? "no_people" : "one_person");
    return { harmonic: none, wassermanFaust: none, withinGroup: n === 0 ? [] : [null] };
  }
  const harmonic = new Float64Array(n);
  const wassermanFaust = new Float64Array(n);
  const withinGroup = new Array<number | null>(n).fill(null);
  for (let u = 0; u < n; u++) {
    let reached = 0;
    let steps = 0;
    let inverse = 0;
    for (const part of parts) {
      reached += part.reached[u]!;
      steps += part.steps[u]!;
      inverse += part.inverse[u]!;
    }
    const person = ordered.original[u]!;
    harmonic[person] = inverse / (n - 1);
    if (reached === 0) continue;
    wassermanFaust[person] = (reached / (n - 1)) * (reached / steps);
    withinGroup[person] = reached / steps;
  }
  return { harmonic: defined(harmonic), wassermanFaust: defined(wassermanFaust), withinGroup };
}

/**
 * Closeness of each person in its three usual forms, which agree in a connected network up to the
 * harmonic one and differ in a disconnected one: there the harmonic form is recommended.
 *
 * Edge cases: nobody or one person → undefined (`no_people`, `one_person`). The order of people by
 * closeness is not monotone when a pair is added. Cost: that of `pathFigures`; meant for up to
 * 20,000 people, above that see `sampledCloseness`. Source: Freeman 1979; Wasserman & Faust 1994;
 * methods C.6.3.
 */
export function closeness(graph: Graph): Closeness {
  const ordered = searchOrder(graph);
  return closenessOf(
    ordered,
    allChunks((chunk) => closenessChunk(ordered, chunk)),
  );
}
