import { type SQL, sql } from "drizzle-orm";
import { PEOPLE_COLUMNS } from "../../../shared/contracts/imports.ts";
import { IDENTITY_COLUMNS } from "../../../shared/export-columns.ts";
import { readableColumns } from "../../../shared/fields.ts";
import { peopleConditions } from "../../db/people-conditions.ts";
import { type BuildContext, slices, turn } from "./build-context.ts";
import { openDoor, refNamer } from "./open-identity.ts";

/** Columns of the file that stand in `core.person` under the same name. */
const CORE_COLUMNS = PEOPLE_COLUMNS.filter(
  (column) => !(column in IDENTITY_COLUMNS) && column !== "household" && column !== "died_date",
);

/** The line list's filter as SQL, on `core.person p`. */
function filtered({ actor, filter }: BuildContext): SQL {
  const where = [
    sql`p.investigation_id = ${actor.investigationId}`,
    sql`p.withdrawn_at is null`,
    ...peopleConditions(filter, actor),
  ];
  return sql.join(where, sql` and `);
}

type PersonRow = Record<string, string | null> & {
  id: string;
  study_number: string;
  household: string | null;
  died_date: string | null;
};

async function coreRows(context: BuildContext, ids: readonly string[]) {
  const readable = readableColumns("core.person", context.actor.role);
  const columns = CORE_COLUMNS.filter((column) => readable.includes(column));
  const found = await context.tx.execute<PersonRow>(
    sql`select p.id, p.study_number, ${sql.join(
      columns.map((column) => sql`p.${sql.identifier(column)}`),
      sql`, `,
    )}, (select h.number::text from core.place h where h.id = p.household_id) as household,
          case when p.outcome = 'died' then coalesce(p.outcome_date, '')
            when p.outcome = 'unknown' and p.outcome_date in ('unknown', 'refused')
              then p.outcome_date end as died_date
        from core.person p where p.id = any (${sql.param(`{${ids.join(",")}}`)}::uuid[])`,
  );
  return new Map(found.rows.map((row) => [row.id, row]));
}

/**
 * Writes the line list: people in the order of their entry, in the columns of the import. Without
 * identity `ref` is the study number and a household its number.
 *
 * @returns how many people were written
 */
export async function writePeople(
  context: BuildContext,
): Promise<{ rows: number; people: number }> {
  const listed = await context.tx.execute<{ id: string }>(
    sql`select p.id from core.person p where ${filtered(context)} order by p.recorded_at, p.id`,
  );
  const ids = listed.rows.map((row) => row.id);
  const door = context.identified ? await openDoor(context, ids, true) : null;
  const refOf = refNamer(door?.refs ?? new Map());
  await context.write(PEOPLE_COLUMNS);
  for (const [from, slice] of slices(ids)) {
    const rows = await coreRows(context, slice);
    const opened = await door?.open(from, slice.length);
    for (const id of slice) {
      const row = rows.get(id);
      // One moment of the record: who was listed is there.
      if (!row) throw new Error("a listed person is not on record");
      const identity = opened?.get(id);
      await context.write(
        PEOPLE_COLUMNS.map((column) => {
          if (!context.columns.has(column)) return null;
          if (column === "ref") return refOf(id, row.study_number);
          if (column === "household") return identity?.household ?? row.household;
          if (column in IDENTITY_COLUMNS) {
            return identity?.[IDENTITY_COLUMNS[column as keyof typeof IDENTITY_COLUMNS]];
          }
          return row[column];
        }),
      );
    }
    await context.progress((from + slice.length) / ids.length);
    await turn();
  }
  return { rows: ids.length, people: ids.length };
}
