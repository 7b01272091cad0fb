import { createHmac } from "node:crypto";
import anyAscii from "any-ascii";
import { doubleMetaphone } from "double-metaphone";
import {
  type CountryCode,
  isSupportedCountry,
  parsePhoneNumberFromString,
} from "libphonenumber-js";

/** What a search token stands for; stored as a small integer beside it. */
export const TOKEN_KINDS = { phone: 1, email: 2, namePart: 3, nameSound: 4 } as const;
export type TokenKind = (typeof TOKEN_KINDS)[keyof typeof TOKEN_KINDS];

const TOKEN_BYTES = 16;

/** Keyed token of a normalised value (HMAC-SHA-256, 128 bits kept). */
export function tokenOf(key: Buffer, kind: string | number, value: string): Buffer {
  return createHmac("sha256", key).update(`${kind}|${value}`).digest().subarray(0, TOKEN_BYTES);
}

/** True for a country whose telephone numbers can be read: a typing error is none. */
export function hasPhoneNumbers(countryCode: string): boolean {
  return isSupportedCountry(countryCode as CountryCode);
}

/** Name parts folded for case, accents and script: "Élise d'Añez" gives elise, d, anez. */
export function nameParts(name: string): string[] {
  const parts = anyAscii(name.normalize("NFC"))
    .toLowerCase()
    .split(/[^a-z0-9]+/)
    .filter((part) => part.length > 0);
  return [...new Set(parts)].slice(0, 12);
}

/** Phonetic keys of the name parts (double metaphone, both readings). */
export function nameSounds(name: string): string[] {
  const sounds = nameParts(name)
    .filter((part) => part.length > 1)
    .flatMap((part) => doubleMetaphone(part));
  return [...new Set(sounds.filter((sound) => sound.length > 1))];
}

/** First phonetic reading of each name part: what a search asks for. */
export function soundsToFind(name: string): string[] {
  const sounds = nameParts(name)
    .filter((part) => part.length > 1)
    .map((part) => doubleMetaphone(part)[0]);
  return [...new Set(sounds.filter((sound) => sound.length > 1))];
}

/**
 * A telephone number in international form where the investigation's country lets it be read so,
 * else its digits; null when there are fewer than five.
 */
export function normalPhone(phone: string, country: string): string | null {
  const parsed = parsePhoneNumberFromString(phone, country as CountryCode);
  if (parsed?.isPossible()) return parsed.number;
  const digits = phone.replace(/\D+/g, "");
  return digits.length >= 5 ? digits : null;
}

/** True for something that can be a telephone number (no letters, no exponent, some digits). */
export function looksLikePhone(phone: string): boolean {
  return /^[+(]?[\d\s().\-/+]*(?:(?:ext|x)\.?\s?\d+)?$/i.test(phone) && /\d.*\d.*\d/.test(phone);
}
