import { parseArgs } from "node:util";

export type Arguments = {
  readonly pairs: string;
  readonly people: string | null;
  readonly population: number | null;
  /** Accepted so that callers may fix it; no figure of this command is drawn at random. */
  readonly seed: number | null;
};

export const USAGE = "usage: measure --pairs FILE [--people FILE] [--population N] [--seed N]";

/** A whole number >= 0 that a double holds exactly, in plain digits. */
function wholeNumber(name: string, text: string | undefined): number | null {
  if (text === undefined) return null;
  const value = Number(text);
  if (!/^\d+$/.test(text) || !Number.isSafeInteger(value)) {
    throw new Error(`--${name}: must be a whole number`);
  }
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
    options: { pairs: text, people: text, population: text, seed: text },
    strict: true,
    allowPositionals: false,
  });
  for (const [name, given] of Object.entries(values)) {
    if (given.length > 1) throw new Error(`--${name}: given more than once`);
    if (given[0] === "") throw new Error(`--${name}: must not be empty`);
  }
  const pairs = values.pairs?.[0];
  if (pairs === undefined) throw new Error("--pairs: is needed");
  return {
    pairs,
    people: values.people?.[0] ?? null,
    population: wholeNumber("population", values.population?.[0]),
    seed: wholeNumber("seed", values.seed?.[0]),
  };
}
