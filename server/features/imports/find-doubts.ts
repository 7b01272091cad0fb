import { createHash } from "node:crypto";
import { sql } from "drizzle-orm";
import type { MatchedOn } from "../../../shared/contracts/imports.ts";
import { nameParts, normalPhone, TOKEN_KINDS, tokenOf } from "../../identity/tokens.ts";
import { type CompareContext, identityOnRecord } from "./known-people.ts";
import { type Likeness, likenessOf, phoneTail, resembles, wholeName } from "./likeness.ts";
import type { Pause } from "./pause.ts";
import type { StagedPerson } from "./staged-row.ts";

/** A row that may be somebody else: a person on record, or an earlier row by its reference. */
export interface Doubt {
  row: StagedPerson;
  matchedOn: MatchedOn;
  otherId: string | null;
  otherRef: string | null;
}

/** Earlier rows compared with a row that shares a telephone or a name with them. */
const MOST_EARLIER = 8;
const OPENED_AT_ONCE = 500;
const KEY_BYTES = 16;

interface Earlier {
  ref: string;
  personId: string | null;
  like: Likeness;
}

const likenessOfRow = ({ cells }: StagedPerson) =>
  likenessOf(cells.name, cells.phone, cells.birth_date);

/** Finds the rows of one file that may be somebody else, many rows at a time. */
export interface DoubtFinder {
  /**
   * @param rows the next rows of the file
   * @param known people on record whom rows name by reference; such a row is no doubt itself
   */
  find(rows: readonly StagedPerson[], known: ReadonlyMap<string, string>): Promise<Doubt[]>;
  /** People on record whose identity was opened to compare it. */
  opened: number;
}

/** Makes the finder of one file. */
export function createDoubtFinder(context: CompareContext, pause: Pause): DoubtFinder {
  const { tx, keys, country } = context;
  const byPhone = new Map<string, Earlier[]>();
  const byName = new Map<string, Earlier[]>();
  let anyone: boolean | undefined;

  async function someoneOnRecord(): Promise<boolean> {
    if (anyone !== undefined) return anyone;
    const found = await tx.execute(
      sql`select 1 from core.person where withdrawn_at is null limit 1`,
    );
    anyone = found.rows.length > 0;
    return anyone;
  }

  /** The hash the database makes of a person's name tokens, from the tokens of a row. */
  function nameKey(name: string): string {
    const tokens = nameParts(name)
      .map((part) => tokenOf(keys.token, TOKEN_KINDS.namePart, part))
      .sort(Buffer.compare);
    const hash = createHash("sha256").update(Buffer.concat(tokens)).digest();
    return hash.subarray(0, KEY_BYTES).toString("base64");
  }

  async function keysOf(rows: readonly StagedPerson[]) {
    const out: { line: number; phone: string | null; name: string | null }[] = [];
    for (const row of rows) {
      const like = likenessOfRow(row);
      const phone = like.phone === null ? null : normalPhone(like.phone, country);
      const name = wholeName(like.name) === null ? null : nameKey(like.name ?? "");
      if (phone !== null || name !== null) {
        const token = phone && tokenOf(keys.token, TOKEN_KINDS.phone, phone).toString("base64");
        out.push({ line: row.line, phone: token, name });
      }
      await pause();
    }
    return out;
  }

  /** Rows that look like somebody on record: candidates by tokens, then opened and compared. */
  async function onRecord(rows: readonly StagedPerson[]): Promise<Map<number, Doubt>> {
    const doubts = new Map<number, Doubt>();
    if (rows.length === 0 || !(await someoneOnRecord())) return doubts;
    const found = await tx.execute<{ line: number; person_id: string }>(
      sql`select line, person_id
          from identity.resembling(${JSON.stringify(await keysOf(rows))}::jsonb)`,
    );
    const rowOf = new Map(rows.map((row) => [row.line, row]));
    for (let from = 0; from < found.rows.length; from += OPENED_AT_ONCE) {
      const slice = found.rows.slice(from, from + OPENED_AT_ONCE);
      const ids = [...new Set(slice.map(({ person_id: id }) => id))];
      finder.opened += ids.length;
      const opened = await identityOnRecord(tx, keys, context.importId, ids);
      for (const { line, person_id: personId } of slice) {
        const row = rowOf.get(line);
        if (!row || doubts.has(line)) continue;
        const other = opened.get(personId);
        const like = likenessOf(other?.name, other?.phone, other?.birth_date);
        const matchedOn = resembles(likenessOfRow(row), like, country);
        if (matchedOn) doubts.set(line, { row, matchedOn, otherId: personId, otherRef: null });
      }
      await pause();
    }
    return doubts;
  }

  /** The first earlier row that a row looks like; the row itself is remembered for those after it. */
  function earlierOf(row: StagedPerson, personId: string | null): Doubt | null {
    const like = likenessOfRow(row);
    const [tail, name] = [phoneTail(like.phone), wholeName(like.name)];
    const lists: Earlier[][] = [];
    for (const [map, key] of [
      [byPhone, tail],
      [byName, name],
    ] as const) {
      if (key === null) continue;
      const list = map.get(key);
      if (list) lists.push(list);
      else map.set(key, []);
    }
    let doubt: Doubt | null = null;
    for (const other of personId === null ? lists.flat() : []) {
      const matchedOn = resembles(like, other.like, country);
      if (!matchedOn) continue;
      const otherRef = other.personId === null ? other.ref : null;
      doubt = { row, matchedOn, otherId: other.personId, otherRef };
      break;
    }
    // A row that looks like an earlier one adds nothing to compare with.
    if (!doubt) {
      const entry = { ref: row.cells.ref, personId, like };
      for (const [map, key] of [
        [byPhone, tail],
        [byName, name],
      ] as const) {
        const list = key === null ? undefined : map.get(key);
        if (list && list.length < MOST_EARLIER) list.push(entry);
      }
    }
    return doubt;
  }

  const finder: DoubtFinder = {
    opened: 0,
    async find(rows, known) {
      const fresh = rows.filter((row) => !known.has(row.cells.ref));
      const doubts = await onRecord(fresh);
      for (const row of rows) {
        const earlier = earlierOf(row, known.get(row.cells.ref) ?? null);
        if (earlier && !doubts.has(row.line)) doubts.set(row.line, earlier);
        await pause();
      }
      return [...doubts.values()].sort((a, b) => a.row.line - b.row.line);
    },
  };
  return finder;
}
