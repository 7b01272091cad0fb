import type { DayZeroGap, FollowUpItem } from "../../../shared/contracts/follow-up.ts";
import { dayNumber } from "../../../shared/core/index.ts";
import { bestOutcomes, expectedSince, followState } from "../../../shared/follow-state.ts";
import type { Classification } from "../../../shared/vocabulary.ts";
import { dayIn, shiftDay } from "../../clock.ts";
import type { OpenedPeople } from "../../identity/records.ts";
import type { InvestigationRow } from "../investigations/store.ts";
import type { FollowUpRow } from "./queries.ts";
import type { CheckRow, EndState } from "./store.ts";

/** Whole days from one day to another. */
function daysBetween(from: string, to: string): number {
  const [first, last] = [dayNumber(from), dayNumber(to)];
  if (first === null || last === null) throw new Error("follow-up counts between whole days");
  return last - first;
}

/**
 * A contact under follow-up: day 0 is the last exposure day, `dayNumber` is today's, and follow-up
 * is due on days 1 … M. Name and number are there only where they are the acting person's to know.
 *
 * @param kept.checks this contact's checks, oldest first
 * @param kept.ends what was said of its end
 * @param kept.gap why it has no day 0, where it has none
 */
export function presentFollowUp(
  row: FollowUpRow,
  opened: OpenedPeople,
  kept: { checks: readonly CheckRow[]; ends: EndState | undefined; gap: DayZeroGap | undefined },
  today: string,
  settings: Pick<InvestigationRow, "monitoringDays" | "lostAfterDays" | "timeZone">,
): FollowUpItem {
  const identity = opened.get(row.id);
  const { monitoringDays, lostAfterDays } = settings;
  const classification = row.classification as Classification | null;
  const { dayZero } = row;
  const { checks, ends } = kept;
  const reopenedOn = ends?.reopenedOn ?? null;
  const expectedFrom = expectedSince(dayIn(settings.timeZone, row.recordedAt), reopenedOn);
  const best = bestOutcomes(checks);
  const last = checks.at(-1);
  return {
    id: row.id,
    studyNumber: row.studyNumber,
    ...(row.mine ? { name: identity?.name ?? null, phone: identity?.phone ?? null } : {}),
    area: row.area,
    classification,
    assignedTo: row.assignedTo,
    mine: row.mine,
    version: row.version,
    dayZero,
    lastDueDay: dayZero === null ? null : shiftDay(dayZero, monitoringDays),
    dayNumber: dayZero === null ? null : daysBetween(dayZero, today),
    dayZeroGap: dayZero === null ? (kept.gap ?? "not_known") : null,
    monitoringDays,
    state: followState({
      classification,
      ended: ends?.standing?.reason ?? null,
      dayZero,
      monitoringDays,
      today,
      expectedFrom,
      lostAfterDays,
      checks,
    }),
    symptomatic: row.symptomatic,
    lastCheck: last
      ? {
          day: last.day,
          outcome: last.outcome,
          symptoms: last.symptoms,
          recordedAt: last.recordedAt,
        }
      : null,
    end: ends?.standing ?? null,
    reopenedOn,
    expectedFrom,
    dueDays:
      dayZero === null
        ? []
        : Array.from({ length: monitoringDays }, (_, index) => {
            const day = shiftDay(dayZero, index + 1);
            return { day, outcome: best.get(day) ?? null };
          }),
    together: row.together,
  };
}
