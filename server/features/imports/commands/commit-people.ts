import type { PackedPeople } from "../../../identity/pack-new-people.ts";
import type { PackLane } from "../pack-lane.ts";
import type { PlaceTold } from "../place-book.ts";
import { stageBatches } from "../stage-batches.ts";
import type { StagedPerson } from "../staged-row.ts";
import { peopleByRef } from "../store.ts";
import type { CommitContext } from "./commit-context.ts";
import { fillKnownPeople } from "./fill-known-people.ts";
import { type NewRow, newRows, packHere, storeNewPeople } from "./put-new-people.ts";

/** Rows of which it is known who is new; the identity of these is being sealed. */
interface Batch {
  count: number;
  fresh: readonly NewRow[];
  packed: Promise<PackedPeople> | null;
  known: readonly { row: StagedPerson; personId: string }[];
  /** Households that new people name, in the order of the file. */
  homes: readonly PlaceTold[];
}

/**
 * Records the staged people, batch by batch: new ones as rows say, known ones in their blanks.
 *
 * @param lane a thread that seals the identity of one batch while the database stores the one
 *   before; without it, a short file, that is done here
 */
export async function commitPeople(context: CommitContext, lane: PackLane | null): Promise<void> {
  const { tx, keys, importId, settings, pause } = context;
  const read = stageBatches<StagedPerson>(tx, keys, importId, pause);

  async function nextBatch(): Promise<Batch | null> {
    const staged = await read();
    if (!staged) return null;
    const { rows, chunks } = staged;
    const refs = rows.map((row) => row.cells.ref);
    const found = await peopleByRef(tx, keys, refs, pause);
    const known = rows.flatMap((row) => {
      const personId = found.get(row.cells.ref);
      return personId ? [{ row, personId }] : [];
    });
    const fresh = newRows(rows, (row) => !found.has(row.cells.ref));
    const [ids, country] = [fresh.map(({ id }) => id), settings.countryCode];
    const packed =
      lane?.pack({ chunks, places: fresh.map(({ at }) => at), ids, keys, country }) ?? null;
    const homes = rows.flatMap(({ cells }) =>
      cells.household && !found.has(cells.ref)
        ? [{ name: cells.household, setting: "household" }]
        : [],
    );
    return { count: rows.length, fresh, packed, known, homes };
  }

  let next = await nextBatch();
  while (next) {
    const { count, fresh, packed, known, homes } = next;
    next = await nextBatch();
    await context.places.ensure(homes);
    await storeNewPeople(context, fresh, packed ? [packed] : packHere(context, fresh));
    await fillKnownPeople(context, known);
    await context.progress(count);
  }
}
