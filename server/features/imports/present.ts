import type { Import } from "../../../shared/contracts/imports.ts";
import type { ImportProblem } from "./staged-row.ts";
import type { ImportRow } from "./store.ts";

const HIDDEN = new Set(["stagedAt", "recordProblems", "problems", "rows"]);

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
    progress: row.progress,
    createMissing: row.createMissing,
    recordedAt: row.recordedAt,
    committedAt: row.committedAt,
  };
}
