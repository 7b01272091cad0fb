import type { HeadingsAnswer, Import } from "../../../shared/contracts/imports.ts";
import { type Headings, suggestColumns } from "./read-headings.ts";
import type { ImportKind, ImportProblem } from "./staged-row.ts";
import type { ImportRow } from "./store.ts";

const HIDDEN = new Set(["stagedAt", "recordProblems", "problems", "rows", "compared"]);

/**
 * An import as its readers see it.
 *
 * @param most problems to list; `problemCount` counts all of them
 */
export function presentImport(row: ImportRow, most = Number.POSITIVE_INFINITY): Import {
  const problems: ImportProblem[] = [...row.problems];
  const gone = row.state === "failed" && row.counts.stagedAt === undefined;
  if (gone) problems.unshift({ line: 0, column: "file", code: "stage_dropped" });
  else if (row.state === "failed" && problems[0]?.line !== 0) {
    problems.unshift({ line: 0, column: "file", code: "commit_failed" });
  }
  return {
    id: row.id,
    kind: row.kind,
    state: row.state,
    rows: row.rowCount,
    counts: Object.fromEntries(Object.entries(row.counts).filter(([key]) => !HIDDEN.has(key))),
    problems: problems.slice(0, most),
    problemCount: Math.max(row.counts.problems ?? 0, problems.length),
    reading: row.reading,
    progress: row.progress,
    createMissing: row.createMissing,
    recordedAt: row.recordedAt,
    committedAt: row.committedAt,
  };
}

/** Longest heading that is sent back; enough to know it by. */
const HEADING_CHARACTERS = 80;

/** The first line of a file as the one who sent it sees it, with what each column is taken for. */
export function presentHeadings(kind: ImportKind, found: Headings): HeadingsAnswer {
  const { encoding, mark, delimiter, headings } = found;
  const suggested = suggestColumns(kind, headings);
  return {
    encoding,
    mark,
    delimiter,
    columns: headings.map((heading, at) => ({
      heading: [...heading.toWellFormed()].slice(0, HEADING_CHARACTERS).join(""),
      ...(suggested[at] ?? { column: null, how: "unknown" }),
    })),
  };
}
