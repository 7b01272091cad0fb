import type {
  Baseline,
  CompareRunInput,
  CompareRunItem,
  MixingAttribute,
} from "../../../shared/contracts/compare.ts";
import type { QuickStatistic } from "../../../shared/core/index.ts";
import { formatDay, formatInstant, formatShare } from "../../lib/formatters.ts";
import { exposureWords } from "../../lib/population-words.ts";

export const attributeWords: Readonly<Record<MixingAttribute, string>> = {
  age_band: "age band",
  area: "area",
  setting: "setting of the contact",
  interviewed: "interviewed or not",
  household: "household",
};

/** What the numbers of random networks are good for. */
export const replicateWords: Readonly<Record<CompareRunInput["replicates"], string>> = {
  199: "199, a quick look",
  999: "999, for the daily work",
  9999: "9,999, before something is published",
};

/** Names of the baselines: short for a column head, and what is held fixed in each. */
export const baselineWords: Readonly<Record<Baseline, { short: string; held: string }>> = {
  traced: {
    short: "random mixing, same interviews",
    held: "people mix at random and are then seen through as many interviews, traced the same way",
  },
  gnm: {
    short: "random mixing",
    held: "as many people and contact pairs, the pairs placed anywhere at random",
  },
  degreePreserving: {
    short: "numbers of pairs kept",
    held: "everybody keeps their number of contact pairs; with whom is left to chance",
  },
  degreePreservingInterviewedEnd: {
    short: "numbers of pairs kept, one interviewed",
    held: "everybody keeps their number of contact pairs, and each pair one interviewed person",
  },
  mixing: {
    short: "who mixes with whom kept",
    held: "as many contact pairs inside and between the classes of the attribute, at random in them",
  },
};

type StatisticWords = {
  name: string;
  /** What it is, in words for somebody who does not work with networks. */
  meaning: string;
  decimals: number;
};

/** Names and meanings of the measures; network terms are explained where they appear. */
export const statisticWords: Readonly<Record<QuickStatistic, StatisticWords>> = {
  people: { name: "people on record", meaning: "everybody in the network", decimals: 0 },
  pairs: { name: "contact pairs", meaning: "two people who met, counted once", decimals: 0 },
  groups: {
    name: "connected groups",
    meaning: "people joined by a line of contact pairs, one group each; somebody alone counts too",
    decimals: 0,
  },
  largestGroup: {
    name: "largest connected group, people",
    meaning: "people in the connected group that holds most",
    decimals: 0,
  },
  isolates: {
    name: "people without a contact pair",
    meaning: "on record, joined to nobody",
    decimals: 0,
  },
  meanSmallGroup: {
    name: "mean size of the other groups",
    meaning: "people per connected group, the largest left out",
    decimals: 2,
  },
  meanSmallGroupOfPerson: {
    name: "group of a person outside the largest",
    meaning: "pick anybody who is not in the largest group: how many are in theirs, on average",
    decimals: 2,
  },
  sizeSquares: {
    name: "group of a person picked at random",
    meaning: "pick anybody: how many are in their connected group, on average",
    decimals: 2,
  },
  meanDegree: {
    name: "mean number of contact pairs",
    meaning: "of a person; of an interviewed person where the network came by interviews",
    decimals: 3,
  },
  degreeVariance: {
    name: "spread of the number of contact pairs",
    meaning: "variance; about the mean itself under random mixing",
    decimals: 3,
  },
  maxDegree: {
    name: "most contact pairs of one person",
    meaning: "the largest number that anybody has",
    decimals: 0,
  },
  triangles: { name: "triangles", meaning: "three people who all met one another", decimals: 0 },
  transitivity: {
    name: "transitivity",
    meaning: "of two contact pairs that meet in a person, the share closed by a third pair",
    decimals: 4,
  },
  averageClustering: {
    name: "average clustering",
    meaning: "the same share, worked out for each person and averaged; under two pairs counts as 0",
    decimals: 4,
  },
  degreeAssortativity: {
    name: "like with like by number of pairs",
    meaning: "correlation of the numbers of pairs at both ends (degree assortativity), −1 to 1",
    decimals: 4,
  },
  attributeAssortativity: {
    name: "like with like by the attribute",
    meaning:
      "assortativity: 1 when all pairs stay inside their class, 0 when classes do not matter",
    decimals: 4,
  },
  ei: {
    name: "E–I index of the attribute",
    meaning:
      "pairs between classes less pairs inside, as a share of all: −1 inside only, 1 between",
    decimals: 4,
  },
  attributeModularity: {
    name: "modularity of the attribute",
    meaning: "share of pairs inside classes, less what the numbers of pairs alone would give",
    decimals: 4,
  },
};

export const monotoneWords = {
  up: "can only rise",
  down: "can only fall",
  either: "either way",
} as const;

/** Whether the reader may stop or delete a run; the server says so, and refuses otherwise. */
export function mayChange({ can }: Pick<CompareRunItem, "can">): boolean {
  return can?.change !== false;
}

/** State of a run in a word or two, with how far it is. */
export function runStateWords(run: CompareRunItem): string {
  if (run.state === "running") {
    return run.progress === 0 ? "waiting" : `running, ${formatShare(run.progress)}`;
  }
  if (run.state === "ready") {
    return run.reached < run.replicates ? "ready, time ran out" : "ready";
  }
  return run.state === "failed" ? "failed" : "cancelled";
}

/** The day or instant as of which the record was read. */
export function asOfWords({ asOf }: Pick<CompareRunItem, "asOf">, timeZone: string): string {
  return asOf.length === 10 ? `the end of ${formatDay(asOf)}` : formatInstant(asOf, timeZone);
}

/** Which exposures a run counted. */
export function runExposureWords(run: CompareRunItem): string {
  if (run.window === "all") return "all exposures, dated or not";
  // The days of a preset window follow the record; only a run that is ready has them.
  if (run.window === "preset" && run.from === null && run.to === null) {
    return "exposures of one infectious window";
  }
  return exposureWords({ window: run.window, from: run.from, to: run.to });
}
