const longest = 40;

/**
 * The code of a new symptom, made of its label: `Stiff neck` gives `stiff_neck`. Labels without
 * Latin letters get a number. A code that is taken gets a number too, since a code is never reused.
 */
export function symptomCode(label: string, taken: ReadonlySet<string>): string {
  const plain = label
    .normalize("NFKD")
    .replace(/\p{M}/gu, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "_")
    .replace(/^[^a-z]+|_+$/g, "")
    .slice(0, longest);
  const base = plain === "" ? "symptom" : plain;
  if (plain !== "" && !taken.has(base)) return base;
  for (let number = plain === "" ? 1 : 2; number <= taken.size + 2; number++) {
    const end = `_${number}`;
    const code = `${base.slice(0, longest - end.length)}${end}`;
    if (!taken.has(code)) return code;
  }
  return base;
}
