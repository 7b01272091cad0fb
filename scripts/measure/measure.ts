import { readFileSync } from "node:fs";
import { resolve } from "node:path";
import { buildGraph, networkReport, recall } from "../../shared/core/index.ts";
import { addedFigures } from "./added-figures.ts";
import { type Arguments, readArguments, USAGE } from "./read-arguments.ts";
import type { BadRow } from "./read-csv.ts";
import { readNetwork } from "./read-network.ts";

/** What to print and how to end: 0 with the report, 2 when the input cannot be used. */
export type Measured = {
  /** One JSON object, or null. */
  readonly output: string | null;
  readonly complaints: readonly string[];
  readonly code: 0 | 2;
};

const refused = (...complaints: string[]): Measured => ({ output: null, complaints, code: 2 });

/** One line about a known cause; parseArgs adds advice after the first sentence. */
function oneLine(error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  return message.split(/\n|\. /)[0] ?? message;
}

function readBytes(option: string, file: string, folder: string): Uint8Array {
  try {
    return readFileSync(resolve(folder, file));
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    const why =
      code === "ENOENT"
        ? "no such file"
        : code === "EISDIR"
          ? "is a folder"
          : `unreadable (${code})`;
    throw new Error(`--${option}: ${why}: ${file}`);
  }
}

const badLine = (bad: BadRow) => `line ${bad.line}: ${bad.column}: ${bad.code}`;

/** Bad rows of both files; which file is said only when there are two to choose from. */
function listFaults(people: readonly BadRow[] | null, pairs: readonly BadRow[]): string[] {
  if (people === null) return pairs.map(badLine);
  const part = (title: string, bad: readonly BadRow[]) =>
    bad.length > 0 ? [title, ...bad.map(badLine)] : [];
  return [...part("people file", people), ...part("pairs file", pairs)];
}

/**
 * The network report of CSV files with what is added to it, as one JSON object. Same files, same
 * arguments, same bytes out, with any number of workers.
 *
 * A people file with a column `interviewed` is read as the interviews of one preset window; recall
 * is estimated when the pairs say who named whom.
 *
 * @param args command-line arguments
 * @param folder folder that relative paths start from
 */
export async function measure(args: readonly string[], folder: string): Promise<Measured> {
  let options: Arguments;
  let pairsBytes: Uint8Array;
  let peopleBytes: Uint8Array | null;
  try {
    options = readArguments(args);
  } catch (error) {
    return refused(oneLine(error), ...(args.length === 0 ? [USAGE] : []));
  }
  try {
    pairsBytes = readBytes("pairs", options.pairs, folder);
    peopleBytes = options.people === null ? null : readBytes("people", options.people, folder);
  } catch (error) {
    return refused(oneLine(error));
  }

  const { attribute, population } = options;
  const { network, peopleFaults, pairsFaults } = readNetwork(pairsBytes, peopleBytes, attribute);
  if (network === null) {
    return refused(...listFaults(peopleBytes ? peopleFaults : null, pairsFaults));
  }
  const { n, ends, isInterviewed, doubleReports } = network;
  if (population !== null && population < n) {
    return refused(`--population: ${population} is fewer than the ${n} people in the files`);
  }
  if (attribute !== null && network.attribute === null) {
    return refused(`--attribute: the people file has no column "${attribute.slice(0, 40)}"`);
  }
  const estimate = doubleReports ? recall(doubleReports.both, doubleReports.one) : null;
  const graph = buildGraph(n, ends);
  const report = networkReport(graph, isInterviewed, {
    declaredPopulation: population,
    presetWindow: true,
    recall: estimate?.value ?? null,
  });
  const added = await addedFigures(graph, network, {
    ...options,
    recall: estimate?.value ?? null,
  });
  const reasons = { ...report.reasons, ...added.reasons };
  const output = JSON.stringify({ ...report, ...added.figures, reasons });
  return { output, complaints: [], code: 0 };
}
