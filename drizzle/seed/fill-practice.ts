import { type SQL, sql } from "drizzle-orm";
import type pg from "pg";
import { dayIn, now, shiftDay, startOfDayIn } from "../../server/clock.ts";
import type { Tx } from "../../server/db/with-tx.ts";
import type { InvestigationKeys } from "../../server/identity/keys.ts";
import { cutOutbreak } from "./cut-outbreak.ts";
import { generateOutbreak } from "./generator/generate-outbreak.ts";
import { loadOutbreak } from "./load-outbreak.ts";

const SEED = 60;
const PEOPLE = 60;
/** The smallest town that the generator tells a story of; practice takes a part of it. */
const TOWN = 300;
/** What the story is told with, whatever the investigation's own settings are. */
const STORY = {
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
};
const NOON = 12 * 60;
const EVENING = 18 * 60;

/** Which investigation is filled, for whom. */
export interface PracticeTarget {
  keys: InvestigationKeys;
  investigationId: string;
  timeZone: string;
  countryCode: string;
  /** Version of the case definition that the classifications are made with. */
  caseDefinitionVersion: number;
  /** Accounts of tracers who get the work; without any it is nobody's. */
  tracers: readonly string[];
}

/** The last day and minute of the story, and the zone's distance from UTC on that day. */
function storyEnd(timeZone: string) {
  const instant = now();
  const today = dayIn(timeZone, instant);
  const minuteOf = (day: string) =>
    Math.floor((instant.getTime() - startOfDayIn(timeZone, day).getTime()) / 60_000);
  const early = minuteOf(today) < NOON;
  const lastDay = early ? shiftDay(today, -1) : today;
  const midnight = Date.parse(`${lastDay}T00:00:00Z`);
  const offset = (midnight - startOfDayIn(timeZone, lastDay).getTime()) / 60_000;
  return {
    lastDay,
    lastMinute: early ? EVENING : Math.min(minuteOf(today), EVENING),
    timeZoneOffsetMinutes: offset,
  };
}

/** A statement with numbered parameters, as one of the transaction's own. */
function statement(text: string, values: readonly unknown[]): SQL {
  const parts = text.split(/\$(\d+)/);
  return sql.join(
    parts.map((part, at) => (at % 2 === 0 ? sql.raw(part) : sql`${values[Number(part) - 1]}`)),
    sql.raw(""),
  );
}

/** How rows of `identity` get in: by its functions, since no role has a right on its tables. */
const DOORS: Record<string, (rows: string) => SQL> = {
  "identity.person": (rows) =>
    sql`select identity.put_people(${rows}::jsonb, '[]'::jsonb, '{}'::smallint[])`,
  "identity.search_token": (rows) =>
    sql`select identity.put_people(
          (select jsonb_agg(distinct jsonb_build_object('person_id', r ->> 'person_id'))
           from jsonb_array_elements(${rows}::jsonb) r), ${rows}::jsonb, '{}'::smallint[])`,
  "identity.place": (rows) =>
    sql`select identity.put_place(r.place_id, decode(r.name_cipher, 'base64'),
          decode(r.name_token, 'base64'))
        from jsonb_to_recordset(${rows}::jsonb) as r (place_id uuid, name_cipher text, name_token text)`,
};

/** What the loader writes through: the statements it sends, with the acting supervisor's rights. */
function throughTx(tx: Tx): pg.ClientBase {
  const query = async (text: string, values: readonly unknown[] = []) => {
    // Counters of the investigation are moved by their own functions, after the rows.
    if (/^\s*update core\.investigation\b/.test(text)) return;
    const table = /^\s*insert into (\S+)/.exec(text)?.[1] ?? "";
    const door = DOORS[table];
    if (!door) await tx.execute(statement(text, values));
    else if (values[0] !== "[]") await tx.execute(door(String(values[0])));
  };
  return { query } as unknown as pg.ClientBase;
}

/**
 * Fills an empty investigation with a small invented outbreak up to today. Runs inside the caller's
 * transaction with the rights of the acting supervisor; the graph change is the caller's to record.
 */
export async function fillPractice(tx: Tx, target: PracticeTarget): Promise<void> {
  const tracers = target.tracers.length > 0 ? target.tracers : ["nobody"];
  const town = generateOutbreak({
    seed: SEED,
    people: TOWN,
    tracers,
    ...storyEnd(target.timeZone),
    ...STORY,
  });
  const outbreak = cutOutbreak(town, PEOPLE);
  await loadOutbreak(
    {
      client: throughTx(tx),
      keys: target.keys,
      investigationId: target.investigationId,
      accounts: new Map(target.tracers.map((id) => [id, id])),
      country: target.countryCode,
      caseDefinitionVersion: target.caseDefinitionVersion,
    },
    outbreak,
  );
  await tx.execute(sql`select core.next_numbers(${outbreak.places.length})`);
}
