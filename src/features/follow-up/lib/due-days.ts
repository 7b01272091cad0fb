import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import { isSeen } from "../../../../shared/follow-state.ts";
import { type DueState, dueWords } from "../../../components/day-strip/day-strip-row.ts";
import type { PersonMarkInput } from "../../../components/person-mark/person-mark-input.ts";
import { addDays } from "../../../lib/calendar-day.ts";
import { dueState } from "../../../lib/due-state.ts";
import { formatDay } from "../../../lib/formatters.ts";

type Monitored = Pick<FollowUpItem, "dayZero" | "lastDueDay" | "dayNumber" | "monitoringDays">;
type Followed = Monitored &
  Pick<FollowUpItem, "dueDays" | "expectedFrom" | "state" | "lastCheck" | "end">;

/**
 * The due days of a contact, day 1 to day M; of one who is none any more, up to the last check, and
 * of an ended follow-up up to the day of its end.
 */
export function dueDays(item: Followed, today: string): { day: string; state: DueState }[] {
  const over = item.state === "became_case" || item.state === "not_a_contact";
  const checked = item.lastCheck?.day ?? "";
  const ended = item.end?.day ?? "9999-12-31";
  return item.dueDays
    .filter(({ day }) => day <= checked || (!over && day <= ended))
    .map(({ day, outcome }) => ({
      day,
      state: dueState(day, outcome, today, item.expectedFrom),
    }));
}

/** Follow-up as a person mark draws it: the share of due days done, and whether it goes on. */
export function followMark(item: Followed): NonNullable<PersonMarkInput["followUp"]> {
  const done = item.dueDays.filter(({ outcome }) => isSeen(outcome)).length;
  const share = done / Math.max(1, item.dueDays.length);
  if (item.end && item.state === item.end.reason) return { share, state: "ended" };
  const state = item.state === "completed" || item.state === "lost" ? item.state : "active";
  return { share, state };
}

/** "day 6 of 14", "day 0, first due tomorrow", "ended on 3 Jun", "no day 0". */
export function dayWords(item: Monitored): string {
  const { dayNumber, monitoringDays, dayZero, lastDueDay } = item;
  if (dayNumber === null || dayZero === null || lastDueDay === null) return "no day 0";
  if (dayNumber > monitoringDays) return `ended on ${formatDay(lastDueDay, { style: "short" })}`;
  if (dayNumber >= 1) return `day ${dayNumber} of ${monitoringDays}`;
  const first = formatDay(addDays(dayZero, 1), { style: "short" });
  return dayNumber === 0 ? "day 0, first due tomorrow" : `first due on ${first}`;
}

/** The strip of a contact in words, for readers. */
export function stripWords(item: Followed, today: string): string {
  if (item.lastDueDay === null) return "no day 0: no due days";
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
    if (dayZero === null || lastDueDay === null) continue;
    const first = addDays(dayZero, 1);
    if (first < from) from = first;
    if (lastDueDay > to) to = lastDueDay;
  }
  return { from, to };
}
