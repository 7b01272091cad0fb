import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { type CompareContext, compareKnown } from "./known-people.ts";
import { createPlaceBook } from "./place-book.ts";
import { createRefBook } from "./ref-book.ts";
import type { ImportProblem, StagedPair, StagedPerson } from "./staged-row.ts";
import { peopleByRef } from "./store.ts";
import { tellingKey } from "./telling.ts";

/** What staged rows would do to the record, found a chunk at a time; nothing is changed. */
export interface Preview<T> {
  /** Looks at the next rows; answers the problems they have with the record. */
  add(rows: readonly T[]): Promise<ImportProblem[]>;
  counts(): Record<string, number>;
}

/** Preview of a people file: who is new, who is known, what would be filled and what differs. */
export function previewPeople(compare: CompareContext, actor: Actor): Preview<StagedPerson> {
  const { tx, keys } = compare;
  const places = createPlaceBook(tx, actor, keys, () => {
    throw new Error("a preview makes no places");
  });
  const counts = { new: 0, known: 0, filled: 0, conflicts: 0 };
  return {
    async add(rows) {
      const ids = await peopleByRef(
        tx,
        keys,
        rows.map((row) => row.cells.ref),
      );
      const known = rows.flatMap((row) => {
        const personId = ids.get(row.cells.ref);
        return personId ? [{ row, personId }] : [];
      });
      const households = await places.knownHouseholds(
        known.flatMap(({ row }) => row.cells.household ?? []),
      );
      const compared = await compareKnown(compare, known, households);
      counts.known += known.length;
      counts.new += rows.length - known.length;
      const problems = compared.flatMap(({ line, conflicts }) =>
        conflicts.map((column): ImportProblem => ({ line, column, code: "conflict" })),
      );
      counts.conflicts += problems.length;
      counts.filled += compared.filter(({ fills }) => Object.keys(fills).length > 1).length;
      return problems;
    },
    counts: () => ({ ...counts }),
  };
}

/** Preview of a pairs file: rows whose references are not on record, and tellings told twice. */
export function previewPairs(tx: Tx, keys: InvestigationKeys): Preview<StagedPair> {
  const refs = createRefBook(tx, keys);
  const told = new Set<string>();
  const counts = { unknownRows: 0, repeated: 0 };
  return {
    async add(rows) {
      await refs.find(rows);
      const problems: ImportProblem[] = [];
      for (const row of rows) {
        const unknown = refs.unknownIn(row);
        problems.push(...unknown);
        if (unknown.length > 0) counts.unknownRows += 1;
        const key = tellingKey(row);
        if (told.has(key)) counts.repeated += 1;
        told.add(key);
      }
      return problems;
    },
    counts: () => ({ ...counts, unknownRefs: refs.missing() }),
  };
}
