import type { InterviewOutcome } from "../../../shared/vocabulary.ts";

/** Roles that interview people and read interviews. */
export const INTERVIEWERS = ["tracer", "supervisor"] as const;

// Nobody was spoken to, so what stands half typed is still wanted.
const NOBODY_REACHED: readonly InterviewOutcome[] = ["attempted", "unreachable"];

/** True when a submission takes the place of the interviewer's draft; a bare attempt does not. */
export function endsDraft(outcome: InterviewOutcome, rows: number): boolean {
  return rows > 0 || !NOBODY_REACHED.includes(outcome);
}
