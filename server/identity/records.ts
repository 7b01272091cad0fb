import { sql } from "drizzle-orm";
import type { EventName } from "../../shared/events.ts";
import type { Tx } from "../db/with-tx.ts";
import { open, seal } from "./cipher.ts";
import type { InvestigationKeys } from "./keys.ts";
import {
  CIPHER_COLUMNS,
  type Identity,
  type IdentityKey,
  identityPlace,
  known,
  sealPerson,
  searchTokensOf,
} from "./sealed-identity.ts";
import { nameParts, normalPhone, soundsToFind, TOKEN_KINDS, tokenOf } from "./tokens.ts";

export {
  IDENTITY_KEYS,
  type Identity,
  type IdentityKey,
  refToken,
} from "./sealed-identity.ts";

/** Token under which a household's name is found again (case and spacing aside). */
export function householdToken(keys: InvestigationKeys, name: string): Buffer {
  return tokenOf(keys.token, "household", name.trim().replace(/\s+/g, " ").toLowerCase());
}

/** Seals and opens a household's name. */
export const placeName = {
  seal: (keys: InvestigationKeys, placeId: string, name: string) =>
    seal(keys.seal, `identity.place|name_cipher|${placeId}`, name),
  open: (keys: InvestigationKeys, placeId: string, cipher: Buffer) =>
    open(keys.seal, `identity.place|name_cipher|${placeId}`, cipher).toString(),
};

export interface Token {
  person_id: string;
  kind: number;
  token: string;
}

/** Search tokens of a person's identity, binary in base64. */
export function identityTokens(
  keys: InvestigationKeys,
  personId: string,
  identity: Identity,
  country: string,
): Token[] {
  const tokenFor = (kind: number, value: string) => tokenOf(keys.token, kind, value);
  return searchTokensOf(tokenFor, identity, country).map(({ kind, token }) => ({
    person_id: personId,
    kind,
    token: token.toString("base64"),
  }));
}

/** The stored row of a person's identity (ciphertext, masked and coarse forms), binary in base64. */
export function sealIdentity(
  keys: InvestigationKeys,
  personId: string,
  identity: Identity,
): Record<string, unknown> {
  const sealed = sealPerson(keys, personId, identity);
  const row: Record<string, unknown> = { person_id: personId, has: Object.keys(sealed.ciphers) };
  for (const [key, cipher] of Object.entries(sealed.ciphers)) {
    row[CIPHER_COLUMNS[key as IdentityKey]] = cipher?.toString("base64") ?? null;
  }
  if (sealed.refToken) row.ref_token = sealed.refToken.toString("base64");
  if (known(identity.name)) row.name_masked = sealed.nameMasked;
  if (known(identity.phone)) row.phone_last2 = sealed.phoneLast2;
  if (known(identity.email)) row.email_masked = sealed.emailMasked;
  if (known(identity.birthDate)) row.birth_year = sealed.birthYear;
  return row;
}

/**
 * Writes identity of people that stand in core already: ciphertext, masked and coarse forms, and
 * search tokens. Runs through the database's own function, which checks who may.
 *
 * @param country country code by which national telephone numbers are read
 */
export async function putPeople(
  tx: Tx,
  keys: InvestigationKeys,
  people: readonly { personId: string; identity: Identity }[],
  country: string,
): Promise<void> {
  if (people.length === 0) return;
  const rows = people.map(({ personId, identity }) => sealIdentity(keys, personId, identity));
  const tokens = people.flatMap(({ personId, identity }) =>
    identityTokens(keys, personId, identity, country),
  );
  const kinds = new Set<number>();
  for (const { identity } of people) {
    if (identity.phone !== undefined) kinds.add(TOKEN_KINDS.phone);
    if (identity.email !== undefined) kinds.add(TOKEN_KINDS.email);
    if (identity.name !== undefined) {
      kinds.add(TOKEN_KINDS.namePart);
      kinds.add(TOKEN_KINDS.nameSound);
    }
  }
  await tx.execute(
    sql`select identity.put_people(${JSON.stringify(rows)}::jsonb, ${JSON.stringify(tokens)}::jsonb,
      ${`{${[...kinds].join(",")}}`}::smallint[])`,
  );
}

/** Identity of opened people by id; people out of scope are absent. */
export type OpenedPeople = Map<string, Identity>;

/**
 * Opens identity fields of people. Writes one access event naming fields and people in the same
 * transaction.
 *
 * @param fields identity keys; one that the acting role may not open is refused (42501)
 * @param action the event's name
 */
export async function openPeople(
  tx: Tx,
  keys: InvestigationKeys,
  personIds: readonly string[],
  fields: readonly IdentityKey[],
  action: EventName,
): Promise<OpenedPeople> {
  const opened: OpenedPeople = new Map();
  if (personIds.length === 0 || fields.length === 0) return opened;
  const found = await tx.execute<{ person_id: string; field: IdentityKey; cipher: Buffer }>(
    sql`select person_id, field, cipher from identity.open_people(
      ${sql.param(`{${personIds.join(",")}}`)}::uuid[], ${sql.param(`{${fields.join(",")}}`)}::text[], ${action})`,
  );
  for (const row of found.rows) {
    const identity = opened.get(row.person_id) ?? {};
    identity[row.field] = open(
      keys.seal,
      identityPlace(row.field, row.person_id),
      row.cipher,
    ).toString();
    opened.set(row.person_id, identity);
  }
  return opened;
}

/** Opens ciphertexts of people that were read for an import (recorded by the import's own event). */
export function openCipher(
  keys: InvestigationKeys,
  personId: string,
  field: IdentityKey,
  cipher: Buffer,
): string {
  return open(keys.seal, identityPlace(field, personId), cipher).toString();
}

/** Opens household names; recorded by the database's function. */
export async function openPlaces(
  tx: Tx,
  keys: InvestigationKeys,
  placeIds: readonly string[],
): Promise<Map<string, string>> {
  const names = new Map<string, string>();
  const ids = [...new Set(placeIds)];
  if (ids.length === 0) return names;
  const found = await tx.execute<{ place_id: string; cipher: Buffer }>(
    sql`select place_id, cipher from identity.open_places(${sql.param(`{${ids.join(",")}}`)}::uuid[])`,
  );
  for (const row of found.rows)
    names.set(row.place_id, placeName.open(keys, row.place_id, row.cipher));
  return names;
}

/** A person found by search tokens, with the kinds that met. */
export interface Found {
  personId: string;
  kinds: number[];
}

const byteArray = (tokens: readonly Buffer[]) =>
  sql`${sql.param(`{${tokens.map((token) => `"\\\\x${token.toString("hex")}"`).join(",")}}`)}::bytea[]`;

/**
 * Finds people by what was typed: a telephone number or e-mail exactly, else all name parts (whole
 * parts, or parts that sound alike), within what the acting person may name.
 */
export async function findPeople(
  tx: Tx,
  keys: InvestigationKeys,
  typed: string,
  country: string,
  limit = 200,
): Promise<Found[]> {
  const { all, any, sounds } = searchTokens(keys, typed, country);
  const run = async (allTokens: Buffer[], anyTokens: Buffer[]) => {
    if (allTokens.length + anyTokens.length === 0) return [];
    const found = await tx.execute<{ person_id: string; kinds: number[] }>(
      sql`select person_id, kinds from identity.find_people(${byteArray(allTokens)}, ${byteArray(anyTokens)}, ${limit})`,
    );
    return found.rows.map((row) => ({ personId: row.person_id, kinds: row.kinds }));
  };
  const exact = await run(all, any);
  if (exact.length >= limit || sounds.length === 0) return exact;
  const alike = await run(sounds, []);
  const seen = new Set(exact.map((one) => one.personId));
  return [...exact, ...alike.filter((one) => !seen.has(one.personId))].slice(0, limit);
}

/** Tokens of something typed: name parts to meet together, exact ones, and phonetic ones. */
export function searchTokens(keys: InvestigationKeys, typed: string, country: string) {
  const any: Buffer[] = [];
  const text = typed.trim();
  if (/\d{3}/.test(text.replace(/\D+/g, "")) && !/[a-z@]/i.test(text)) {
    const phone = normalPhone(text, country);
    if (phone) any.push(tokenOf(keys.token, TOKEN_KINDS.phone, phone));
  }
  if (text.includes("@")) any.push(tokenOf(keys.token, TOKEN_KINDS.email, text.toLowerCase()));
  const named = text.includes("@") || any.length > 0 ? "" : text;
  return {
    any,
    all: nameParts(named).map((part) => tokenOf(keys.token, TOKEN_KINDS.namePart, part)),
    sounds: soundsToFind(named).map((sound) => tokenOf(keys.token, TOKEN_KINDS.nameSound, sound)),
  };
}

/**
 * Sends possible matches of new people that the acting person may not see to the supervisor's list:
 * the same telephone number, or all parts of the name.
 */
export async function flagHiddenMatches(
  tx: Tx,
  keys: InvestigationKeys,
  people: readonly { personId: string; name: string | null; phone: string | null }[],
  country: string,
): Promise<void> {
  const hex = (tokens: readonly Buffer[]) => tokens.map((token) => token.toString("hex"));
  const rows = people
    .map(({ personId, name, phone }) => ({
      person_id: personId,
      phone: known(phone) ? hex(searchTokens(keys, phone, country).any) : [],
      names: known(name) ? hex(searchTokens(keys, name, country).all) : [],
    }))
    .filter((row) => row.phone.length + row.names.length > 0);
  if (rows.length === 0) return;
  await tx.execute(
    sql`select identity.flag_hidden_matches(r.person_id,
          array(select decode(token, 'hex') from jsonb_array_elements_text(r.phone) p (token)),
          array(select decode(token, 'hex') from jsonb_array_elements_text(r.names) n (token)))
        from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as r (person_id uuid, phone jsonb, names jsonb)`,
  );
}
