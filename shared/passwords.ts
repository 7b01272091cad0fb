/**
 * Words that make up passwords people guess first, and this product's own. Compared in lower case
 * without digits, blanks and signs, so that `Password-2026!` is met as well.
 */
const COMMON = [
  "password",
  "passwort",
  "passphrase",
  "passcode",
  "letmein",
  "welcome",
  "iloveyou",
  "loveyou",
  "qwertyuiop",
  "qwerty",
  "qwertz",
  "azerty",
  "asdfghjkl",
  "asdf",
  "zxcvbnm",
  "administrator",
  "admin",
  "login",
  "secret",
  "changeme",
  "change",
  "default",
  "trustno",
  "sunshine",
  "princess",
  "football",
  "baseball",
  "superman",
  "batman",
  "dragon",
  "monkey",
  "master",
  "shadow",
  "michael",
  "summer",
  "winter",
  "spring",
  "autumn",
  "january",
  "monday",
  "please",
  "hello",
  "test",
  "user",
  "abcdefghijklmnopqrstuvwxyz",
  "abcdef",
  "abc",
  "xyz",
  "strandline",
  "contact",
  "tracing",
  "tracer",
  "trace",
  "outbreak",
  "epidemic",
  "pandemic",
  "virus",
  "health",
  "public",
  "supervisor",
  "epidemiologist",
  "epidemiology",
  "officer",
  "investigation",
] as const;

/** Letters that must be left, once the words anybody would try are taken out. */
const ENOUGH = 5;

/** Letters of any script, lower case, compatibility forms folded. */
function lettersOf(value: string): string {
  return value
    .normalize("NFKD")
    .toLowerCase()
    .replace(/[^\p{L}]/gu, "");
}

/** Digits and signs that stand for letters in guessed passwords. */
const LOOKALIKES: Readonly<Record<string, string>> = {
  "0": "o",
  "1": "l",
  "3": "e",
  "4": "a",
  "5": "s",
  "7": "t",
  "@": "a",
  $: "s",
  "!": "i",
};

/** Three digits in a row, up or down. */
const RUNS = [..."0123456789"].flatMap((_digit, at) => {
  const three = [0, 1, 2].map((step) => (at + step) % 10);
  return [three.join(""), three.toReversed().join("")];
});

function without(text: string, parts: readonly string[]): string {
  let rest = text;
  for (const part of parts) rest = rest.replaceAll(part, "");
  return rest;
}

/** Too little is left of the letters once the words are out. */
function fewLetters(letters: string, words: readonly string[]): boolean {
  const rest = without(letters, words);
  // One letter over and over, or two in turn, is not a word either.
  return rest.length < ENOUGH || new Set(rest).size < 3;
}

/** Drawn by a machine: many different signs beside words, years and digits in a row. */
function looksDrawn(password: string, words: readonly string[]): boolean {
  const signs = password
    .normalize("NFKD")
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]/gu, "");
  const rest = without(without(signs, words).replace(/(?:19|20)\d\d/g, ""), RUNS);
  return rest.length >= 10 && new Set(rest).size >= 6;
}

/**
 * True for a password that is among the first ones tried: made of common words, of the words given
 * (name, e-mail of the account), of one short piece repeated, or of digits in a row. Works offline
 * and never looks at the length; that is checked beside it.
 *
 * @param words what an attacker would know of the account
 */
export function isGuessable(password: string, words: readonly string[] = []): boolean {
  const known = words
    .flatMap((one) => [one, ...one.split(/[^\p{L}]+/u)])
    .map(lettersOf)
    .filter((one) => one.length >= 3);
  const all = [...new Set<string>([...COMMON, ...known])].sort((a, b) => b.length - a.length);
  const unmasked = password.replace(/[013457@$!]/g, (sign) => LOOKALIKES[sign] ?? sign);
  if (
    !(looksDrawn(password, all) && looksDrawn(unmasked, all)) &&
    (fewLetters(lettersOf(password), all) || fewLetters(lettersOf(unmasked), all))
  ) {
    return true;
  }
  // A short piece said again and again: `ab12ab12ab12ab12`.
  return /^(.{1,7})\1+.{0,6}$/su.test(password);
}
