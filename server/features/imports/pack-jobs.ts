import { type PackedPeople, packNewPeople } from "../../identity/pack-new-people.ts";
import { serveJobs } from "../../worker-lane.ts";
import { newIdentityOf } from "./row-identity.ts";
import { openChunk, type SealedChunk } from "./staged-chunk.ts";
import type { StagedPerson } from "./staged-row.ts";

/** New people of a file whose identity is to be sealed. */
export interface PackJob {
  readonly kind: "pack";
  /** The rows as they are kept: they need not be copied one by one to get here. */
  readonly chunks: readonly SealedChunk[];
  /** Which rows are meant, by their place in the chunks together, and the person each becomes. */
  readonly places: readonly number[];
  readonly ids: readonly string[];
  readonly keys: { readonly seal: Uint8Array; readonly token: Uint8Array };
  readonly country: string;
}
export type PackAnswer = { pack: PackedPeople };

/** Opens the chunks, seals the identity of the people meant and makes their search tokens. */
export function packChunks({ chunks, places, ids, keys: plain, country }: PackJob): PackedPeople {
  const keys = { seal: Buffer.from(plain.seal), token: Buffer.from(plain.token) };
  const rows = chunks.flatMap((chunk) => openChunk<StagedPerson>(keys, chunk));
  const people = places.map((place, at) => {
    const [row, personId] = [rows[place], ids[at]];
    if (!row || !personId) throw new Error("a row of the file is not there");
    return { personId, identity: newIdentityOf(row.cells) };
  });
  return packNewPeople(keys, people, country);
}

serveJobs<PackJob>(packChunks);
