import { type Calendar, DAY_MINUTES } from "./calendar.ts";
import type { Encounter } from "./encounters.ts";
import type { RecordBook } from "./records.ts";
import type { Rng } from "./rng.ts";
import type { Exposure } from "./types.ts";
import { createGroups, type Groups } from "./union-find.ts";

/** An exposure with its times as numbers; the calendar turns it into an `Exposure` at the end. */
export type ExposureRow = Omit<Exposure, "firstDay" | "lastDay" | "recordedAt" | "withdrawnAt"> & {
  first: number | null;
  last: number | null;
  recorded: number;
  withdrawn: number | null;
};

export interface Telling {
  teller: number;
  other: number;
  interviewId: number | null;
  minute: number;
  /** Never withdrawn again. */
  lasting?: boolean;
}

/** All tellings so far, how many distinct pairs they make and which groups these form. */
export interface PairLedger {
  exposures: ExposureRow[];
  groups: Groups;
  pairCount(): number;
  /** Enters one telling and returns its position; a few are withdrawn days later as mistakes. */
  expose(encounter: Encounter, telling: Telling): number;
}

// Wider than any id, so that two ids make one exact number.
const ID_LIMIT = 2 ** 22;

/** One number for two ids, whichever comes first. */
export function pairKey(a: number, b: number): number {
  return Math.min(a, b) * ID_LIMIT + Math.max(a, b);
}

/** An empty ledger; `capacity` bounds the ids it can hold. */
export function createPairLedger(
  rng: Rng,
  calendar: Calendar,
  book: RecordBook,
  capacity: number,
): PairLedger {
  const exposures: ExposureRow[] = [];
  const pairs = new Set<number>();
  const groups = createGroups(capacity);
  return {
    exposures,
    groups,
    pairCount: () => pairs.size,
    expose(encounter, { teller, other, interviewId, minute, lasting }) {
      const { site, home } = encounter;
      let placeId: number | null = null;
      if (site >= 0) placeId = book.sitePlace(site, minute);
      else if (home >= 0) placeId = book.householdPlace(home, minute);
      const tellerFirst = rng.chance(0.5);
      const withdrawn = minute + rng.between(1, 5) * DAY_MINUTES + rng.between(-200, 200);
      const mistaken = !lasting && rng.chance(0.008) && withdrawn <= calendar.end;
      pairs.add(pairKey(teller, other));
      if (!mistaken) groups.join(teller, other);
      return (
        exposures.push({
          interviewId,
          personA: tellerFirst ? teller : other,
          personB: tellerFirst ? other : teller,
          namedBy: teller,
          first: encounter.first,
          last: encounter.last,
          setting: encounter.setting,
          placeId,
          minutes: encounter.minutes,
          distanceM: encounter.distanceM,
          physical: encounter.physical,
          indoors: encounter.indoors,
          relation: encounter.relation,
          recorded: minute,
          withdrawn: mistaken ? withdrawn : null,
        }) - 1
      );
    },
  };
}
