import fc from "fast-check";
import { expect, it } from "vitest";
import { createStream, PairSet } from "../../shared/core/index.ts";

const person = fc.integer({ min: 0, max: 12 });
const step = fc.record({ kind: fc.constantFrom("add", "has"), u: person, v: person });

it("does what a set of texts does", () => {
  fc.assert(
    fc.property(fc.array(step, { maxLength: 300 }), (steps) => {
      const set = new PairSet();
      const twin = new Set<string>();
      for (const { kind, u, v } of steps) {
        if (u === v) continue;
        const key = `${Math.min(u, v)}-${Math.max(u, v)}`;
        const held = twin.has(key);
        expect(set.has(v, u)).toBe(held);
        if (kind === "add") {
          expect(set.add(u, v)).toBe(!held);
          twin.add(key);
        }
        expect(set.size).toBe(twin.size);
      }
      for (let u = 0; u < 12; u++) {
        for (let v = u + 1; v <= 12; v++) expect(set.has(u, v)).toBe(twin.has(`${u}-${v}`));
      }
    }),
    { seed: 20261201, numRuns: 200 },
  );
});

it("keeps 10,000 pairs of people up to 2^31 apart through growth", () => {
  const random = createStream(5, 0);
  const set = new PairSet(10);
  const twin = new Map<string, [number, number]>();
  for (let k = 0; k < 10_000; k++) {
    const u = random.below(2147483647);
    const v = u + 1 + random.below(2147483647 - u);
    expect(set.add(v, u)).toBe(!twin.has(`${u} ${v}`));
    twin.set(`${u} ${v}`, [u, v]);
  }
  for (const [u, v] of twin.values()) expect(set.has(u, v)).toBe(true);
  expect(set.size).toBe(twin.size);
  set.clear();
  expect(set.size).toBe(0);
  for (const [u, v] of twin.values()) expect(set.has(v, u)).toBe(false);
});
