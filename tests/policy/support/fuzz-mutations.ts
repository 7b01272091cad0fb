import fc from "fast-check";

type Path = (string | number)[];

/** Every place inside a JSON value, the root among them. */
function places(value: unknown, at: Path = []): Path[] {
  if (typeof value !== "object" || value === null) return [at];
  return [at, ...Object.entries(value).flatMap(([key, inner]) => places(inner, [...at, key]))];
}

function replaced(value: unknown, [key, ...rest]: Path, by: unknown): unknown {
  if (key === undefined) return by;
  const copy = (Array.isArray(value) ? [...value] : { ...(value as object) }) as Record<
    string | number,
    unknown
  >;
  copy[key] = replaced(copy[key], rest, by);
  return copy;
}

function without(value: unknown, [key, ...rest]: Path): unknown {
  if (key === undefined) return undefined;
  const copy = (Array.isArray(value) ? [...value] : { ...(value as object) }) as Record<
    string | number,
    unknown
  >;
  if (rest.length === 0) delete copy[key];
  else copy[key] = without(copy[key], rest);
  return copy;
}

/** What somebody with bad intent, or a broken client, puts in the place of a value. */
const HOSTILE: readonly unknown[] = [
  null,
  true,
  -0,
  2 ** 53 + 1,
  -1,
  0.5,
  "",
  "\0",
  "a\0b",
  "\uD800",
  "x".repeat(10_001),
  "ﷺ".repeat(200),
  [],
  {},
  [[[[]]]],
  { toString: 1 },
  { length: 1e9 },
  "2026-13-45",
  "9999-99-99",
  "NaN",
  "%00",
  "..%2f..%2f",
  Array.from({ length: 600 }, () => 1),
];

/** Keys that no contract has, or that only the server may set. */
export const EXTRA_KEYS = [
  "__proto__",
  "constructor",
  "prototype",
  "toString",
  "investigationId",
  "recordedBy",
  "created_by",
  "isAdmin",
] as const;

/** A value with one place of it replaced, left out, or given a key too many. */
export function mutated(value: unknown): fc.Arbitrary<unknown> {
  const all = places(value);
  const one = fc.constantFrom(...all);
  return fc.oneof(
    {
      weight: 4,
      arbitrary: fc
        .tuple(one, fc.constantFrom(...HOSTILE))
        .map(([at, by]) => replaced(value, at, by)),
    },
    { weight: 2, arbitrary: one.map((at) => without(value, at)) },
    {
      weight: 2,
      arbitrary: fc
        .tuple(one, fc.jsonValue({ maxDepth: 3 }))
        .map(([at, by]) => replaced(value, at, by)),
    },
    {
      weight: 1,
      arbitrary: one.map((at) =>
        replaced(
          value,
          at,
          Array.from({ length: 3 }, () => value),
        ),
      ),
    },
  );
}

/**
 * Bodies as bytes that JSON.stringify would never write. `text` is the JSON of an acceptable body.
 */
export function rawBodies(text: string): [what: string, body: string | Uint8Array<ArrayBuffer>][] {
  const object = text.startsWith("{") && text !== "{}" ? text.slice(1) : '"a":1}';
  return [
    ["nothing", ""],
    ["half of it", text.slice(0, Math.ceil(text.length / 2))],
    ["a number beyond all", `{"a":1e400,${object}`],
    ["a key twice", `{"__proto__":{"polluted":1},"__proto__":{"polluted":2},${object}`],
    ["a constructor", `{"constructor":{"prototype":{"polluted":1}},${object}`],
    ["depth of a thousand", `{"deep":${"[".repeat(1000)}${"]".repeat(1000)},${object}`],
    ["a very long text", `{"long":"${"x".repeat(200_000)}",${object}`],
    ["ten thousand entries", `{"many":[${"1,".repeat(9_999)}1],${object}`],
    ["a lone surrogate", `{"half":"\\ud800",${object}`],
    ["no UTF-8", Uint8Array.from([...Buffer.from('{"a":"'), 0xff, 0xfe, ...Buffer.from('"}')])],
    ["a bare word", "NaN"],
    ["a list", "[]"],
    ["a text", '"text"'],
    ["null", "null"],
  ];
}
