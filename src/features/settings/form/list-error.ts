import { fieldWords } from "../../../lib/form-errors.ts";

/** Words for an error of a whole list; undefined when it has none. Errors of its rows stand there. */
export function listError(
  error: { message?: string; root?: { message?: string } } | undefined,
): string | undefined {
  return fieldWords(error?.root?.message ?? error?.message);
}
