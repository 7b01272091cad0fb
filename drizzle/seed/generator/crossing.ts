import type { Encounter } from "./encounters.ts";
import { itemAt } from "./item-at.ts";
import type { PairLedger } from "./pair-ledger.ts";
import type { RecordBook } from "./records.ts";
import type { Rng } from "./rng.ts";
import type { ZoneRole } from "./sites.ts";
import type { Town } from "./town.ts";

function roleOf(town: Town, book: RecordBook, id: number): ZoneRole {
  return itemAt(town.zones, itemAt(town.zone, itemAt(book.townPerson, id))).role;
}

function largestIn(town: Town, book: RecordBook, ledger: PairLedger, role: ZoneRole): number {
  let best = -1;
  for (let id = 0; id < book.people.length; id += 1) {
    if (roleOf(town, book, id) !== role) continue;
    if (best < 0 || ledger.groups.size(id) > ledger.groups.size(best)) best = id;
  }
  return best;
}

/**
 * The crossing that joins the story's two groups: when the teller is in the largest group of the
 * main part, somebody lately recorded in the largest group across the water, met on the ferry.
 * Null when this teller cannot make the join.
 */
export function findCrossing(
  town: Town,
  rng: Rng,
  book: RecordBook,
  ledger: PairLedger,
  teller: number,
  window: { from: number; until: number },
): { other: number; encounter: Encounter } | null {
  if (roleOf(town, book, teller) !== "main") return null;
  const { groups } = ledger;
  const main = largestIn(town, book, ledger, "main");
  const far = largestIn(town, book, ledger, "far");
  if (main < 0 || far < 0 || groups.root(teller) !== groups.root(main)) return null;
  const root = groups.root(far);
  const adults: number[] = [];
  for (let id = 0; id < book.people.length; id += 1) {
    const grown = itemAt(town.age, itemAt(book.townPerson, id)) >= 18;
    if (grown && groups.root(id) === root) adults.push(id);
  }
  const other = adults[adults.length - 1 - rng.below(Math.min(6, adults.length))];
  if (other === undefined) return null;
  const day = rng.between(window.from, window.until);
  return {
    other,
    encounter: {
      person: itemAt(book.townPerson, other),
      setting: "transport",
      site: town.ferry,
      home: -1,
      first: day,
      last: day,
      minutes: 25,
      distanceM: 1,
      physical: false,
      indoors: true,
      relation: "fellow passenger",
    },
  };
}
