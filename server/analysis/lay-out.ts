import Graph from "graphology";
import forceAtlas2 from "graphology-layout-forceatlas2";
import type { Graph as ContactGraph } from "../../shared/core/index.ts";
import { type Position, rounded, SPACING } from "./pack-groups.ts";

const GOLDEN_ANGLE = Math.PI * (3 - Math.sqrt(5));

/** Steps of the layout: more where they cost little. */
function iterations(people: number): number {
  if (people <= 100) return 300;
  return people <= 400 ? 150 : 80;
}

/**
 * Positions of one connected group about its own centre, within a disc of 0.6·√people spacings.
 *
 * People start on a spiral, those with most pairs inside, and are moved by ForceAtlas2 (Jacomy,
 * Venturini, Heymann & Bastian 2014) for a fixed number of steps; nothing is drawn at random.
 *
 * @param people numbers of the group's people in `graph`
 */
export function layOut(graph: ContactGraph, people: readonly number[]): Position[] {
  if (people.length === 1) return [{ x: 0, y: 0 }];
  const { offsets, neighbours } = graph;
  const degree = (u: number) => (offsets[u + 1] as number) - (offsets[u] as number);
  const order = [...people].sort((u, v) => degree(v) - degree(u) || u - v);
  const drawing = new Graph({ type: "undirected", multi: false });
  order.forEach((u, k) => {
    const radius = Math.sqrt(k + 0.5);
    drawing.addNode(u, {
      x: radius * Math.cos(k * GOLDEN_ANGLE),
      y: radius * Math.sin(k * GOLDEN_ANGLE),
    });
  });
  for (const u of people) {
    for (let k = offsets[u] as number; k < (offsets[u + 1] as number); k++) {
      const v = neighbours[k] as number;
      if (u < v) drawing.addEdge(u, v);
    }
  }
  const placed = forceAtlas2(drawing, {
    iterations: iterations(people.length),
    settings: { ...forceAtlas2.inferSettings(drawing), barnesHutOptimize: people.length > 400 },
  });
  const points = people.map((u) => placed[String(u)] ?? { x: 0, y: 0 });
  return intoDisc(points, 0.6 * Math.sqrt(people.length) * SPACING);
}

/** Moves points about their bounding box's centre and scales them into a radius. */
function intoDisc(points: readonly Position[], radius: number): Position[] {
  let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const { x, y } of points) {
    left = Math.min(left, x);
    right = Math.max(right, x);
    top = Math.min(top, y);
    bottom = Math.max(bottom, y);
  }
  const cx = (left + right) / 2;
  const cy = (top + bottom) / 2;
  let reach = 0;
  for (const { x, y } of points) reach = Math.max(reach, Math.hypot(x - cx, y - cy));
  const scale = reach > 0 ? radius / reach : 0;
  return points.map(({ x, y }) => ({
    x: rounded((x - cx) * scale),
    y: rounded((y - cy) * scale),
  }));
}
