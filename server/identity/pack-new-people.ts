import { byteas, integers, smallints, texts, uuids } from "../db/binary-arrays.ts";
import type { InvestigationKeys } from "./keys.ts";
import {
  type Identity,
  type IdentityKey,
  sealPerson,
  searchTokensOf,
  type TokenMaker,
} from "./sealed-identity.ts";
import { tokenOf } from "./tokens.ts";

/** Someone new and their identity as typed. */
export interface NewIdentity {
  personId: string;
  identity: Identity;
}

/**
 * Identity of new people as `identity.add_people` takes it: each an array parameter in binary form,
 * one element per person; the last three have one per search token.
 */
export interface PackedPeople {
  people: Uint8Array;
  refCiphers: Uint8Array;
  refTokens: Uint8Array;
  nameCiphers: Uint8Array;
  namesMasked: Uint8Array;
  phoneCiphers: Uint8Array;
  phonesLast2: Uint8Array;
  emailCiphers: Uint8Array;
  emailsMasked: Uint8Array;
  birthDateCiphers: Uint8Array;
  birthYears: Uint8Array;
  addressCiphers: Uint8Array;
  noteCiphers: Uint8Array;
  /** Place of each token's person in `people`, from 1. */
  tokenOwners: Uint8Array;
  tokenKinds: Uint8Array;
  tokens: Uint8Array;
}

/** Name parts come again and again; each is hashed once. */
function rememberedTokens(keys: InvestigationKeys): TokenMaker {
  const made = new Map<string, Buffer>();
  return (kind, value) => {
    const key = `${kind}|${value}`;
    const earlier = made.get(key);
    if (earlier) return earlier;
    const token = tokenOf(keys.token, kind, value);
    made.set(key, token);
    return token;
  };
}

/**
 * Seals new people and makes their search tokens: all that costs time before the database is asked.
 * Pure but for the random initial values of the ciphers, so it may run in another thread.
 *
 * @param country country code by which national telephone numbers are read
 */
export function packNewPeople(
  keys: InvestigationKeys,
  people: readonly NewIdentity[],
  country: string,
): PackedPeople {
  const sealed = people.map(({ personId, identity }) => sealPerson(keys, personId, identity));
  const ciphers = (key: IdentityKey) => byteas(sealed.map((one) => one.ciphers[key]));
  const tokenFor = rememberedTokens(keys);
  const tokens = people.flatMap(({ identity }, at) =>
    searchTokensOf(tokenFor, identity, country).map((token) => ({ ...token, owner: at + 1 })),
  );
  // In the order of the index they go into.
  tokens.sort((a, b) => Buffer.compare(a.token, b.token) || a.kind - b.kind);
  return {
    people: uuids(people.map(({ personId }) => personId)),
    refCiphers: ciphers("ref"),
    refTokens: byteas(sealed.map((one) => one.refToken)),
    nameCiphers: ciphers("name"),
    namesMasked: texts(sealed.map((one) => one.nameMasked)),
    phoneCiphers: ciphers("phone"),
    phonesLast2: texts(sealed.map((one) => one.phoneLast2)),
    emailCiphers: ciphers("email"),
    emailsMasked: texts(sealed.map((one) => one.emailMasked)),
    birthDateCiphers: ciphers("birthDate"),
    birthYears: integers(sealed.map((one) => one.birthYear)),
    addressCiphers: ciphers("address"),
    noteCiphers: ciphers("note"),
    tokenOwners: integers(tokens.map((token) => token.owner)),
    tokenKinds: smallints(tokens.map((token) => token.kind)),
    tokens: byteas(tokens.map((token) => token.token)),
  };
}
