import type { NetworkSummary } from "../../shared/contracts/network.ts";
import { daysBetween } from "./calendar-day.ts";
import { formatCount, formatDay } from "./formatters.ts";

/** Names of the populations a report can be about. */
export const populationNames: Record<NetworkSummary["population"], string> = {
  all: "all people on record",
  cases: "cases",
  interviewed: "interviewed people",
};

/** Length of a range of exposure days, both ends counted; null when an end is open. */
export function daysInRange(from: string | null, to: string | null): number | null {
  const days = from !== null && to !== null ? daysBetween(from, to) : null;
  return days === null ? null : days + 1;
}

/** "15 May 2026 to 27 May 2026", "from …", "until …"; null when both ends are open. */
export function rangeDays(from: string | null, to: string | null): string | null {
  if (from !== null && to !== null) return `${formatDay(from)} to ${formatDay(to)}`;
  if (from !== null) return `from ${formatDay(from)}`;
  return to === null ? null : `until ${formatDay(to)}`;
}

/** Which exposures were counted: "exposures of one infectious window (13 days, …)". */
export function exposureWords({
  window,
  from,
  to,
}: Pick<NetworkSummary, "window" | "from" | "to">): string {
  const range = rangeDays(from, to);
  if (range === null) return "all exposures, dated or not";
  const days = daysInRange(from, to);
  const length = days === null ? "" : `${formatCount(days, "day", "days")}, `;
  return window === "preset"
    ? `exposures of one infectious window (${length}${range})`
    : `exposures of a freely chosen range (${length}${range})`;
}
