import type { Access, Field, FieldClass, Retention } from "./types.ts";

const LETTERS: Record<string, Access> = { F: "full", M: "masked", C: "coarse", N: "none" };

/** Reads four letters (tracer, supervisor, epidemiologist, officer): F full, M masked, C coarse, N none. */
export function access(letters: string): Field["access"] {
  const [t, s, e, o] = [...letters].map((letter) => LETTERS[letter]);
  if (!t || !s || !e || !o || letters.length !== 4) {
    throw new Error(`field access must be four of F, M, C, N: got "${letters}"`);
  }
  return { tracer: t, supervisor: s, epidemiologist: e, officer: o };
}

type Options = Pick<Field, "key" | "sortable" | "masked" | "coarse" | "cipher"> & {
  retention?: Retention;
};
type Row = readonly [column: string, kind: FieldClass, letters: string, options?: Options];

/** Builds the fields of one table. Every column stands here once; an unlisted one fails the build. */
export function table(name: string, rows: readonly Row[]): Field[] {
  return rows.map(([column, kind, letters, options]) => ({
    table: name,
    column,
    class: kind,
    retention: options?.retention ?? "investigation",
    access: access(letters),
    ...options,
  }));
}
