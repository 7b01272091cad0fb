import type { Calendar } from "./calendar.ts";
import { itemAt } from "./item-at.ts";
import type { RecordBook } from "./records.ts";
import type { Rng } from "./rng.ts";
import type { Town } from "./town.ts";
import type { GroupExposure, Setting } from "./types.ts";

const SETTINGS = ["transport", "social", "other"] as const;

/**
 * People a case was among and cannot name: on the ferry, at the market, elsewhere. The count is
 * exact, a range, or unknown.
 */
export function tellGroupExposure(
  town: Town,
  rng: Rng,
  calendar: Calendar,
  book: RecordBook,
  teller: { interviewId: number; person: number; minute: number },
  window: { from: number; until: number },
): GroupExposure {
  const { role } = itemAt(town.zones, itemAt(town.zone, teller.person));
  const onFerry = (role === "main" || role === "far") && rng.chance(0.45);
  const atMarket = !onFerry && role === "main" && rng.chance(0.6);
  const day = calendar.day(rng.between(window.from, window.until));
  const count = rng.between(4, 40);
  const roll = rng.next();
  // Which crossing it was nobody remembers, so the boat is no place of theirs: it would tie the cases
  // of both shores to each other.
  let setting: Setting = "transport";
  if (atMarket) setting = itemAt(town.sites, town.market).setting;
  else if (!onFerry) setting = rng.pick(SETTINGS);
  return {
    interviewId: teller.interviewId,
    setting,
    placeId: atMarket ? book.sitePlace(town.market, teller.minute) : null,
    firstDay: day,
    lastDay: day,
    countMin: roll < 0.2 ? null : count,
    countMax: roll < 0.2 ? null : roll < 0.6 ? count : count + rng.between(2, 15),
    recordedAt: calendar.instant(teller.minute),
  };
}
