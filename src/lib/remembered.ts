import { useCallback, useState } from "react";

const prefix = "strandline.";

/**
 * A choice about the look of a page (columns, shortcuts) kept in this browser. Never for anything
 * about a person: it stays after sign-out.
 */
export function useRemembered<T>(
  name: string,
  initial: T,
  isValid: (value: unknown) => value is T,
) {
  const [value, setValue] = useState<T>(() => {
    try {
      const kept: unknown = JSON.parse(localStorage.getItem(prefix + name) ?? "null");
      return isValid(kept) ? kept : initial;
    } catch {
      return initial;
    }
  });
  const remember = useCallback(
    (next: T) => {
      setValue(next);
      try {
        localStorage.setItem(prefix + name, JSON.stringify(next));
      } catch {
        // Closed storage: the choice holds until the page is left.
      }
    },
    [name],
  );
  return [value, remember] as const;
}

/** For `useRemembered`: a list of words. */
export function isTextList(value: unknown): value is string[] {
  return Array.isArray(value) && value.every((one) => typeof one === "string");
}

/** For `useRemembered`: yes or no. */
export function isBoolean(value: unknown): value is boolean {
  return typeof value === "boolean";
}

/** Runs something that empties this site's storage, and puts the looks back afterwards. */
export async function keepingLooks<T>(work: () => Promise<T>): Promise<T> {
  const kept = Object.entries(localStorage).filter(([name]) => name.startsWith(prefix));
  try {
    return await work();
  } finally {
    for (const [name, text] of kept) localStorage.setItem(name, text);
  }
}
