import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import { isSeen } from "../../../../shared/follow-state.ts";
import { type DueState, dueWords } from "../../../components/day-strip/day-strip-row.ts";
import type { PersonMarkInput } from "../../../components/person-mark/person-mark-input.ts";
import { addDays } from "../../../lib/calendar-day.ts";
import { dueState } from "../../../lib/due-state.ts";
import { formatDay } from "../../../lib/formatters.ts";

type Monitored = Pick<FollowUpItem, "dayZero" | "lastDueDay" | "dayNumber" | "monitoringDays">;
type Followed = Monitored & Pick<FollowUpItem, "dueDays" | "expectedFrom" | "state" | "lastCheck">;

/** The due days of a contact, day 1 to day M; of one who is none any more, up to the last check. */
export function dueDays(item: Followed, today: string): { day: string; state: DueState }[] {
  const over = item.state === "became_case" || item.state === "not_a_contact";
  const last = item.lastCheck?.day ?? "";
  return item.dueDays
    .filter(({ day }) => !over || day <= last)
    .map(({ day, outcome }) => ({
      day,
      state: dueState(day, outcome, today, item.expectedFrom),
    }));
}

/** Follow-up as a person mark draws it: the share of due days done, and whether it is broken. */
export function followMark(item: Followed): NonNullable<PersonMarkInput["followUp"]> {
  const done = item.dueDays.filter(({ outcome }) => isSeen(outcome)).length;
  const state = item.state === "completed" || item.state === "lost" ? item.state : "active";
  return { share: done / Math.max(1, item.dueDays.length), state };
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
export function stripWords(item: Followed, today: string): string {
  const days = dueDays(item, today);
  const parts = (Object.keys(dueWords) as DueState[]).flatMap((state) => {
    const count = days.filter((one) => one.state === state).length;
    if (count === 0) return [];
    return [state === "due" ? dueWords.due : `${count} ${dueWords[state]}`];
  });
  const said = parts.length > 0 ? parts.join(", ") : "no due days";
  return `${dayWords(item)}: ${said}; last due day ${formatDay(item.lastDueDay)}`;
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
