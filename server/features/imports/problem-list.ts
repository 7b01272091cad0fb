import type { ImportProblem } from "./staged-row.ts";

/** Problems kept with an import; all are counted. */
const KEPT_PROBLEMS = 10_000;

/** Problems in the order of the file, the first ten thousand kept. */
export class ProblemList {
  readonly kept: ImportProblem[] = [];
  count = 0;

  /** Adds the problems of one stretch of lines; they may come in any order. */
  add(problems: readonly ImportProblem[]): void {
    this.count += problems.length;
    const room = KEPT_PROBLEMS - this.kept.length;
    if (room <= 0) return;
    this.kept.push(...[...problems].sort((a, b) => a.line - b.line).slice(0, room));
  }

  /** Brings kept problems back into the order of lines. */
  sorted(): ImportProblem[] {
    return this.kept.sort((a, b) => a.line - b.line);
  }
}
