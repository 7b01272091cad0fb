import pg from "pg";

// Days stay `YYYY-MM-DD` and instants ISO strings: the driver must not make Date objects of them.
const DATE = 1082;
const TIMESTAMPTZ = 1184;
/** Type parsers of every connection. */
export const TYPES: pg.CustomTypesConfig = {
  getTypeParser: ((oid: number, format?: "text" | "binary") => {
    if (oid === DATE) return (value: string) => value;
    if (oid === TIMESTAMPTZ) return (value: string) => new Date(value).toISOString();
    return pg.types.getTypeParser(oid, format as "text");
  }) as pg.CustomTypesConfig["getTypeParser"],
};
