import type { Measured, UndefinedReason } from "../../shared/core/index.ts";

/** Takes values out of their wrapping and keeps why one is missing, by its dotted path. */
export type Take = <T>(path: string, measured: Measured<T>) => T | null;

/** A `Take` that writes into `reasons`. */
export function collectReasons(reasons: Record<string, UndefinedReason>): Take {
  return (path, measured) => {
    if (measured.reason !== null) reasons[path] = measured.reason;
    return measured.value;
  };
}
