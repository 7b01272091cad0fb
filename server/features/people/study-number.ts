import { randomBytes } from "node:crypto";

// No I, L, O, U: they are misread or misheard on the telephone.
const ALPHABET = "0123456789ABCDEFGHJKMNPQRSTVWXYZ";

const LENGTH = 7;

/** Random study numbers such as "K4T-29X7": 35 bits, derived from nothing about the person. */
export function newStudyNumbers(count: number): string[] {
  const random = randomBytes(count * LENGTH);
  return Array.from({ length: count }, (_, at) => {
    let text = "";
    for (let k = 0; k < LENGTH; k++) {
      if (k === 3) text += "-";
      // 32 characters: five bits of a byte choose evenly.
      text += ALPHABET[(random[at * LENGTH + k] as number) & 31];
    }
    return text;
  });
}

/** One random study number. */
export function newStudyNumber(): string {
  return newStudyNumbers(1)[0] as string;
}

/** What was typed as a study number, or null when it cannot be (part of) one. */
export function asStudyNumber(typed: string): string | null {
  const text = typed.trim().toUpperCase();
  return /^[0-9A-HJKMNP-TV-Z]{3}-?[0-9A-HJKMNP-TV-Z]{0,4}$/.test(text)
    ? `${text.replace("-", "").slice(0, 3)}-${text.replace("-", "").slice(3)}`
    : null;
}
