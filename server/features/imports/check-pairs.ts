import { LIMITS, optionalText, partialDay } from "../../../shared/contracts/common.ts";
import { PAIR_COLUMNS } from "../../../shared/contracts/imports.ts";
import { contactInput } from "../../../shared/contracts/interviews.ts";
import { unguardCell } from "../../../shared/csv-cells.ts";
import {
  byContract,
  type CellCheck,
  isMissingWord,
  notInFuture,
  numeric,
  reference,
  remembered,
} from "./check-cell.ts";
import type { FileRow } from "./read-rows.ts";
import type { Checked, ImportProblem, PairColumn, StagedPair } from "./staged-row.ts";

function checksFor(today: string): Record<PairColumn, CellCheck> {
  const day = remembered(notInFuture(byContract(partialDay), today));
  return {
    ref_a: reference,
    ref_b: reference,
    first_exposure: day,
    last_exposure: day,
    setting: remembered(byContract(contactInput.shape.setting)),
    place: remembered(byContract(optionalText(LIMITS.shortText))),
    minutes: remembered(numeric(0, 100_000, true)),
    distance_m: remembered(numeric(0, 1000, false)),
    named_by: reference,
  };
}

const isDay = (value: string | undefined): value is string =>
  value !== undefined && value.length === 10 && !isMissingWord(value);

/**
 * Makes the checker of pairs rows: each cell, then the row as a whole. Whether the two references
 * are on record is found later, for many rows at once.
 *
 * @param today local day of the investigation
 */
export function pairsChecker(today: string): (row: FileRow) => Checked<StagedPair> {
  const checks = checksFor(today);
  return ({ line, cells, ragged }) => {
    if (ragged) return { row: null, problems: [{ line, column: "row", code: "ragged_row" }] };
    const problems: ImportProblem[] = [];
    const kept: Partial<Record<PairColumn, string>> = {};
    PAIR_COLUMNS.forEach((column, at) => {
      const cell = unguardCell(cells[at] ?? "").trim();
      if (cell === "") {
        if (column === "ref_a" || column === "ref_b") {
          problems.push({ line, column, code: "required" });
        }
        return;
      }
      const result = checks[column](cell);
      if ("code" in result) problems.push({ line, column, code: result.code });
      else if (result.value !== "") kept[column] = result.value;
    });
    const { ref_a: a, ref_b: b, named_by: by, first_exposure: first, last_exposure: last } = kept;
    if (a && b && a === b) problems.push({ line, column: "ref_b", code: "self_contact" });
    if (by && a && b && by !== a && by !== b) {
      problems.push({ line, column: "named_by", code: "named_by_other" });
    }
    if (isDay(first) && isDay(last) && last < first) {
      problems.push({ line, column: "last_exposure", code: "last_before_first" });
    }
    if (!a || !b || problems.length > 0) return { row: null, problems };
    return { row: { line, cells: { ...kept, ref_a: a, ref_b: b } }, problems };
  };
}
