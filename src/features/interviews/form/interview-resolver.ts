import type { FieldErrors, Resolver } from "react-hook-form";
import { type InterviewInput, interviewInput } from "../../../../shared/contracts/interviews.ts";
import type { InterviewValues } from "./interview-values.ts";
import { boxPath, type Sendable, type SendContext, toSendable } from "./to-input.ts";

/** A checked interview with the map back to the rows of the form. */
export interface CheckedInterview {
  input: InterviewInput;
  sent: Sendable;
}

/** Paths and codes by which the shared contract refuses what the form holds; empty when it passes. */
export function checkInterviewForm(
  values: InterviewValues,
  context: SendContext,
): { checked: CheckedInterview; errors: [] } | { checked: null; errors: [string, string][] } {
  const sent = toSendable(values, context);
  const parsed = interviewInput.safeParse(sent.body);
  if (parsed.success) return { checked: { input: parsed.data, sent }, errors: [] };
  const errors = parsed.error.issues.map(({ path, message }): [string, string] => {
    const box = boxPath(path.map(String).join("."), sent);
    // Nothing chosen is said as such; the contract sees only a word that is not in its list.
    return [box, box === "outcome" && values.outcome === "" ? "required" : message];
  });
  return { checked: null, errors };
}

/**
 * Checks the form with the contract of the API. Blank rows are no error and are not sent, so paths
 * are turned back to the rows that stand on screen.
 */
export function interviewResolver(
  context: () => SendContext,
): Resolver<InterviewValues, unknown, CheckedInterview> {
  return (values) => {
    const result = checkInterviewForm(values, context());
    if (result.checked) return { values: result.checked, errors: {} };
    return { values: {}, errors: nest(result.errors) };
  };
}

/** Dotted paths as the nested object of errors that the form library keeps; the first one counts. */
function nest(errors: readonly [string, string][]): FieldErrors<InterviewValues> {
  const root: Record<string, unknown> = {};
  for (const [path, message] of errors) {
    const keys = path.split(".");
    let at = root;
    keys.forEach((key, index) => {
      const next = keys[index + 1];
      if (next === undefined) at[key] ??= { type: "contract", message };
      else {
        at[key] ??= /^\d+$/.test(next) ? [] : {};
        at = at[key] as Record<string, unknown>;
      }
    });
  }
  return root as FieldErrors<InterviewValues>;
}
