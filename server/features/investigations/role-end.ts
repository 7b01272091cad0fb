import { dayIn, now } from "../../clock.ts";
import { invalid } from "../../http/problem.ts";

/**
 * Checks the last day of a role: today at the earliest, in the investigation's zone. Null is no end.
 *
 * @throws HttpProblem invalid with path endsOn
 */
export function checkEnd(timeZone: string, endsOn: string | null): void {
  if (endsOn !== null && endsOn < dayIn(timeZone, now())) {
    throw invalid({ path: "endsOn", code: "in_past" });
  }
}
