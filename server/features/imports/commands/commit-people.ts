import type { StagedPerson } from "../staged-row.ts";
import { peopleByRef, readStage } from "../store.ts";
import type { CommitContext } from "./commit-context.ts";
import { fillKnownPeople } from "./fill-known-people.ts";
import { putNewPeople } from "./put-new-people.ts";

/** Records the staged people, chunk by chunk: new ones as rows say, known ones in their blanks. */
export async function commitPeople(context: CommitContext): Promise<void> {
  const { tx, keys, importId, places } = context;
  const chunks = await readStage<StagedPerson>(tx, keys, importId);
  for (const [at, openChunk] of chunks.entries()) {
    const rows = openChunk();
    const known = await peopleByRef(
      tx,
      keys,
      rows.map((row) => row.cells.ref),
    );
    await context.pause();
    const fresh = rows.filter((row) => !known.has(row.cells.ref));
    await places.ensure(
      fresh.flatMap(({ cells }) =>
        cells.household ? [{ name: cells.household, setting: "household" }] : [],
      ),
    );
    await putNewPeople(context, fresh);
    await fillKnownPeople(
      context,
      rows.flatMap((row) => {
        const personId = known.get(row.cells.ref);
        return personId ? [{ row, personId }] : [];
      }),
    );
    await context.progress((at + 1) / chunks.length);
  }
}
