import {
  karate,
  lesMiserables,
  type PublishedNetwork,
} from "../../core/support/published-networks.ts";

/** Two files as the import takes them. */
export interface NetworkFiles {
  people: string;
  pairs: string;
}

const csv = (rows: readonly (readonly string[])[]) =>
  rows.map((row) => `${row.join(",")}\n`).join("");

const ref = (letter: string, index: number) => `${letter}${String(index + 1).padStart(4, "0")}`;

/** A published network as bare references: nobody's name, no days, no word on interviews. */
function filesOf({ n, links }: PublishedNetwork, letter: string): NetworkFiles {
  const people = Array.from({ length: n }, (_, index) => [ref(letter, index)]);
  const pairs = links.map(([a, b]) => [ref(letter, a), ref(letter, b)]);
  return { people: csv([["ref"], ...people]), pairs: csv([["ref_a", "ref_b"], ...pairs]) };
}

/** Zachary 1977, from graphology-generators. */
export const karateFiles = (): NetworkFiles => filesOf(karate(), "Z");

/** Knuth 1993, co-appearance in Les Misérables, from vega-datasets. */
export const lesMiserablesFiles = (): NetworkFiles => filesOf(lesMiserables(), "M");

/**
 * The interviewed fixture of methods C.8: 100 of 1,000 people interviewed, 475 pairs with an
 * interviewed end. Any such pairs give the same figure; these are spread over all interviewed.
 */
export function interviewedFiles(): NetworkFiles {
  const [n, interviewed, m] = [1_000, 100, 475];
  const people = Array.from({ length: n }, (_, index) => [
    ref("P", index),
    index < interviewed ? "yes" : "no",
  ]);
  // The k-th pair joins one interviewed person to one who was not, each of the latter once.
  const pairs = Array.from({ length: m }, (_, k) => [
    ref("P", k % interviewed),
    ref("P", interviewed + k),
  ]);
  return {
    people: csv([["ref", "interviewed"], ...people]),
    pairs: csv([["ref_a", "ref_b"], ...pairs]),
  };
}
