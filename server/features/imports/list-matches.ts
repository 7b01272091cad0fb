import { sql } from "drizzle-orm";
import type { ImportMatchList } from "../../../shared/contracts/imports.ts";
import { recordEvent } from "../../audit/record-event.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { lastTwo, maskName } from "../../identity/mask.ts";
import { openPeople } from "../../identity/records.ts";
import { type Likeness, likenessOf } from "./likeness.ts";
import { countWaiting, type WaitingRow, waitingRows } from "./match-store.ts";
import { peopleByRef } from "./store.ts";

type Shown = ImportMatchList["items"][number]["row"];

/** The fields a decision needs; a data officer sees initials, last digits and the year. */
const OPENED = ["name", "phone", "birthDate"] as const;

const idList = (ids: readonly string[]) => sql`${sql.param(`{${ids.join(",")}}`)}::uuid[]`;

function masked({ name, phone, birthYear }: Likeness): Shown {
  return {
    name: name === null ? null : maskName(name),
    phone: phone === null ? null : lastTwo(phone),
    born: birthYear === null ? null : String(birthYear),
  };
}

async function peopleShown(
  tx: Tx,
  actor: Actor,
  keys: InvestigationKeys,
  ids: readonly string[],
): Promise<Map<string, Shown>> {
  if (ids.length === 0) return new Map();
  if (actor.role === "supervisor") {
    const opened = await openPeople(tx, keys, ids, OPENED, "import.matches_listed");
    return new Map(
      [...opened].map(([id, { name, phone, birthDate }]) => [
        id,
        { name: name ?? null, phone: phone ?? null, born: birthDate ?? null },
      ]),
    );
  }
  const found = await tx.execute<{
    person_id: string;
    name: string | null;
    phone: string | null;
    year: number | null;
  }>(
    sql`select person_id, name_masked as name, phone_last2 as phone, birth_year as year
        from views.person_officer where person_id = any (${idList(ids)})`,
  );
  return new Map(
    found.rows.map(({ person_id: id, name, phone, year }) => [
      id,
      { name, phone, born: year === null ? null : String(year) },
    ]),
  );
}

async function studyNumbers(tx: Tx, ids: readonly string[]): Promise<Map<string, string>> {
  const found = await tx.execute<{ id: string; number: string }>(
    sql`select id, study_number as number from core.person where id = any (${idList(ids)})`,
  );
  return new Map(found.rows.map(({ id, number }) => [id, number]));
}

function rowShown({ row: { cells } }: WaitingRow, role: Actor["role"]): Shown {
  if (role !== "supervisor") return masked(likenessOf(cells.name, cells.phone, cells.birth_date));
  return {
    name: cells.name ?? null,
    phone: cells.phone ?? null,
    born: cells.birth_date ?? null,
  };
}

/**
 * One page of the rows of an import that wait for a decision, beside whom they look like, as far as
 * the acting role may see. The reading is recorded.
 */
export async function listMatches(
  tx: Tx,
  actor: Actor,
  keys: InvestigationKeys,
  importId: string,
  query: { page: number; pageSize: number },
): Promise<ImportMatchList> {
  const kinds = await countWaiting(tx, importId);
  const page = { limit: query.pageSize, offset: (query.page - 1) * query.pageSize };
  const rows = await waitingRows(tx, keys, importId, {}, page);
  const byRef = await peopleByRef(
    tx,
    keys,
    rows.flatMap(({ otherRef }) => otherRef ?? []),
  );
  const otherOf = ({ otherId, otherRef }: WaitingRow) =>
    otherId ?? (otherRef === null ? null : (byRef.get(otherRef) ?? null));
  const ids = [...new Set(rows.flatMap((row) => otherOf(row) ?? []))];
  const people = await peopleShown(tx, actor, keys, ids);
  const numbers = await studyNumbers(tx, ids);
  if (rows.length > 0 && (actor.role !== "supervisor" || people.size === 0)) {
    await recordEvent(tx, {
      action: "import.matches_listed",
      accountId: actor.accountId,
      role: actor.role,
      investigationId: actor.investigationId,
      personIds: ids,
      counts: { rows: rows.length },
    });
  }
  return {
    items: rows.map((row) => {
      const personId = otherOf(row);
      const shown = personId === null ? undefined : people.get(personId);
      const nothing = { name: null, phone: null, born: null };
      return {
        id: row.id,
        line: row.row.line,
        matchedOn: row.matchedOn,
        row: rowShown(row, actor.role),
        other:
          personId === null
            ? null
            : { personId, studyNumber: numbers.get(personId) ?? "", ...(shown ?? nothing) },
      };
    }),
    total: kinds.reduce((sum, { waiting }) => sum + waiting, 0),
    page: query.page,
    pageSize: query.pageSize,
    kinds,
  };
}
