import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { createDoubtFinder, type Doubt } from "./find-doubts.ts";
import { type CompareContext, compareKnown } from "./known-people.ts";
import type { Pause } from "./pause.ts";
import { createPlaceBook } from "./place-book.ts";
import { createRefBook } from "./ref-book.ts";
import type { ImportProblem, StagedPair, StagedPerson } from "./staged-row.ts";
import { peopleByRef } from "./store.ts";
import { tellingKey } from "./telling.ts";

/** What staged rows would do to the record, found a chunk at a time; nothing is changed. */
export interface Preview<T> {
  /** Looks at the next rows; answers their problems with the record, and those to set aside. */
  add(rows: readonly T[]): Promise<{ problems: ImportProblem[]; doubts: Doubt[] }>;
  /** Rows to look at together: finding doubtful ones costs by the call, not by the row. */
  rowsAtOnce: number;
  counts(): Record<string, number>;
}

/** People compared at a stretch: opening what is on record of them is one piece of work. */
const COMPARED_AT_ONCE = 500;

/**
 * Preview of a people file: who is new, who is known, who may be somebody else, what would be filled
 * and what differs.
 */
export function previewPeople(
  compare: CompareContext,
  actor: Actor,
  pause: Pause,
): Preview<StagedPerson> {
  const { tx, keys } = compare;
  const places = createPlaceBook(tx, actor, keys, () => {
    throw new Error("a preview makes no places");
  });
  const doubtful = createDoubtFinder(compare, pause);
  const counts = { new: 0, known: 0, filled: 0, conflicts: 0, setAside: 0 };

  async function compareRows(rows: readonly { row: StagedPerson; personId: string }[]) {
    const households = await places.knownHouseholds(
      rows.flatMap(({ row }) => row.cells.household ?? []),
    );
    const compared = await compareKnown(compare, rows, households);
    counts.filled += compared.filter(({ fills }) => Object.keys(fills).length > 1).length;
    return compared.flatMap(({ line, conflicts }) =>
      conflicts.map((column): ImportProblem => ({ line, column, code: "conflict" })),
    );
  }

  return {
    rowsAtOnce: 10_000,
    async add(rows) {
      const refs = rows.map((row) => row.cells.ref);
      const ids = await peopleByRef(tx, keys, refs);
      const known = rows.flatMap((row) => {
        const personId = ids.get(row.cells.ref);
        return personId ? [{ row, personId }] : [];
      });
      const problems: ImportProblem[] = [];
      for (let from = 0; from < known.length; from += COMPARED_AT_ONCE) {
        problems.push(...(await compareRows(known.slice(from, from + COMPARED_AT_ONCE))));
        await pause();
      }
      const doubts = await doubtful.find(rows, ids);
      counts.known += known.length;
      counts.setAside += doubts.length;
      counts.new += rows.length - known.length - doubts.length;
      counts.conflicts += problems.length;
      return { problems, doubts };
    },
    counts: () => ({ ...counts, compared: counts.known + doubtful.opened }),
  };
}

/** Preview of a pairs file: rows whose references are not on record, and tellings told twice. */
export function previewPairs(tx: Tx, keys: InvestigationKeys): Preview<StagedPair> {
  const refs = createRefBook(tx, keys);
  const told = new Set<string>();
  const counts = { unknownRows: 0, repeated: 0 };
  return {
    rowsAtOnce: 2_000,
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
      return { problems, doubts: [] };
    },
    counts: () => ({ ...counts, unknownRefs: refs.missing() }),
  };
}
