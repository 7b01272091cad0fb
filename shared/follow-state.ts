import type { CheckOutcome, Classification, FollowEnd, FollowState } from "./vocabulary.ts";
import { CHECK_OUTCOMES, isCase } from "./vocabulary.ts";
import { addDays } from "./windows.ts";

/** What the state of a contact's follow-up is derived from. Days are local to the investigation. */
export interface FollowFacts {
  classification: Classification | null;
  /** A recorded end that has not been taken back. */
  ended: FollowEnd | null;
  /** Day of the last exposure; null while it is not known to the day. */
  dayZero: string | null;
  /** M: follow-up is due on days 1 … M after day 0. */
  monitoringDays: number;
  today: string;
  /** First day on which the absence of a check counts as missed. */
  expectedFrom: string;
  /** N: due days in a row without being reached after which a contact is lost. */
  lostAfterDays: number;
  checks: readonly { day: string; outcome: CheckOutcome }[];
}

/**
 * First day on which the absence of a check counts as missed: the day after somebody came on record,
 * since nobody could have called before; or the day of reopening, since nobody had to before it.
 */
export function expectedSince(onRecord: string, reopenedOn: string | null): string {
  const next = addDays(onRecord, 1);
  return reopenedOn !== null && reopenedOn > next ? reopenedOn : next;
}

/** Best outcome of each day on which there was a check. */
export function bestOutcomes(checks: FollowFacts["checks"]): Map<string, CheckOutcome> {
  const best = new Map<string, CheckOutcome>();
  const rank = (outcome: CheckOutcome) => CHECK_OUTCOMES.indexOf(outcome);
  for (const { day, outcome } of checks) {
    const known = best.get(day);
    if (known === undefined || rank(outcome) < rank(known)) best.set(day, outcome);
  }
  return best;
}

/** Seen in person or spoken to: the contact's state is known. A message alone says nothing of it. */
export function isSeen(outcome: CheckOutcome | null | undefined): boolean {
  return outcome === "seen" || outcome === "spoken";
}

/** Due days in a row, up to today, on which the contact was not reached or nobody tried. */
function missedInARow(facts: FollowFacts, best: ReadonlyMap<string, CheckOutcome>): number {
  if (facts.dayZero === null) return 0;
  let missed = 0;
  for (let number = facts.monitoringDays; number >= 1; number -= 1) {
    const day = addDays(facts.dayZero, number);
    const outcome = best.get(day);
    if (day > facts.today) continue;
    if (outcome === undefined) {
      // Today is still open, and before coming on record nobody could have called.
      if (day === facts.today) continue;
      if (day < facts.expectedFrom) break;
    } else if (outcome !== "not_reached") break;
    missed += 1;
  }
  return missed;
}

/**
 * State of a contact's follow-up (methods A.2, A.3). Completed only when the contact was seen or
 * spoken to on day M or after it; a new exposure moves day 0 and keeps the checks, so a completed
 * follow-up may open again. Lost ends as soon as the contact is reached. An end that somebody recorded
 * stands until it is taken back; only becoming a case goes before it. Without a day 0 nothing is due,
 * so nobody is completed or lost.
 */
export function followState(facts: FollowFacts): FollowState {
  if (isCase(facts.classification)) return "became_case";
  if (facts.classification === "not_a_case") return "not_a_contact";
  if (facts.ended !== null) return facts.ended;
  const best = bestOutcomes(facts.checks);
  const lastDue = facts.dayZero === null ? null : addDays(facts.dayZero, facts.monitoringDays);
  for (const [day, outcome] of best) {
    if (lastDue !== null && day >= lastDue && isSeen(outcome)) return "completed";
  }
  if (missedInARow(facts, best) >= facts.lostAfterDays) return "lost";
  for (const outcome of best.values()) if (outcome !== "not_reached") return "under_follow_up";
  return "to_be_notified";
}
