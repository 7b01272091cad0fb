import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  components,
  networkReport,
  threshold,
  triangles,
  twoPaths,
  wilsonInterval,
} from "../../shared/core/index.ts";
import { contactSets, graphOf, type Links } from "./support/graphs.ts";
import { type Network, networks, RUN } from "./support/networks.ts";

const report = ({ n, links }: Network, flags: Uint8Array | null = null) =>
  networkReport(graphOf(n, links), flags, {
    declaredPopulation: null,
    presetWindow: true,
    recall: null,
  });

describe("the graph", () => {
  it("holds exactly the links, both ways, each once", () => {
    fc.assert(
      fc.property(networks(), ({ n, links }) => {
        const { offsets, neighbours } = graphOf(n, links);
        const rows = contactSets(n, links).map((set) => [...set].sort((a, b) => a - b));
        const ours = rows.map((_, u) => Array.from(neighbours.slice(offsets[u], offsets[u + 1])));
        expect(ours).toEqual(rows);
      }),
      RUN,
    );
  });
});

describe("the report", () => {
  it("does not depend on how people are numbered or pairs written down", () => {
    const relabelled = networks().chain((given) =>
      fc.record({
        given: fc.constant(given),
        number: fc.shuffledSubarray(
          Array.from({ length: given.n }, (_, k) => k),
          { minLength: given.n },
        ),
        links: fc.shuffledSubarray([...given.links], { minLength: given.links.length }),
        turned: fc.array(fc.boolean(), { minLength: given.links.length }),
        flags: fc.uint8Array({ min: 0, max: 1, minLength: given.n, maxLength: given.n }),
      }),
    );
    fc.assert(
      fc.property(relabelled, ({ given, number, links, turned, flags }) => {
        const to = (u: number) => number[u] ?? -1;
        const other = links.map(([a, b], k) =>
          turned[k] ? ([to(b), to(a)] as const) : ([to(a), to(b)] as const),
        );
        const moved = new Uint8Array(given.n);
        flags.forEach((flag, u) => {
          moved[to(u)] = flag;
        });
        expect(report({ n: given.n, links: other }, moved)).toEqual(report(given, flags));
      }),
      RUN,
    );
  });

  it("adds up over two networks side by side", () => {
    fc.assert(
      fc.property(networks(), networks(), (left, right) => {
        const shifted = right.links.map(([a, b]) => [a + left.n, b + left.n] as const);
        const both = { n: left.n + right.n, links: [...left.links, ...shifted] };
        const [x, y, together] = [report(left), report(right), report(both)];
        expect(together.pairs).toBe(x.pairs + y.pairs);
        expect(together.isolates).toBe(x.isolates + y.isolates);
        expect(together.componentSizes).toEqual(
          [...x.componentSizes, ...y.componentSizes].sort((a, b) => b - a),
        );
        const graphs = [left, right, both].map(({ n, links }) => graphOf(n, links));
        const [first, second, sum] = graphs.map((g) => [triangles(g), twoPaths(g)] as const);
        expect(sum?.[0]).toBe((first?.[0] ?? 0) + (second?.[0] ?? 0));
        expect(sum?.[1]).toBe((first?.[1] ?? 0) + (second?.[1] ?? 0));
      }),
      RUN,
    );
  });

  it("never loses a pair, a triangle or the size of the largest group by adding a pair", () => {
    const grown = networks().chain(({ n, links }) =>
      fc.record({
        n: fc.constant(n),
        links: fc.constant(links),
        a: fc.integer({ min: 0, max: n - 1 }),
        step: fc.integer({ min: 1, max: n - 1 }),
      }),
    );
    fc.assert(
      fc.property(grown, ({ n, links, a, step }) => {
        const more: Links = [...links, [a, (a + step) % n]];
        const [before, after] = [report({ n, links }), report({ n, links: more })];
        const known = contactSets(n, links)[a]?.has((a + step) % n);
        expect(after.pairs).toBe(before.pairs + (known ? 0 : 1));
        expect(after.isolates).toBeLessThanOrEqual(before.isolates);
        expect(after.largestShare ?? 0).toBeGreaterThanOrEqual(before.largestShare ?? 0);
        const lost = before.componentSizes.length - after.componentSizes.length;
        expect([0, 1]).toContain(lost);
        expect(triangles(graphOf(n, more))).toBeGreaterThanOrEqual(triangles(graphOf(n, links)));
        const c = (answer: typeof before) => answer.threshold.pairsPerPerson ?? 0;
        expect(c(after)).toBeGreaterThanOrEqual(c(before));
      }),
      RUN,
    );
  });

  it("keeps its own books: degrees, group sizes and shares agree", () => {
    fc.assert(
      fc.property(networks(), (given) => {
        const answer = report(given);
        const people = answer.degreeCounts.reduce((sum, count) => sum + count, 0);
        const ends = answer.degreeCounts.reduce((sum, count, degree) => sum + count * degree, 0);
        expect([people, ends]).toEqual([given.n, 2 * answer.pairs]);
        expect(answer.componentSizes.reduce((sum, size) => sum + size, 0)).toBe(given.n);
        expect(answer.componentSizes.filter((size) => size === 1).length).toBe(answer.isolates);
        const { component, sizes } = components(graphOf(given.n, given.links));
        sizes.forEach((size, label) => {
          expect(component.filter((mine) => mine === label).length).toBe(size);
        });
      }),
      RUN,
    );
  });
});

describe("intervals", () => {
  it("hold the estimate and stay inside 0 … 1", () => {
    const counts = fc
      .integer({ min: 1, max: 1_000_000 })
      .chain((trials) => fc.tuple(fc.integer({ min: 0, max: trials }), fc.constant(trials)));
    fc.assert(
      fc.property(counts, ([x, trials]) => {
        const [lower, upper] = wilsonInterval(x, trials) ?? [1, 0];
        expect(lower).toBeGreaterThanOrEqual(0);
        expect(lower).toBeLessThanOrEqual(x / trials);
        expect(upper).toBeGreaterThanOrEqual(x / trials);
        expect(upper).toBeLessThanOrEqual(1);
      }),
      RUN,
    );
  });

  it("never let an unknown recall say below, whatever was counted", () => {
    const input = fc
      .integer({ min: 30, max: 5000 })
      .chain((n) => fc.record({ n: fc.constant(n), i: fc.integer({ min: 30, max: n }) }))
      .chain(({ n, i }) => {
        const eligible = (i * (i - 1)) / 2 + i * (n - i);
        return fc.record({
          n: fc.constant(n),
          interviewed: fc.constant(i),
          countedPairs: fc.integer({ min: 0, max: Math.min(eligible, 4 * n) }),
        });
      });
    fc.assert(
      fc.property(input, (counts) => {
        const answer = threshold({
          ...counts,
          population: "interviewed",
          presetWindow: true,
          coverageRequired: false,
          recall: null,
        });
        expect(answer.verdict).not.toBe("below");
        expect(answer.verdict).not.toBeNull();
        const open = answer.openVerdicts.length;
        expect(open > 0).toBe(answer.verdict === "not_distinguishable");
      }),
      RUN,
    );
  });
});
