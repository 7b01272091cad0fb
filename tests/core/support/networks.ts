import fc from "fast-check";
import type { PairEnds } from "../../../shared/core/index.ts";
import type { Links } from "./graphs.ts";

export type Network = { n: number; links: Links };

/** A fixed seed: a failure must come back the next time. */
export const RUN = { seed: 20260301, numRuns: 200 };

/** Networks of 2 … `most` people; told pairs may repeat, both ways round. */
export const networks = (most = 14, perPerson = 3): fc.Arbitrary<Network> =>
  fc.integer({ min: 2, max: most }).chain((n) => {
    const person = fc.integer({ min: 0, max: n - 1 });
    const pair = fc.tuple(person, person).filter(([a, b]) => a !== b);
    return fc.record({ n: fc.constant(n), links: fc.array(pair, { maxLength: perPerson * n }) });
  });

/** A network and new numbers for its people. */
export const relabelled = (most = 14): fc.Arbitrary<{ given: Network; to: number[] }> =>
  networks(most).chain((given) =>
    fc.record({
      given: fc.constant(given),
      to: fc.shuffledSubarray(
        Array.from({ length: given.n }, (_, u) => u),
        { minLength: given.n },
      ),
    }),
  );

/** The links with everybody renumbered. */
export const moved = (links: Links, to: readonly number[]): Links =>
  links.map(([a, b]) => [to[a] ?? -1, to[b] ?? -1] as const);

/** Two networks side by side: the second one's people follow the first one's. */
export const beside = (left: Network, right: Network): Network => ({
  n: left.n + right.n,
  links: [...left.links, ...right.links.map(([a, b]) => [a + left.n, b + left.n] as const)],
});

/** Pairs as the tests write them. */
export const pairsOf = ({ a, b }: PairEnds): [number, number][] =>
  Array.from(a, (end, k) => [end, b[k] ?? -1]);
