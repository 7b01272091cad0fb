import { isSeen } from "../../shared/follow-state.ts";
import type { CheckOutcome } from "../../shared/vocabulary.ts";
import type { DueState } from "../components/day-strip/day-strip-row.ts";

/**
 * How a due day is drawn. A day gone by without a check is missed from the day on which a check
 * could be expected; before it, the contact was not on record yet and nothing is said.
 */
export function dueState(
  day: string,
  outcome: CheckOutcome | null | undefined,
  today: string,
  expectedFrom: string,
): DueState {
  if (day > today) return "to_come";
  if (isSeen(outcome)) return "seen";
  if (outcome === "message") return "message";
  // Today can still be made good.
  if (day === today) return "due";
  if (outcome === "not_reached") return "missed";
  return day < expectedFrom ? "no_check" : "missed";
}
