import type pg from "pg";

/** Rows a slice: one JSON parameter stays well below what a message may carry. */
export const SLICE = 5000;
export type Row = Record<string, unknown>;

/** Inserts rows through one JSON parameter a slice; `columns` maps each column to its SQL type. */
export async function insertRows(
  client: pg.ClientBase,
  table: string,
  columns: Record<string, string>,
  rows: readonly Row[],
): Promise<void> {
  const names = Object.keys(columns);
  const record = names.map(
    (name) => `${name} ${columns[name] === "bytea" ? "text" : columns[name]}`,
  );
  const values = names.map((name) =>
    columns[name] === "bytea" ? `decode(r.${name}, 'base64')` : `r.${name}`,
  );
  for (let at = 0; at < rows.length; at += SLICE) {
    await client.query(
      `insert into ${table} (${names.join(", ")}) select ${values.join(", ")}
       from jsonb_to_recordset($1::jsonb) as r (${record.join(", ")}) on conflict do nothing`,
      [JSON.stringify(rows.slice(at, at + SLICE))],
    );
  }
}
