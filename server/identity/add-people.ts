import { sql } from "drizzle-orm";
import type { Tx } from "../db/with-tx.ts";
import type { PackedPeople } from "./pack-new-people.ts";

/** The driver sends a Buffer in binary form; what came from another thread is a plain array. */
const binary = (bytes: Uint8Array) => Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);

/**
 * Writes the identity of people that were recorded in core just now and have none yet, many at a
 * time. Runs through the database's own function, which checks who may.
 *
 * @param packed what `packNewPeople` made
 * @throws the driver's 42501 out of scope, 23505 for a reference that is taken
 */
export async function addPeople(tx: Tx, packed: PackedPeople): Promise<void> {
  await tx.execute(
    sql`select identity.add_people(
      ${binary(packed.people)}::uuid[],
      ${binary(packed.refCiphers)}::bytea[], ${binary(packed.refTokens)}::bytea[],
      ${binary(packed.nameCiphers)}::bytea[], ${binary(packed.namesMasked)}::text[],
      ${binary(packed.phoneCiphers)}::bytea[], ${binary(packed.phonesLast2)}::text[],
      ${binary(packed.emailCiphers)}::bytea[], ${binary(packed.emailsMasked)}::text[],
      ${binary(packed.birthDateCiphers)}::bytea[], ${binary(packed.birthYears)}::integer[],
      ${binary(packed.addressCiphers)}::bytea[], ${binary(packed.noteCiphers)}::bytea[],
      ${binary(packed.tokenOwners)}::integer[], ${binary(packed.tokenKinds)}::smallint[],
      ${binary(packed.tokens)}::bytea[])`,
  );
}
