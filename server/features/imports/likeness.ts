import { doubleMetaphone } from "double-metaphone";
import type { MatchedOn } from "../../../shared/contracts/imports.ts";
import { nameParts, normalPhone } from "../../identity/tokens.ts";
import { isMissingWord } from "./check-cell.ts";

/** What two people are compared by; null where nothing is known. */
export interface Likeness {
  name: string | null;
  phone: string | null;
  birthYear: number | null;
}

const known = (value: string | null | undefined): value is string =>
  typeof value === "string" && value !== "" && !isMissingWord(value);

/** The likeness of cells or of opened fields; words for "missing" are nothing to compare. */
export function likenessOf(
  name: string | null | undefined,
  phone: string | null | undefined,
  birthDate: string | null | undefined,
): Likeness {
  return {
    name: known(name) ? name : null,
    phone: known(phone) ? phone : null,
    birthYear: known(birthDate) ? Number(birthDate.slice(0, 4)) : null,
  };
}

/** A whole name folded, its parts in alphabetical order; null when nothing of it can be compared. */
export function wholeName(name: string | null): string | null {
  const parts = name === null ? [] : nameParts(name);
  return parts.length === 0 ? null : parts.sort().join(" ");
}

/** Last digits of a number: equal for two spellings of one number, seldom for two numbers. */
export function phoneTail(phone: string | null): string | null {
  const digits = phone?.replace(/\D+/g, "") ?? "";
  return digits.length >= 5 ? digits.slice(-7) : null;
}

function partsAlike(a: string, b: string): boolean {
  if (a === b) return true;
  const sounds = new Set(doubleMetaphone(a).filter((sound) => sound.length > 1));
  return !/\d/.test(a + b) && doubleMetaphone(b).some((sound) => sounds.has(sound));
}

/** True when every part of the shorter name is, or sounds like, a part of the other. */
function namesAlike(a: string, b: string): boolean {
  const [short, long] = [nameParts(a), nameParts(b)].sort((x, y) => x.length - y.length);
  if (!short || !long || short.length === 0) return false;
  return short.every((part) => long.some((other) => partsAlike(part, other)));
}

function samePhone(a: string, b: string, country: string): boolean {
  const [left, right] = [normalPhone(a, country), normalPhone(b, country)];
  return left !== null && left === right;
}

/**
 * Whether two people may be one, and by what. A household shares a telephone, so a number alone
 * counts only where a name is blank; a common name alone counts only where nothing speaks against it.
 * Two birth years that differ always do.
 *
 * @param country country by which national telephone numbers are read
 * @returns null when nothing suggests that they are one person
 */
export function resembles(a: Likeness, b: Likeness, country: string): MatchedOn | null {
  const years = a.birthYear !== null && b.birthYear !== null;
  if (years && a.birthYear !== b.birthYear) return null;
  const phones = a.phone !== null && b.phone !== null;
  if (a.phone !== null && b.phone !== null && samePhone(a.phone, b.phone, country)) {
    if (a.name === null || b.name === null) return "phone";
    return namesAlike(a.name, b.name) ? "phone_and_name" : null;
  }
  const name = wholeName(a.name);
  if (name === null || name !== wholeName(b.name)) return null;
  if (years) return "name_and_birth_year";
  return phones || !name.includes(" ") ? null : "name";
}
