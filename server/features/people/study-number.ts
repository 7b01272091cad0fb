import { randomInt } from "node:crypto";

// No I, L, O, U: they are misread or misheard on the telephone.
const ALPHABET = "0123456789ABCDEFGHJKMNPQRSTVWXYZ";

/** A random study number such as "K4T-29X7": 35 bits, derived from nothing about the person. */
export function newStudyNumber(): string {
  const pick = () => ALPHABET[randomInt(ALPHABET.length)];
  return `${pick()}${pick()}${pick()}-${pick()}${pick()}${pick()}${pick()}`;
}

/** What was typed as a study number, or null when it cannot be (part of) one. */
export function asStudyNumber(typed: string): string | null {
  const text = typed.trim().toUpperCase();
  return /^[0-9A-HJKMNP-TV-Z]{3}-?[0-9A-HJKMNP-TV-Z]{0,4}$/.test(text)
    ? `${text.replace("-", "").slice(0, 3)}-${text.replace("-", "").slice(3)}`
    : null;
}
