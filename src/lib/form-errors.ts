import { zodResolver } from "@hookform/resolvers/zod";
import type { FieldValues, Path, Resolver, UseFormSetError } from "react-hook-form";
import type { z } from "zod";
import { ApiError } from "./api-error.ts";

// Apart, so that a page with codes to show and no form does not fetch the form library.
export { fieldWords } from "./field-words.ts";

/**
 * Checks a form with a contract of the API, so that both sides refuse the same things. `Values` is
 * what the boxes hold (text mostly), `Output` what is sent.
 */
export function contractResolver<Values extends FieldValues, Output>(
  schema: z.ZodType<Output>,
): Resolver<Values, unknown, Output> {
  // The contract takes any text and sorts it out itself; the form's own type says what boxes hold.
  return zodResolver(schema as never) as unknown as Resolver<Values, unknown, Output>;
}

/**
 * Puts the server's field errors beside their fields and focuses the first.
 *
 * @returns codes that belong to no field of the form, for a message above it
 */
export function showFieldErrors<Values extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<Values>,
  isField: (path: string) => boolean,
): string[] {
  if (!(error instanceof ApiError)) return [];
  const others: string[] = [];
  let first = true;
  for (const { path, code } of error.errors) {
    if (path === "" || !isField(path)) {
      others.push(code);
      continue;
    }
    setError(path as Path<Values>, { type: "server", message: code }, { shouldFocus: first });
    first = false;
  }
  return others;
}
