import { parseArgs } from "node:util";
import { type AddedName, namesOf } from "./report-names.ts";

export type Arguments = {
  readonly pairs: string;
  readonly people: string | null;
  readonly population: number | null;
  /** Column of the people file by which mixing is measured. */
  readonly attribute: string | null;
  /** Replicates of each baseline; null when not said. */
  readonly replicates: number | null;
  readonly seed: number | null;
  /** Threads; null when not said. No figure depends on it. */
  readonly workers: number | null;
  /** Figures to add to the report, exact whatever the size; null = all. */
  readonly only: ReadonlySet<AddedName> | null;
};

export const USAGE =
  "usage: measure --pairs FILE [--people FILE] [--population N] [--attribute COLUMN] " +
  "[--replicates N] [--seed N] [--workers N] [--only NAME,NAME]";

/** More would not fit in memory with every figure of each. */
const MOST_REPLICATES = 1_000_000;
const MOST_WORKERS = 64;

/** A whole number in plain digits, that a double holds exactly, between the two limits. */
function wholeNumber(
  name: string,
  text: string | undefined,
  least = 0,
  most = Number.MAX_SAFE_INTEGER,
): number | null {
  if (text === undefined) return null;
  const value = Number(text);
  if (!/^\d+$/.test(text) || !Number.isSafeInteger(value)) {
    throw new Error(`--${name}: must be a whole number`);
  }
  if (value < least) throw new Error(`--${name}: must be at least ${least}`);
  if (value > most) throw new Error(`--${name}: must be at most ${most}`);
  return value;
}

/**
 * The options of the command.
 * @throws Error whose message is one line for the caller
 */
export function readArguments(args: readonly string[]): Arguments {
  const text = { type: "string", multiple: true } as const;
  const { values } = parseArgs({
    args: [...args],
    options: {
      pairs: text,
      people: text,
      population: text,
      attribute: text,
      replicates: text,
      seed: text,
      workers: text,
      only: text,
    },
    strict: true,
    allowPositionals: false,
  });
  for (const [name, given] of Object.entries(values)) {
    if (given.length > 1) throw new Error(`--${name}: given more than once`);
    if (given[0] === "") throw new Error(`--${name}: must not be empty`);
  }
  const pairs = values.pairs?.[0];
  if (pairs === undefined) throw new Error("--pairs: is needed");
  const people = values.people?.[0] ?? null;
  const attribute = values.attribute?.[0]?.trim() ?? null;
  if (attribute !== null && people === null) {
    throw new Error("--attribute: needs --people, whose column it names");
  }
  const only = values.only?.[0];
  return {
    pairs,
    people,
    population: wholeNumber("population", values.population?.[0]),
    attribute,
    replicates: wholeNumber("replicates", values.replicates?.[0], 1, MOST_REPLICATES),
    seed: wholeNumber("seed", values.seed?.[0]),
    workers: wholeNumber("workers", values.workers?.[0], 1, MOST_WORKERS),
    only: only === undefined ? null : namesOf(only),
  };
}
