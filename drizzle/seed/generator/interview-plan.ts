import { type Calendar, DAY_MINUTES, dayOf } from "./calendar.ts";
import { itemAt } from "./item-at.ts";
import { createRng, type Rng } from "./rng.ts";
import type { CaseCourse } from "./spread.ts";
import type { Interview } from "./types.ts";

/** A conversation with a case (or a try at one) that will be recorded at a known minute. */
export interface PlannedInterview {
  caseIndex: number;
  at: number;
  recorded: number;
  outcome: Interview["outcome"];
  channel: Interview["channel"];
  /** Relative number of names to expect; 0 when nobody is named. */
  weight: number;
  late: boolean;
}

const OPENING = 8 * 60 + 30;
const CLOSING = 18 * 60 + 30;

/** First working minute at or after the given one. */
function workingMinute(minute: number, rng: Rng): number {
  const clock = minute % DAY_MINUTES;
  if (clock < OPENING) return dayOf(minute) * DAY_MINUTES + OPENING + rng.below(180);
  if (clock > CLOSING) return (dayOf(minute) + 1) * DAY_MINUTES + OPENING + rng.below(180);
  return minute;
}

/**
 * All interviews that were recorded by the end of the story, in order of recording. Some cases are
 * never reached, some refuse, a part come in days late, and the newest still wait their turn.
 */
export function planInterviews(
  seed: number,
  calendar: Calendar,
  cases: readonly CaseCourse[],
): PlannedInterview[] {
  const rng = createRng(seed, 6);
  const plans: PlannedInterview[] = [];
  for (const [caseIndex, course] of cases.entries()) {
    const roll = rng.next();
    const outcome =
      roll < 0.82 ? "complete" : roll < 0.89 ? "partial" : roll < 0.94 ? "refused" : "unreachable";
    const wait = rng.pick([0, 0, 0, 1, 1, 1, 1, 2, 2, 3]);
    let minute = workingMinute(
      wait === 0
        ? course.reportMinute + rng.between(50, 240)
        : course.reportMinute + wait * DAY_MINUTES + rng.between(-180, 120),
      rng,
    );
    const tries = outcome === "unreachable" ? 2 : rng.chance(0.2) ? 1 : 0;
    for (let i = 0; i < tries; i += 1) {
      plans.push(plan(caseIndex, minute, "attempted", 0));
      minute = workingMinute(minute + rng.between(90, 1300), rng);
    }
    const names = rng.chance(0.05) ? 0 : 0.12 + rng.gamma(1.9);
    if (outcome === "partial") {
      plans.push(plan(caseIndex, minute, "partial", names * 0.5));
      if (rng.chance(0.5)) {
        const again = workingMinute(minute + rng.between(900, 2000), rng);
        plans.push(plan(caseIndex, again, "complete", names * 0.5));
      }
    } else plans.push(plan(caseIndex, minute, outcome, outcome === "complete" ? names : 0));
  }

  function plan(
    caseIndex: number,
    at: number,
    outcome: Interview["outcome"],
    weight: number,
  ): PlannedInterview {
    const late = outcome === "complete" && rng.chance(0.09);
    const recorded = late
      ? (dayOf(at) + rng.between(1, 4)) * DAY_MINUTES + rng.between(OPENING, CLOSING)
      : at + rng.between(12, 75);
    const channel = rng.chance(0.8) ? "telephone" : "visit";
    return { caseIndex, at, recorded, outcome, channel, weight, late };
  }

  return plans
    .filter((entry) => entry.recorded <= calendar.end)
    .sort((a, b) => a.recorded - b.recorded || a.caseIndex - b.caseIndex);
}

/** Sum of weights from each position on, for sharing out names that are still to be told. */
export function remainingWeights(plans: readonly PlannedInterview[]): Float64Array {
  const rest = new Float64Array(plans.length + 1);
  for (let i = plans.length - 1; i >= 0; i -= 1)
    rest[i] = itemAt(rest, i + 1) + itemAt(plans, i).weight;
  return rest;
}
