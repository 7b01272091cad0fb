import { MISSING } from "../../shared/vocabulary.ts";
import { seal } from "./cipher.ts";
import type { InvestigationKeys } from "./keys.ts";
import { lastTwo, maskEmail, maskName } from "./mask.ts";
import { nameParts, nameSounds, normalPhone, TOKEN_KINDS, tokenOf } from "./tokens.ts";

/** Identity of a person as typed. A key left out stays as it is; null means "not asked". */
export interface Identity {
  ref?: string | null;
  name?: string | null;
  phone?: string | null;
  email?: string | null;
  birthDate?: string | null;
  address?: string | null;
  note?: string | null;
}
export type IdentityKey = keyof Identity;
export const IDENTITY_KEYS = [
  "ref",
  "name",
  "phone",
  "email",
  "birthDate",
  "address",
  "note",
] as const;

/** Columns of `identity.person` that hold ciphertext. */
export const CIPHER_COLUMNS: Record<IdentityKey, string> = {
  ref: "ref_cipher",
  name: "name_cipher",
  phone: "phone_cipher",
  email: "email_cipher",
  birthDate: "birth_date_cipher",
  address: "address_cipher",
  note: "note_cipher",
};

/** True for something typed that is not one of the words for "missing". */
export const known = (value: string | null | undefined): value is string =>
  typeof value === "string" && !(MISSING as readonly string[]).includes(value);

/** Where a value is bound to: moved anywhere else it does not open. */
export const identityPlace = (key: IdentityKey, personId: string) =>
  `identity.person|${CIPHER_COLUMNS[key]}|${personId}`;

/** Token under which a reference is unique in its investigation. */
export function refToken(keys: InvestigationKeys, ref: string): Buffer {
  return tokenOf(keys.token, "ref", ref.trim());
}

/** A person's identity as stored: ciphertext by key, and the masked and coarse forms. */
export interface SealedIdentity {
  /** Keys left out of the identity are left out here; null stays null. */
  ciphers: Partial<Record<IdentityKey, Buffer | null>>;
  refToken: Buffer | null;
  nameMasked: string | null;
  phoneLast2: string | null;
  emailMasked: string | null;
  birthYear: number | null;
}

/** Seals a person's identity, each value bound to its column and person. */
export function sealPerson(
  keys: InvestigationKeys,
  personId: string,
  identity: Identity,
): SealedIdentity {
  const ciphers: SealedIdentity["ciphers"] = {};
  for (const key of IDENTITY_KEYS) {
    const value = identity[key];
    if (value === undefined) continue;
    ciphers[key] = value === null ? null : seal(keys.seal, identityPlace(key, personId), value);
  }
  const { ref, name, phone, email, birthDate } = identity;
  return {
    ciphers,
    refToken: ref ? refToken(keys, ref) : null,
    nameMasked: known(name) ? maskName(name) : null,
    phoneLast2: known(phone) ? lastTwo(phone) : null,
    emailMasked: known(email) ? maskEmail(email) : null,
    birthYear: known(birthDate) ? Number(birthDate.slice(0, 4)) : null,
  };
}

/** Makes the keyed token of a normalised value. */
export type TokenMaker = (kind: number, value: string) => Buffer;

/**
 * What a person is found by, as keyed tokens: telephone number, e-mail, name parts and their sounds.
 *
 * @param tokenFor usually `tokenOf` with the investigation's key
 * @param country country code by which national telephone numbers are read
 */
export function searchTokensOf(
  tokenFor: TokenMaker,
  identity: Identity,
  country: string,
): { kind: number; token: Buffer }[] {
  const out: { kind: number; token: Buffer }[] = [];
  const add = (kind: number, value: string) => out.push({ kind, token: tokenFor(kind, value) });
  if (known(identity.phone)) {
    const phone = normalPhone(identity.phone, country);
    if (phone) add(TOKEN_KINDS.phone, phone);
  }
  if (known(identity.email)) add(TOKEN_KINDS.email, identity.email.toLowerCase());
  if (known(identity.name)) {
    for (const part of nameParts(identity.name)) add(TOKEN_KINDS.namePart, part);
    for (const sound of nameSounds(identity.name)) add(TOKEN_KINDS.nameSound, sound);
  }
  return out;
}
