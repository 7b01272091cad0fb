import { QueryClient } from "@tanstack/react-query";
import { ApiError } from "../lib/api-error.ts";

const mostRetries = 2;

/** Worth another try: no answer, or a server that is busy. What was refused stays refused. */
function worthRetrying(failures: number, error: unknown): boolean {
  if (failures >= mostRetries || !(error instanceof ApiError)) return false;
  return error.status === 0 || error.status >= 500;
}

/** The cache of one page load. Nothing of it is ever written to storage. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        // Asked even without a signal, so that a page says so instead of waiting without a word; it
        // asks again by itself when the signal is back.
        networkMode: "always",
        staleTime: 15_000,
        gcTime: 5 * 60_000,
        retry: worthRetrying,
        retryDelay: (attempt) => Math.min(8_000, 500 * 2 ** attempt),
      },
      // A save is never repeated unasked: the person presses again, with the same key.
      mutations: { retry: false, networkMode: "always" },
    },
  });
}
