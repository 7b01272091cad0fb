import { z } from "zod";
import {
  type CompareRun,
  type CompareRunItem,
  compareRunAnswer,
  compareRunItem,
  MIXING_ATTRIBUTES,
} from "../../../shared/contracts/compare.ts";
import { POPULATIONS } from "../../../shared/contracts/network.ts";
import { BURN_IN_PER_PAIR } from "../../../shared/core/index.ts";
import type { CompareInput, PairLists } from "./compare-input.ts";

const ends = z.array(z.tuple([z.string(), z.string()]));

/** The download of a run, as far as it is needed to work the run out again. */
export const comparisonFile = z.object({
  format: z.literal("strandline-comparison"),
  formatVersion: z.literal(1),
  run: compareRunItem.omit({ can: true, by: true }),
  method: z.object({ seed: z.int(), coreVersion: z.string(), burnInPerPair: z.int() }),
  seen: z.object({
    population: z.enum(POPULATIONS),
    n: z.int(),
    interviewed: z.int(),
    complete: z.boolean(),
    presetWindow: z.boolean(),
    recall: z.number().nullable(),
    namedByBoth: z.int(),
    namedByOne: z.int(),
    unresolvedGroupExposures: z.int(),
    undated: z.int(),
    leftOutPeople: z.int(),
    leftOutPairs: z.int(),
  }),
  attribute: z.enum(MIXING_ATTRIBUTES).nullable(),
  classes: z.array(z.string()),
  people: z.array(
    z.object({
      studyNumber: z.string(),
      /** Null where no difference is made. */
      interviewed: z.boolean().nullable(),
      /** 1 = the first interview. */
      interviewOrder: z.int().nullable(),
      class: z.string().nullable(),
    }),
  ),
  pairs: ends,
  /** Who named whom; both ways where the teller is not known. */
  tellings: ends,
  result: compareRunAnswer.shape.result.unwrap(),
});
export type ComparisonFile = z.output<typeof comparisonFile>;

function peopleOf(input: CompareInput): ComparisonFile["people"] {
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

/**
 * The download of a run: everything needed to work it out elsewhere. People stand in the order of
 * their numbers in the core, and pairs in theirs, so that a seed means the same draws; they have
 * study numbers and no identity. docs/recompute.md says how to check one.
 */
export function runFile(
  run: CompareRunItem,
  result: NonNullable<CompareRun["result"]>,
  input: CompareInput,
) {
  const { can: _can, by: _by, ...told } = run;
  const { studyNumbers } = input;
  const pairsOf = ({ a, b }: PairLists) =>
    a.map((u, k): [string, string] => [studyNumbers[u] ?? "", studyNumbers[b[k] ?? -1] ?? ""]);
  return {
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
      population: input.population,
      n: input.n,
      interviewed: input.interviewedPeople,
      complete: input.complete,
      presetWindow: input.presetWindow,
      recall: input.recall,
      namedByBoth: input.namedByBoth,
      namedByOne: input.namedByOne,
      unresolvedGroupExposures: input.unresolvedGroupExposures,
      undated: input.undated,
      leftOutPeople: input.leftOutPeople,
      leftOutPairs: input.leftOutPairs,
    },
    attribute: input.attribute,
    classes: input.classes,
    people: peopleOf(input),
    pairs: pairsOf(input.pairs),
    tellings: pairsOf(input.tellings),
    observed: Object.fromEntries(
      result.measures.map(({ statistic, observed }) => [statistic, observed]),
    ),
    result,
  };
}

/**
 * The input of a run, read back from its download.
 * @throws Error for a pair whose end is not among the people
 */
export function inputOfFile(file: ComparisonFile): CompareInput {
  const { seen, people, classes } = file;
  const numberOf = new Map(people.map(({ studyNumber }, person) => [studyNumber, person]));
  const lists = (pairs: ComparisonFile["pairs"]): PairLists => {
    const at = (name: string) => {
      const person = numberOf.get(name);
      if (person === undefined) throw new Error(`${name} is not among the people`);
      return person;
    };
    return { a: pairs.map(([one]) => at(one)), b: pairs.map(([, other]) => at(other)) };
  };
  const turns = people.flatMap(({ interviewOrder }, person) =>
    interviewOrder === null ? [] : [[interviewOrder, person] as const],
  );
  const { interviewed: interviewedPeople, ...rest } = seen;
  const noDifference = people.every(({ interviewed }) => interviewed === null);
  return {
    format: 1,
    ...rest,
    interviewedPeople,
    studyNumbers: people.map(({ studyNumber }) => studyNumber),
    interviewed: noDifference ? null : people.map((one) => (one.interviewed ? 1 : 0)),
    order: turns.sort(([one], [other]) => one - other).map(([, person]) => person),
    attribute: file.attribute,
    classes,
    classOf:
      file.attribute === null
        ? null
        : people.map((one) => (one.class === null ? -1 : classes.indexOf(one.class))),
    pairs: lists(file.pairs),
    tellings: lists(file.tellings),
  };
}
