import type { Tx } from "../../db/with-tx.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { waitingRefs } from "./match-store.ts";
import type { Pause } from "./pause.ts";
import type { ImportProblem, StagedPair } from "./staged-row.ts";
import { peopleByRef } from "./store.ts";

/** References of a pairs file with the people they stand for, looked up many at a time. */
export interface RefBook {
  /** Looks up the references of rows that are not known yet. */
  find(rows: readonly StagedPair[]): Promise<void>;
  idOf(ref: string): string | null;
  add(ref: string, personId: string): void;
  /** True for a reference whose row is set aside: a person of that name may be on record already. */
  waits(ref: string): boolean;
  /** Problems of rows whose references are not on record. */
  unknownIn(row: StagedPair): ImportProblem[];
  /** Distinct references met so far that are not on record and are not set aside either. */
  missing(): number;
}

/** Makes the reference book of one file. */
export function createRefBook(tx: Tx, keys: InvestigationKeys, pause?: Pause): RefBook {
  const people = new Map<string, string | null>();
  const waiting = new Set<string>();
  return {
    async find(rows) {
      const wanted = new Set<string>();
      for (const { cells } of rows) {
        for (const ref of [cells.ref_a, cells.ref_b]) if (!people.has(ref)) wanted.add(ref);
      }
      const found = await peopleByRef(tx, keys, [...wanted], pause);
      for (const ref of wanted) people.set(ref, found.get(ref) ?? null);
      const strangers = [...wanted].filter((ref) => !found.has(ref));
      for (const ref of await waitingRefs(tx, keys, strangers)) waiting.add(ref);
    },
    idOf: (ref) => people.get(ref) ?? null,
    add: (ref, personId) => {
      people.set(ref, personId);
    },
    waits: (ref) => waiting.has(ref),
    unknownIn: ({ line, cells }) =>
      (["ref_a", "ref_b"] as const)
        .filter((column) => !people.get(cells[column]))
        .map((column) => ({
          line,
          column,
          code: waiting.has(cells[column]) ? "waiting_ref" : "unknown_ref",
        })),
    missing: () => [...people].filter(([ref, id]) => id === null && !waiting.has(ref)).length,
  };
}
