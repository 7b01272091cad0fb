import { FIELD_ERRORS } from "../../shared/errors.ts";

/** Words beside a field for an error code; undefined when there is no error. */
export function fieldWords(code: string | undefined): string | undefined {
  if (code === undefined) return undefined;
  return code in FIELD_ERRORS ? FIELD_ERRORS[code as keyof typeof FIELD_ERRORS] : "Not valid";
}
