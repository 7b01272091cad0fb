import { PEOPLE_COLUMNS } from "../../../shared/contracts/imports.ts";
import { personFields } from "../../../shared/contracts/people.ts";
import { unguardCell } from "../../../shared/csv-cells.ts";
import { looksLikePhone } from "../../identity/tokens.ts";
import {
  byContract,
  type CellCheck,
  isMissingWord,
  notInFuture,
  reference,
  remembered,
} from "./check-cell.ts";
import type { FileRow } from "./read-rows.ts";
import type { Checked, ImportProblem, PeopleColumn, StagedPerson } from "./staged-row.ts";

const name = byContract(personFields.name);
const phoneText = byContract(personFields.phone);

const phone: CellCheck = (cell) => {
  const result = phoneText(cell);
  if ("code" in result || isMissingWord(result.value)) return result;
  return looksLikePhone(result.value) ? result : { code: "not_a_phone" };
};

function checksFor(today: string): Record<PeopleColumn, CellCheck> {
  const day = remembered(notInFuture(byContract(personFields.onsetDate), today));
  return {
    ref: reference,
    name,
    phone,
    email: byContract(personFields.email),
    birth_date: day,
    sex: remembered(byContract(personFields.sex)),
    address: byContract(personFields.address),
    area: remembered(byContract(personFields.area)),
    occupation: remembered(byContract(personFields.occupation)),
    household: byContract(personFields.household),
    classification: remembered(byContract(personFields.classification)),
    onset_date: day,
    specimen_date: day,
    result_date: day,
    result: remembered(byContract(personFields.result)),
    report_date: day,
    interview_date: day,
    interviewed: remembered(byContract(personFields.interviewed)),
    isolation_date: day,
    died_date: day,
  };
}

/**
 * Makes the checker of people rows: each cell by the same contract as the form, then what only the
 * file as a whole can tell (a reference that appears twice; the first appearance stands).
 *
 * @param today local day of the investigation
 */
export function peopleChecker(today: string): (row: FileRow) => Checked<StagedPerson> {
  const checks = checksFor(today);
  const seen = new Set<string>();
  return ({ line, cells, ragged }) => {
    if (ragged) return { row: null, problems: [{ line, column: "row", code: "ragged_row" }] };
    const problems: ImportProblem[] = [];
    const kept: Partial<Record<PeopleColumn, string>> = {};
    PEOPLE_COLUMNS.forEach((column, at) => {
      const cell = unguardCell(cells[at] ?? "").trim();
      if (cell === "") {
        if (column === "ref") problems.push({ line, column, code: "required" });
        return;
      }
      const result = checks[column](cell);
      if ("code" in result) problems.push({ line, column, code: result.code });
      else if (result.value !== "") kept[column] = result.value;
    });
    const { ref, specimen_date: specimen, result_date: resulted } = kept;
    if (ref && seen.has(ref)) problems.push({ line, column: "ref", code: "duplicate_ref" });
    if (ref) seen.add(ref);
    if (
      specimen?.length === 10 &&
      resulted?.length === 10 &&
      !isMissingWord(resulted) &&
      resulted < specimen
    ) {
      problems.push({ line, column: "result_date", code: "result_before_specimen" });
    }
    if (!ref || problems.length > 0) return { row: null, problems };
    return { row: { line, cells: { ...kept, ref } }, problems };
  };
}
