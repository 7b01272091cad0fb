import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { householdToken, placeName } from "../../identity/records.ts";
import { isMissingWord } from "./check-cell.ts";

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

const byteList = (hex: readonly string[]) =>
  sql`${sql.param(`{${hex.map((one) => `"\\\\x${one}"`).join(",")}}`)}::bytea[]`;

/**
 * Makes the place book of one import.
 *
 * @param reserve reserves place numbers and gives the first; in a transaction of its own, so that
 * the investigation's row is not held locked while a long import runs
 */
export function createPlaceBook(
  tx: Tx,
  actor: Actor,
  keys: InvestigationKeys,
  reserve: (count: number) => Promise<number>,
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
    const wanted = new Set(names.filter(named).map(token));
    for (const hex of wanted) if (households.has(hex)) wanted.delete(hex);
    if (wanted.size === 0) return;
    const found = await tx.execute<{ token: Buffer; place_id: string }>(
      sql`select token, place_id from identity.households_by_token(${byteList([...wanted])})`,
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
          where p.investigation_id = ${actor.investigationId} and lower(p.name) in (
            select jsonb_array_elements_text(${JSON.stringify(names)}::jsonb))
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
      const fresh: { id: string; name: string; household: boolean; setting: string | null }[] = [];
      for (const { name, setting } of told) {
        if (!named(name)) continue;
        const household = setting === "household";
        const [map, key] = household
          ? [households, token(name)]
          : [facilities, facility(name, setting)];
        if (map.has(key)) continue;
        const id = randomUUID();
        map.set(key, id);
        fresh.push({ id, name, household, setting: plain(setting) });
      }
      if (fresh.length === 0) return;
      const first = await reserve(fresh.length);
      book.made += fresh.length;
      const rows = fresh.map((place, at) => ({
        id: place.id,
        number: first + at,
        name: place.household ? null : place.name,
        setting: place.setting,
      }));
      await tx.execute(
        sql`insert into core.place (id, investigation_id, number, name, setting, recorded_by)
            select id, ${actor.investigationId}, number, name, setting, ${actor.accountId}
            from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb)
              as r (id uuid, number integer, name text, setting text)`,
      );
      const sealed = fresh
        .filter((place) => place.household)
        .map((place) => ({
          id: place.id,
          cipher: placeName.seal(keys, place.id, place.name).toString("base64"),
          token: token(place.name),
        }));
      await tx.execute(
        sql`select identity.put_place(id, decode(cipher, 'base64'), decode(token, 'hex'))
            from jsonb_to_recordset(${JSON.stringify(sealed)}::jsonb)
              as r (id uuid, cipher text, token text)`,
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
