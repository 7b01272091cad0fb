import { describe, expect, it } from "vitest";
import { layOut } from "../../server/analysis/lay-out.ts";
import { packGroups, SPACING, sideOf } from "../../server/analysis/pack-groups.ts";
import { buildGraph } from "../../shared/core/index.ts";
import { karate } from "../core/support/published-networks.ts";

describe("packGroups", () => {
  it("lets no two squares overlap, and wastes less than half of the space", () => {
    const sizes = [300, 77, 34, 10, 9, 9, 5, 4, 3, 2, 2, ...Array.from({ length: 80 }, () => 1)];
    const sides = sizes.map(sideOf);
    const centres = packGroups(sides);
    const square = (k: number) => {
      const half = (sides[k] ?? 0) / 2;
      const { x, y } = centres[k] ?? { x: 0, y: 0 };
      return { left: x - half, right: x + half, top: y - half, bottom: y + half };
    };
    const slack = 0.02;
    for (let k = 0; k < sides.length; k++) {
      for (let j = 0; j < k; j++) {
        const [p, q] = [square(k), square(j)];
        const apart =
          p.left > q.right - slack ||
          q.left > p.right - slack ||
          p.top > q.bottom - slack ||
          q.top > p.bottom - slack;
        expect(apart).toBe(true);
      }
    }
    const squares = sides.map((_, k) => square(k));
    const width = Math.max(...squares.map(({ right }) => right));
    const height = Math.max(...squares.map(({ bottom }) => bottom));
    const used = sides.reduce((sum, side) => sum + side ** 2, 0);
    expect(used / (width * height)).toBeGreaterThan(0.5);
    expect(Math.min(...squares.map(({ left, top }) => Math.min(left, top)))).toBeGreaterThan(-0.01);
  });

  it("takes nothing at all", () => {
    expect(packGroups([])).toEqual([]);
  });
});

describe("layOut", () => {
  it("keeps a group within its square and gives the same positions again", () => {
    const { n, links } = karate();
    const graph = buildGraph(n, {
      a: Int32Array.from(links, ([u]) => u),
      b: Int32Array.from(links, ([, v]) => v),
    });
    const people = Array.from({ length: n }, (_, k) => k);
    const placed = layOut(graph, people);
    expect(layOut(graph, people)).toEqual(placed);
    expect(Math.max(...placed.map(({ x, y }) => Math.hypot(x, y)))).toBeLessThanOrEqual(
      sideOf(n) / 2,
    );
    for (let k = 0; k < n; k++) {
      for (let j = 0; j < k; j++) {
        const [p, q] = [placed[k], placed[j]];
        const distance = p && q ? Math.hypot(p.x - q.x, p.y - q.y) : 0;
        expect(distance).toBeGreaterThan(SPACING / 20);
      }
    }
  });

  it("puts a person alone in the middle", () => {
    const graph = buildGraph(1, { a: new Int32Array(0), b: new Int32Array(0) });
    expect(layOut(graph, [0])).toEqual([{ x: 0, y: 0 }]);
  });
});
