/** Identifiable fields of an invented person, each with a value that stands nowhere else. */
export interface MarkedPerson {
  ref: string;
  name: string;
  phone: string;
  email: string;
  birthDate: string;
  address: string;
  household: string;
  note: string;
  occupation: string;
}
export type MarkedKey = keyof MarkedPerson;
export const MARKED_KEYS: readonly MarkedKey[] = [
  "ref",
  "name",
  "phone",
  "email",
  "birthDate",
  "address",
  "household",
  "note",
  "occupation",
];

/** A person's markers from one word; `number` (0–99) makes telephone number and birth day unique. */
export function markedPerson(word: string, number: number): MarkedPerson {
  const two = String(number).padStart(2, "0");
  return {
    ref: `ZQR-${word.toUpperCase()}-7`,
    name: `Zqné${word} Okxu${word}`,
    // A range kept free for invented numbers.
    phone: `+44 7700 9004${two}`,
    email: `zqe.${word}@canary.example`,
    birthDate: `19${10 + number}-03-19`,
    address: `17 Zqa${word} Lane`,
    household: `Zqh${word} household`,
    note: `Zqt${word} remembers`,
    occupation: `Zqo${word} maker`,
  };
}

/** Parts of a value that would give it away alone. */
function needlesOf(key: MarkedKey, value: string): string[] {
  if (key === "name") return value.split(" ");
  if (key === "phone") {
    const digits = value.replace(/\D/g, "");
    return [value, digits, digits.slice(2)];
  }
  if (key === "birthDate") {
    const [year, month, day] = value.split("-") as [string, string, string];
    return [value, `${day}/${month}/${year}`, `${day}.${month}.${year}`, `${year}${month}${day}`];
  }
  if (key === "address" || key === "household" || key === "note" || key === "occupation") {
    const word = /zq\w+/i.exec(value)?.[0];
    return word ? [word] : [value];
  }
  return [value];
}

/** Base64 of a text wherever it starts inside a longer one: three readings, edges cut off. */
function base64Readings(text: string): string[] {
  return [0, 1, 2].flatMap((shift) => {
    const bytes = Buffer.concat([Buffer.alloc(shift, 32), Buffer.from(text)]);
    const whole = bytes.toString("base64").replace(/=+$/, "");
    const inner = whole.slice(shift === 0 ? 0 : shift + 1, bytes.length % 3 === 0 ? undefined : -1);
    return [inner, inner.replaceAll("+", "-").replaceAll("/", "_")];
  });
}

const jsonEscaped = (text: string) =>
  [...text]
    .map((letter) =>
      letter.charCodeAt(0) > 126
        ? `\\u${letter.charCodeAt(0).toString(16).padStart(4, "0")}`
        : letter,
    )
    .join("");

/** Every form in which a value is looked for: folded ones in lower case, and exact ones. */
function formsOf(needle: string): { folded: string[]; exact: string[] } {
  const lower = needle.toLowerCase();
  const spellings = [lower, lower.normalize("NFD")];
  const folded = spellings.flatMap((text) => [
    text,
    encodeURIComponent(text).toLowerCase(),
    encodeURIComponent(text).replaceAll("%20", "+").toLowerCase(),
    jsonEscaped(text),
    text.replaceAll("é", "&eacute;").replaceAll("é", "&#233;"),
    [...text].reverse().join(""),
    Buffer.from(text).toString("hex"),
    Buffer.from(text.toUpperCase()).toString("hex"),
    Buffer.from(needle.normalize(text === lower ? "NFC" : "NFD")).toString("hex"),
  ]);
  const exact = [needle, lower, needle.toUpperCase()]
    .flatMap((text) => [text, text.normalize("NFD")])
    .flatMap(base64Readings)
    .filter((text) => text.length >= 7);
  return { folded: [...new Set(folded)], exact: [...new Set(exact)] };
}

/** One place where something was found: whose field, and in which form. */
export interface Hit {
  person: string;
  key: MarkedKey;
  form: string;
}

/** Looks for the markers of named people in any text. */
export class MarkerScan {
  readonly #needles: { person: string; key: MarkedKey; folded: string[]; exact: string[] }[] = [];

  add(person: string, fields: Partial<MarkedPerson>): void {
    for (const [key, value] of Object.entries(fields) as [MarkedKey, string][]) {
      for (const needle of needlesOf(key, value)) {
        this.#needles.push({ person, key, ...formsOf(needle) });
      }
    }
  }

  hits(text: string): Hit[] {
    const lower = text.toLowerCase();
    const out: Hit[] = [];
    for (const { person, key, folded, exact } of this.#needles) {
      const form =
        folded.find((needle) => lower.includes(needle)) ??
        exact.find((needle) => text.includes(needle));
      if (form) out.push({ person, key, form });
    }
    return out;
  }
}
