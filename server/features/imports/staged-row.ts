import {
  type IMPORT_KINDS,
  PAIR_COLUMNS,
  PEOPLE_COLUMNS,
} from "../../../shared/contracts/imports.ts";
import type { FieldErrorCode } from "../../../shared/errors.ts";

export type ImportKind = (typeof IMPORT_KINDS)[number];
export type PeopleColumn = (typeof PEOPLE_COLUMNS)[number];
export type PairColumn = (typeof PAIR_COLUMNS)[number];

/** A problem of a file: where and what, never the value. */
export interface ImportProblem {
  line: number;
  column: string;
  code: FieldErrorCode;
}

/** A checked row: its line, and the cells that hold something. A cell left out is "not asked". */
export interface StagedPerson {
  line: number;
  cells: Partial<Record<PeopleColumn, string>> & { ref: string };
}
export interface StagedPair {
  line: number;
  cells: Partial<Record<PairColumn, string>> & { ref_a: string; ref_b: string };
}

/** A row of a file after its own checks: a staged row, or none and at least one problem. */
export interface Checked<T> {
  row: T | null;
  problems: ImportProblem[];
}

/** Columns of a file by kind, and which it must have. */
export const COLUMNS_OF: Record<ImportKind, { all: readonly string[]; required: string[] }> = {
  people: { all: PEOPLE_COLUMNS, required: ["ref"] },
  pairs: { all: PAIR_COLUMNS, required: ["ref_a", "ref_b"] },
};
