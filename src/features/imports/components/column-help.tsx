import { PAIR_COLUMNS, PEOPLE_COLUMNS } from "../../../../shared/contracts/imports.ts";
import { CLASSIFICATIONS, SETTINGS, SEXES, TEST_RESULTS } from "../../../../shared/vocabulary.ts";

export type ColumnHelpProps = { kind: "people" | "pairs" };

const required = new Set(["ref", "ref_a", "ref_b"]);

const codes = {
  people: [
    ["classification", CLASSIFICATIONS],
    ["sex", SEXES],
    ["result", TEST_RESULTS],
    ["interviewed", ["yes", "no"]],
  ],
  pairs: [["setting", SETTINGS]],
} as const;

/** Which columns a file may have and how its cells are written. */
export function ColumnHelp({ kind }: ColumnHelpProps) {
  const columns: readonly string[] = kind === "people" ? PEOPLE_COLUMNS : PAIR_COLUMNS;
  return (
    <div className="max-w-[70ch] text-sm text-ink-2">
      <p>
        Columns, in any order; what your file calls them can be said after choosing it:{" "}
        {columns.map((column, at) => (
          <span key={column}>
            {at > 0 ? ", " : ""}
            <code className="font-sans font-bold text-ink">{column}</code>
            {required.has(column) ? " (required)" : ""}
          </span>
        ))}
        .
      </p>
      <p className="mt-2">
        Text in UTF-8, or in UTF-16 with a byte-order mark; commas, semicolons or tabs. Days are
        written 2026-05-18, or 2026-05 when only the month is known. Leave a cell blank when nobody
        asked; write <code className="font-sans font-bold text-ink">unknown</code> or{" "}
        <code className="font-sans font-bold text-ink">refused</code> when they did.
      </p>
      {codes[kind].map(([column, words]) => (
        <p key={column} className="mt-1">
          <code className="font-sans font-bold text-ink">{column}</code>: {words.join(", ")}
        </p>
      ))}
      {kind === "pairs" ? (
        <p className="mt-2">
          One row is one telling of a contact;{" "}
          <code className="font-sans font-bold text-ink">named_by</code> is the reference of the one
          who told, or blank.
        </p>
      ) : null}
    </div>
  );
}
