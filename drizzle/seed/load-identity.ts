import { type Identity, identityTokens, sealIdentity } from "../../server/identity/records.ts";
import type { Outbreak } from "./generator/types.ts";
import { insertRows, type Row, SLICE } from "./insert-rows.ts";
import type { LoadTarget } from "./load-target.ts";

/** Loads the identity of an outbreak's people, sealed, with their search tokens. */
export async function loadIdentity(
  target: LoadTarget,
  outbreak: Outbreak,
  idOf: (index: number) => string,
) {
  const { client, keys, investigationId, country } = target;
  for (let at = 0; at < outbreak.people.length; at += SLICE) {
    const rows: Row[] = [];
    const tokens: Row[] = [];
    outbreak.people.slice(at, at + SLICE).forEach((person, offset) => {
      const id = idOf(at + offset);
      const identity: Identity = {
        ref: person.ref,
        name: person.name,
        phone: person.phone,
        email: person.email,
        birthDate: person.birthDate,
        address: person.address,
        note: person.note,
      };
      rows.push({ investigation_id: investigationId, ...sealIdentity(keys, id, identity) });
      for (const token of identityTokens(keys, id, identity, country)) {
        tokens.push({ investigation_id: investigationId, ...token });
      }
    });
    await insertRows(
      client,
      "identity.person",
      {
        person_id: "uuid",
        investigation_id: "uuid",
        ref_cipher: "bytea",
        ref_token: "bytea",
        name_cipher: "bytea",
        name_masked: "text",
        phone_cipher: "bytea",
        phone_last2: "text",
        email_cipher: "bytea",
        email_masked: "text",
        birth_date_cipher: "bytea",
        birth_year: "integer",
        address_cipher: "bytea",
        note_cipher: "bytea",
      },
      rows,
    );
    await insertRows(
      client,
      "identity.search_token",
      { person_id: "uuid", investigation_id: "uuid", kind: "smallint", token: "bytea" },
      tokens,
    );
  }
}
