import type { CompareRun, CompareRunItem } from "../../../shared/contracts/compare.ts";
import { BURN_IN_PER_PAIR } from "../../../shared/core/index.ts";
import { type CompareInput, unpackInput } from "../../analysis/compare/compare-input.ts";

/** People of the file: study number, whether and as which they were interviewed, their class. */
function peopleOf(input: CompareInput) {
  const turn = new Map(input.order.map((person, at) => [person, at + 1]));
  return input.studyNumbers.map((studyNumber, person) => {
    const label = input.classOf?.[person] ?? -1;
    return {
      studyNumber,
      interviewed: input.interviewed ? input.interviewed[person] === 1 : null,
      interviewOrder: turn.get(person) ?? null,
      class: label < 0 ? null : (input.classes[label] ?? null),
    };
  });
}

function pairsOf({ studyNumbers }: CompareInput, { a, b }: CompareInput["pairs"]) {
  return a.map((u, k) => [studyNumbers[u] ?? "", studyNumbers[b[k] ?? -1] ?? ""]);
}

/**
 * The download of a run: everything needed to work it out elsewhere. People stand in the order of
 * their numbers in the core, so that a seed means the same draws; they have study numbers and no
 * identity. docs/recompute.md says how to check one.
 *
 * @param input the stored input, compressed
 */
export async function runFile(
  run: CompareRunItem,
  result: NonNullable<CompareRun["result"]>,
  input: Buffer,
): Promise<Buffer> {
  const stored = await unpackInput(input);
  const { can: _can, by: _by, ...told } = run;
  const file = {
    format: "strandline-comparison",
    formatVersion: 1,
    run: told,
    method: {
      coreVersion: run.coreVersion,
      generator: run.generator,
      seed: run.seed,
      stream: "replicate i of every baseline draws from the stream (seed, i), i = 0, 1, 2, …",
      burnInPerPair: BURN_IN_PER_PAIR,
      pValue: "(r + 1) / (N + 1), ties count; two-sided 2·min(upper, lower), at most 1",
      adjusted: "Holm over the measures of one baseline",
    },
    seen: {
      population: stored.population,
      n: stored.n,
      interviewed: stored.interviewedPeople,
      complete: stored.complete,
      presetWindow: stored.presetWindow,
      recall: stored.recall,
      namedByBoth: stored.namedByBoth,
      namedByOne: stored.namedByOne,
      unresolvedGroupExposures: stored.unresolvedGroupExposures,
      undated: stored.undated,
      leftOutPeople: stored.leftOutPeople,
      leftOutPairs: stored.leftOutPairs,
    },
    attribute: stored.attribute,
    people: peopleOf(stored),
    pairs: pairsOf(stored, stored.pairs),
    tellings: pairsOf(stored, stored.tellings),
    observed: Object.fromEntries(
      result.measures.map(({ statistic, observed }) => [statistic, observed]),
    ),
    result,
  };
  return Buffer.from(`${JSON.stringify(file)}\n`, "utf8");
}
