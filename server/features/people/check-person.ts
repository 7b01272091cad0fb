import type { FieldError } from "../../../shared/errors.ts";
import { MISSING } from "../../../shared/vocabulary.ts";
import { invalid } from "../../http/problem.ts";
import { looksLikePhone } from "../../identity/tokens.ts";

const DATES = [
  "birthDate",
  "onsetDate",
  "specimenDate",
  "resultDate",
  "reportDate",
  "interviewDate",
  "isolationDate",
  "diedDate",
  "outcomeDate",
] as const;

const isWord = (value: string) => (MISSING as readonly string[]).includes(value);

/**
 * Errors of a person's fields that need to know today: dates in the future, a telephone number
 * that cannot be one. Partial dates are compared as far as they go.
 */
export function personErrors(input: Record<string, unknown>, today: string): FieldError[] {
  const errors: FieldError[] = [];
  for (const key of DATES) {
    const value = input[key];
    if (typeof value === "string" && !isWord(value) && value > today.slice(0, value.length)) {
      errors.push({ path: key, code: "in_future" });
    }
  }
  const { phone, specimenDate, resultDate } = input;
  if (typeof phone === "string" && !isWord(phone) && !looksLikePhone(phone)) {
    errors.push({ path: "phone", code: "not_a_phone" });
  }
  if (
    typeof specimenDate === "string" &&
    typeof resultDate === "string" &&
    specimenDate.length === 10 &&
    resultDate.length === 10 &&
    !isWord(specimenDate) &&
    resultDate < specimenDate
  ) {
    errors.push({ path: "resultDate", code: "result_before_specimen" });
  }
  return errors;
}

/** Refuses a person's fields with all their errors at once. */
export function checkPerson(input: Record<string, unknown>, today: string): void {
  const errors = personErrors(input, today);
  if (errors.length > 0) throw invalid(...errors);
}
