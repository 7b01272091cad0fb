import { byContract, type CellCheck, numeric } from "../../server/features/imports/check-cell.ts";
import { partialDay } from "../../shared/contracts/common.ts";
import { contactInput } from "../../shared/contracts/interviews.ts";
import { personFields } from "../../shared/contracts/people.ts";
import type { BadRow, CsvTable } from "./read-csv.ts";

const day = byContract(partialDay);

/**
 * Coded, dated and numbered columns of the two files, as the import reads them. No figure is
 * computed from them here, but a row that the import would refuse is a bad row here too. Days to come
 * are not among it: this command knows no clock.
 */
const CHECKS: Record<"people" | "pairs", Record<string, CellCheck>> = {
  people: {
    birth_date: day,
    sex: byContract(personFields.sex),
    classification: byContract(personFields.classification),
    onset_date: day,
    specimen_date: day,
    result_date: day,
    result: byContract(personFields.result),
    report_date: day,
    interview_date: day,
    isolation_date: day,
    died_date: day,
  },
  pairs: {
    first_exposure: day,
    last_exposure: day,
    setting: byContract(contactInput.shape.setting),
    minutes: numeric(0, 100_000, true),
    distance_m: numeric(0, 1000, false),
  },
};

const isWholeDay = (cell: string) => /^\d{4}-\d{2}-\d{2}$/.test(cell);

/** Bad cells of the columns that a file has beside its references. */
export function checkCells(kind: "people" | "pairs", table: CsvTable): BadRow[] {
  const checks = Object.entries(CHECKS[kind]).filter(([column]) => table.columns.has(column));
  const bad: BadRow[] = [];
  for (const { line, get } of table.rows) {
    for (const [column, check] of checks) {
      const cell = get(column);
      const result = cell === "" ? null : check(cell);
      if (result && "code" in result) bad.push({ line, column, code: result.code });
    }
    const [first, last] = [get("first_exposure"), get("last_exposure")];
    if (kind === "pairs" && isWholeDay(first) && isWholeDay(last) && last < first) {
      bad.push({ line, column: "last_exposure", code: "last_before_first" });
    }
  }
  return bad;
}
