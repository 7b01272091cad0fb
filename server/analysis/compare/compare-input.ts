import { promisify } from "node:util";
import { gunzip, gzip } from "node:zlib";
import type { MixingAttribute } from "../../../shared/contracts/compare.ts";
import type { NetworkSummary } from "../../../shared/contracts/network.ts";

/** Pairs as two lists of person numbers. */
export type PairLists = { readonly a: readonly number[]; readonly b: readonly number[] };

/**
 * Everything a comparison is computed on: plain numbers and study numbers. It is stored with the run,
 * so that running it again and the download do not depend on later changes of the record.
 *
 * People are numbered 0, 1, 2, … in the order of their entry. On a record that was made by interviews
 * they are the people interviewed and those they named, or who named them; on a complete one, and
 * where nobody was interviewed, everybody of the population.
 */
export type CompareInput = {
  readonly format: 1;
  readonly population: NetworkSummary["population"];
  /** The declared population at risk where it counts, else people of the population on record. */
  readonly n: number;
  /** People of the population with a complete interview. */
  readonly interviewedPeople: number;
  /** Nothing is known of interviews: the pairs were brought in as a complete network. */
  readonly complete: boolean;
  readonly presetWindow: boolean;
  /** q̂, and the pairs of two interviewed people it rests on: named by both, by one only. */
  readonly recall: number | null;
  readonly namedByBoth: number;
  readonly namedByOne: number;
  readonly unresolvedGroupExposures: number;
  readonly undated: number;
  /** On record, but seen through no interview. */
  readonly leftOutPeople: number;
  readonly leftOutPairs: number;
  readonly studyNumbers: readonly string[];
  /** 1 = interviewed; null = no difference is made (complete, or nobody was). */
  readonly interviewed: readonly number[] | null;
  /** Interviewed people in the order of their interviews. */
  readonly order: readonly number[];
  readonly attribute: MixingAttribute | null;
  /** Words of the classes, and the class of each person, -1 = missing; null without an attribute. */
  readonly classes: readonly string[];
  readonly classOf: readonly number[] | null;
  /** Distinct pairs. */
  readonly pairs: PairLists;
  /** `a[k]` named `b[k]`; where the teller is not known, both ways. */
  readonly tellings: PairLists;
};

const zip = promisify(gzip);
const unzip = promisify(gunzip);

/** An input as it is stored: JSON, compressed. */
export async function packInput(input: CompareInput): Promise<Buffer> {
  return await zip(JSON.stringify(input));
}

/** Reads a stored input. @throws Error for bytes that are none, or of another format */
export async function unpackInput(bytes: Buffer): Promise<CompareInput> {
  const input = JSON.parse((await unzip(bytes)).toString("utf8")) as CompareInput;
  if (input.format !== 1) throw new Error("the stored input has a format that is not known");
  return input;
}
