import type { FollowUpItem } from "../../../shared/contracts/follow-up.ts";
import { dayNumber } from "../../../shared/core/index.ts";
import type { Classification } from "../../../shared/vocabulary.ts";
import { shiftDay } from "../../clock.ts";
import type { OpenedPeople } from "../../identity/records.ts";
import type { FollowUpRow } from "./queries.ts";

/** Whole days from one day to another. */
function daysBetween(from: string, to: string): number {
  const [first, last] = [dayNumber(from), dayNumber(to)];
  if (first === null || last === null) throw new Error("follow-up counts between whole days");
  return last - first;
}

/**
 * A contact under follow-up: day 0 is the last exposure day, `dayNumber` is today's, and follow-up
 * is due on days 1 … M. Name and number are there only where they are the acting person's to know.
 */
export function presentFollowUp(
  row: FollowUpRow,
  opened: OpenedPeople,
  today: string,
  monitoringDays: number,
): FollowUpItem {
  const identity = opened.get(row.id);
  return {
    id: row.id,
    studyNumber: row.studyNumber,
    ...(row.mine ? { name: identity?.name ?? null, phone: identity?.phone ?? null } : {}),
    area: row.area,
    classification: row.classification as Classification | null,
    assignedTo: row.assignedTo,
    dayZero: row.dayZero,
    lastDueDay: shiftDay(row.dayZero, monitoringDays),
    dayNumber: daysBetween(row.dayZero, today),
    monitoringDays,
  };
}
