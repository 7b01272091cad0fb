import { sql } from "drizzle-orm";
import { byteas, integers, texts, uuids } from "../../db/binary-arrays.ts";
import { nearIds } from "../../db/near-ids.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { householdToken, placeName } from "../../identity/records.ts";
import { isMissingWord } from "./check-cell.ts";
import type { Pause } from "./pause.ts";

/** A place as a file tells of it; the setting is the telling's. */
export interface PlaceTold {
  name: string;
  setting: string | null;
}

/** Finds and makes the places of a file, many at a time, and remembers them. */
export interface PlaceBook {
  /** Ids of households on record by their name as told. */
  knownHouseholds(names: readonly string[]): Promise<Map<string, string>>;
  /** Makes sure every place told of is on record. */
  ensure(told: readonly PlaceTold[]): Promise<void>;
  /** The id of a place that was ensured; null for blank and for the words for "missing". */
  idOf(name: string | undefined, setting: string | null): string | null;
  made: number;
}

/**
 * Makes the place book of one import.
 *
 * @param reserve reserves place numbers and gives the first; in a transaction of its own, so that
 * the investigation's row is not held locked while a long import runs
 * @param pause lets others be served within long lists
 */
export function createPlaceBook(
  tx: Tx,
  actor: Actor,
  keys: InvestigationKeys,
  reserve: (count: number) => Promise<number>,
  pause?: Pause,
): PlaceBook {
  const households = new Map<string, string>();
  const facilities = new Map<string, string>();
  const tokenOf = new Map<string, string>();

  const token = (name: string) => {
    const known = tokenOf.get(name);
    if (known) return known;
    const made = householdToken(keys, name).toString("hex");
    tokenOf.set(name, made);
    return made;
  };
  const plain = (setting: string | null) =>
    setting === null || isMissingWord(setting) ? null : setting;
  const facility = (name: string, setting: string | null) =>
    `${plain(setting) ?? ""}|${name.toLowerCase()}`;
  const named = (name: string) => name !== "" && !isMissingWord(name);

  async function findHouseholds(names: readonly string[]): Promise<void> {
    const wanted = new Set<string>();
    for (const name of names) {
      if (named(name) && !households.has(token(name))) wanted.add(token(name));
      await pause?.();
    }
    if (wanted.size === 0) return;
    const tokens = byteas([...wanted].map((hex) => Buffer.from(hex, "hex")));
    const found = await tx.execute<{ token: Buffer; place_id: string }>(
      sql`select token, place_id from identity.households_by_token(${tokens}::bytea[])`,
    );
    for (const row of found.rows) households.set(row.token.toString("hex"), row.place_id);
  }

  async function findFacilities(told: readonly PlaceTold[]): Promise<void> {
    const wanted = told.filter(
      (place) => named(place.name) && !facilities.has(facility(place.name, place.setting)),
    );
    if (wanted.length === 0) return;
    const names = [...new Set(wanted.map((place) => place.name.toLowerCase()))];
    const found = await tx.execute<{ id: string; name: string; setting: string | null }>(
      sql`select p.id, p.name, p.setting from core.place p
          where p.investigation_id = ${actor.investigationId}
            and lower(p.name) in (select unnest(${texts(names)}::text[]))
          order by p.number desc`,
    );
    // The lowest number comes last and stands.
    for (const row of found.rows) facilities.set(facility(row.name, row.setting), row.id);
  }

  const book: PlaceBook = {
    made: 0,
    async knownHouseholds(names) {
      await findHouseholds(names);
      const out = new Map<string, string>();
      for (const name of names) {
        const id = named(name) ? households.get(token(name)) : undefined;
        if (id) out.set(name, id);
      }
      return out;
    },
    async ensure(told) {
      await findHouseholds(told.filter((p) => p.setting === "household").map((p) => p.name));
      await findFacilities(told.filter((p) => p.setting !== "household"));
      const fresh: {
        map: Map<string, string>;
        key: string;
        name: string;
        setting: string | null;
      }[] = [];
      for (const { name, setting } of told) {
        if (!named(name)) continue;
        const household = setting === "household";
        const [map, key] = household
          ? [households, token(name)]
          : [facilities, facility(name, setting)];
        if (map.has(key)) continue;
        // The id follows; a place that is told of again is the same one.
        map.set(key, "");
        fresh.push({ map, key, name, setting: plain(setting) });
      }
      if (fresh.length === 0) return;
      const first = await reserve(fresh.length);
      book.made += fresh.length;
      // Numbers tell the order of places anyway, so the ids may.
      const ids = nearIds(fresh.length).sort();
      const places = fresh.map((place, at) => ({ ...place, id: ids[at] as string }));
      for (const { map, key, id } of places) map.set(key, id);
      const isHome = ({ map }: { map: unknown }) => map === households;
      await tx.execute(
        sql`insert into core.place (id, investigation_id, number, name, setting, recorded_by)
            select id, ${actor.investigationId}, number, name, setting, ${actor.accountId}
            from unnest(${uuids(ids)}::uuid[],
              ${integers(places.map((_, at) => first + at))}::integer[],
              ${texts(places.map((place) => (isHome(place) ? null : place.name)))}::text[],
              ${texts(places.map((place) => place.setting))}::text[])
              as r (id, number, name, setting)`,
      );
      const homes = places.filter(isHome);
      if (homes.length === 0) return;
      const ciphers: Buffer[] = [];
      for (const { id, name } of homes) {
        ciphers.push(placeName.seal(keys, id, name));
        await pause?.();
      }
      await tx.execute(
        sql`select identity.put_places(${uuids(homes.map((place) => place.id))}::uuid[],
              ${byteas(ciphers)}::bytea[],
              ${byteas(homes.map(({ key }) => Buffer.from(key, "hex")))}::bytea[])`,
      );
    },
    idOf(name, setting) {
      if (name === undefined || !named(name)) return null;
      if (setting === "household") return households.get(token(name)) ?? null;
      return facilities.get(facility(name, setting)) ?? null;
    },
  };
  return book;
}
