import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import type { DueState } from "../../../components/day-strip/day-strip-row.ts";
import { addDays } from "../../../lib/calendar-day.ts";
import { formatDay } from "../../../lib/formatters.ts";

type Monitored = Pick<FollowUpItem, "dayZero" | "lastDueDay" | "dayNumber" | "monitoringDays">;

/**
 * The due days of a contact, day 1 to day M. Nothing is known here of visits, so a past day is
 * neither seen nor missed.
 */
export function dueDays(item: Monitored, today: string): { day: string; state: DueState }[] {
  return Array.from({ length: item.monitoringDays }, (_, index) => {
    const day = addDays(item.dayZero, index + 1);
    const state = day < today ? "no_check" : day === today ? "due" : "to_come";
    return { day, state };
  });
}

/** "day 6 of 14", "day 0, first due tomorrow", "ended on 3 Jun". */
export function dayWords(item: Monitored): string {
  const { dayNumber, monitoringDays, dayZero, lastDueDay } = item;
  if (dayNumber > monitoringDays) return `ended on ${formatDay(lastDueDay, { style: "short" })}`;
  if (dayNumber >= 1) return `day ${dayNumber} of ${monitoringDays}`;
  const first = formatDay(addDays(dayZero, 1), { style: "short" });
  return dayNumber === 0 ? "day 0, first due tomorrow" : `first due on ${first}`;
}

/** The strip of a contact in words, for readers. */
export function stripWords(item: Monitored, today: string): string {
  const days = dueDays(item, today);
  const count = (state: DueState) => days.filter((one) => one.state === state).length;
  const past = count("no_check");
  const parts = [
    ...(past > 0
      ? [`${past} past ${past === 1 ? "day" : "days"} without a check recorded here`]
      : []),
    ...(count("due") > 0 ? ["due today"] : []),
    `${count("to_come")} to come`,
  ];
  return `${dayWords(item)}: ${parts.join(", ")}; last due day ${formatDay(item.lastDueDay)}`;
}

/** One scale for all rows of a page: from the earliest first due day to the latest last one. */
export function commonScale(
  items: readonly Monitored[],
  today: string,
): { from: string; to: string } {
  let from = today;
  let to = today;
  for (const { dayZero, lastDueDay } of items) {
    const first = addDays(dayZero, 1);
    if (first < from) from = first;
    if (lastDueDay > to) to = lastDueDay;
  }
  return { from, to };
}
