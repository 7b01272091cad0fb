import pg from "pg";

/** A row as PostgreSQL sent it: text, or null. */
export type TextRow = readonly (string | null)[];

const AS_TEXT: pg.CustomTypesConfig = {
  getTypeParser: (() => (value: string) => value) as pg.CustomTypesConfig["getTypeParser"],
};

/**
 * Runs a query and hands over its rows one by one as they arrive, unparsed, so that a large answer
 * neither stands in memory whole nor holds the event loop in one piece.
 *
 * @throws the driver's error, or what `take` threw (the rest of the answer is then read away)
 */
export function streamRows(
  client: pg.ClientBase,
  text: string,
  values: unknown[],
  take: (row: TextRow) => void,
): Promise<void> {
  return new Promise((resolve, reject) => {
    let failure: unknown;
    const query = new pg.Query({
      text,
      values,
      rowMode: "array",
      types: AS_TEXT,
    } as pg.QueryConfig);
    query.on("row", (row: unknown) => {
      if (failure !== undefined) return;
      try {
        take(row as TextRow);
      } catch (error) {
        failure = error;
      }
    });
    query.on("error", reject);
    query.on("end", () => {
      if (failure === undefined) resolve();
      else reject(failure instanceof Error ? failure : new Error(String(failure)));
    });
    client.query(query);
  });
}
