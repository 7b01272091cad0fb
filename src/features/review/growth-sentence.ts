import type { Group } from "../../../shared/contracts/network.ts";
import { formatCount, formatNumber } from "../../lib/formatters.ts";

/**
 * What grew, in one sentence, from the page of groups that grew most. When the page ends before
 * growth does, the counts are the least they can be and say so.
 */
export function growthSentence(groups: readonly Group[], total: number, since: string): string {
  if (total === 0) return "No contact pair is on record, so there is no connected group yet.";
  const grown = groups.filter(({ grownSince }) => grownSince > 0);
  const shrunk = groups.filter(({ grownSince }) => grownSince < 0);
  const counted = `${formatCount(total, "connected group", "connected groups")} on record`;
  if (grown.length === 0) {
    return shrunk.length === 0
      ? `No group changed since ${since}; ${counted}.`
      : `No group grew since ${since}; ${formatNumber(shrunk.length)} shrank; ${counted}.`;
  }
  const open = grown.length === groups.length && groups.length < total;
  const people = grown.reduce((sum, { grownSince }) => sum + grownSince, 0);
  return (
    `${open ? "At least " : ""}${formatCount(grown.length, "group", "groups")} grew by ` +
    `${open ? "at least " : ""}${formatCount(people, "person", "people")} since ${since}; ${counted}.`
  );
}
