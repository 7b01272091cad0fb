import type { NetworkSummary } from "../../shared/contracts/network.ts";
import { FULL_COVERAGE } from "../../shared/core/index.ts";
import { formatInterval, formatNumber, formatShare } from "./formatters.ts";
import { exposureWords } from "./population-words.ts";
import { reasonWords } from "./reason-words.ts";

/** What a report lets one say about the threshold, ready to be shown. */
export type ThresholdWords = {
  /** The one sentence under the strip. */
  sentence: string;
  /** What limits it or stands beside it, each a sentence of its own. */
  notes: readonly string[];
};

export type ThresholdContext = {
  /** Population at risk declared for the investigation, or null. */
  populationAtRisk: number | null;
};

type Region = "below" | "inside_window" | "above";

const openWords: Record<Region, string> = {
  below: "below it",
  inside_window: "inside the critical window",
  above: "above it",
};

/**
 * The finding in words: only what the verdict of the report allows, with the length of the window,
 * the people and how they were seen. Never works out a verdict of its own. Source: methods C.2.4
 * and the box at the head of C.8.
 */
export function thresholdSentence(
  summary: NetworkSummary,
  context: ThresholdContext,
): ThresholdWords {
  const seen = seenThrough(summary, context);
  const { pairsPerPerson, verdict } = summary.threshold;
  if (pairsPerPerson === null) {
    const why = reasonWords(summary.reasons["threshold.pairsPerPerson"]) ?? "no reason was given";
    return { sentence: `No figure can be given: ${why}.`, notes: [] };
  }
  const notes = notesOf(summary);
  if (verdict === null) return { sentence: withoutVerdict(summary, seen), notes };
  return { sentence: `${verdictWords(summary)}, in ${seen}${expectation(summary)}.`, notes };
}

/** Whether the expected share may stand beside the recorded one: only when nearly all were seen. */
export function mayCompareLargest({ threshold, coverage }: NetworkSummary): boolean {
  return threshold.population === "complete" || (coverage !== null && coverage >= FULL_COVERAGE);
}

function verdictWords(summary: NetworkSummary): string {
  const { verdict } = summary.threshold;
  if (verdict === "below") return "Below the random-mixing threshold of 1 contact pair per person";
  if (verdict === "above") return "Above the threshold of 1 contact pair per person";
  if (verdict === "inside_window") {
    return `Inside the critical window${windowWords(summary)}, where group sizes are dominated by chance`;
  }
  return "Not distinguishable from the threshold of 1 contact pair per person with this many people";
}

function windowWords({ threshold: { criticalHalfWidth: half } }: NetworkSummary): string {
  return half === null ? "" : ` (${formatInterval([Math.max(0, 1 - half), 1 + half])})`;
}

/** How the network was seen: exposures, who told, out of whom. */
function seenThrough(summary: NetworkSummary, context: ThresholdContext): string {
  const { threshold } = summary;
  const { n, interviewed } = threshold;
  const exposures = exposureWords(summary);
  if (threshold.population === "complete") {
    return `${exposures}, in a network taken as complete (${formatNumber(n)} people)`;
  }
  const people = peopleWords(summary, context);
  return `${exposures}, seen through interviews with ${formatNumber(interviewed)} of ${formatNumber(n)} ${people}`;
}

/** Who the n people of the threshold figure are. */
export function peopleWords(
  { population, threshold: { n } }: NetworkSummary,
  { populationAtRisk }: ThresholdContext,
): string {
  if (population === "cases") return "cases";
  return n === populationAtRisk ? "people at risk, as declared" : "people on record";
}

/** What random mixing would give above the threshold; a figure only where it may be compared. */
function expectation(summary: NetworkSummary): string {
  const { verdict, expectedGiantShare } = summary.threshold;
  if (verdict !== "above") return "";
  const size =
    mayCompareLargest(summary) && expectedGiantShare !== null
      ? `of about ${formatShare(expectedGiantShare)} of all people`
      : "holding a large share of all people";
  return `: under random mixing one connected group ${size} would be expected`;
}

function withoutVerdict(summary: NetworkSummary, seen: string): string {
  const { n, interviewed } = summary.threshold;
  const code = summary.reasons["threshold.verdict"];
  const why =
    code === "too_few_people"
      ? `fewer than 30 people, or fewer than 30 interviewed (${formatNumber(interviewed)} of ${formatNumber(n)})`
      : (reasonWords(code) ?? "no reason was given");
  return `Numbers without a verdict, because ${why}: ${seen}.`;
}

function notesOf(summary: NetworkSummary): string[] {
  const { threshold, reasons } = summary;
  const notes: string[] = [];
  const open = threshold.openVerdicts ?? [];
  if (threshold.verdict === "not_distinguishable" && open.length > 0) {
    const named = open.flatMap((region) =>
      region in openWords ? openWords[region as Region] : [],
    );
    notes.push(`Still open: ${listed(named)}.`);
    const why = reasonWords(reasons["threshold.verdict"]);
    if (why) notes.push(`“Below” is not said: ${why}.`);
  }
  if (threshold.verdict === null && reasons["threshold.verdict"] === "coverage_low") {
    notes.push(
      "A record into which people come only by being named has few people without a contact pair, " +
        "by construction.",
    );
  }
  const { recall, pairsPerPersonRecallCorrected: corrected } = threshold;
  if (typeof recall === "number" && typeof corrected === "number") {
    notes.push(
      `Corrected for recall (estimated at ${formatShare(recall)}): ` +
        `${formatNumber(corrected, { decimals: 2 })} contact pairs per person.`,
    );
  } else if (
    typeof recall !== "number" &&
    threshold.population === "interviewed" &&
    reasons["threshold.verdict"] !== "recall_unknown"
  ) {
    notes.push("No recall estimate yet: the figure is a lower bound.");
  }
  const { largestShare } = summary;
  const expected = threshold.expectedGiantShare ?? 0;
  // Up to 1 the expected share is 0, in the limit only: no figure to hold a real group against.
  if (largestShare !== null && expected > 0 && mayCompareLargest(summary)) {
    notes.push(
      `The largest recorded connected group holds ${formatShare(largestShare)}; random mixing would ` +
        `give about ${formatShare(expected)}. Real networks are clustered, so theirs is often smaller.`,
    );
  }
  return notes;
}

function listed(words: readonly string[]): string {
  if (words.length < 2) return words.join("");
  return `${words.slice(0, -1).join(", ")} or ${words.at(-1)}`;
}
