import fc from "fast-check";
import { z } from "zod";

/** The part of JSON Schema that our contracts become. */
interface Shape {
  type?: string | string[];
  enum?: unknown[];
  const?: unknown;
  anyOf?: Shape[];
  oneOf?: Shape[];
  allOf?: Shape[];
  format?: string;
  pattern?: string;
  minLength?: number;
  maxLength?: number;
  minimum?: number;
  maximum?: number;
  exclusiveMinimum?: number;
  properties?: Record<string, Shape>;
  required?: string[];
  additionalProperties?: Shape | boolean;
  items?: Shape;
  maxItems?: number;
}

/** Text of the kinds people type and paste, and of the kinds they should not. */
const typed = fc.oneof(
  fc.string({ unit: "grapheme", maxLength: 40 }),
  fc.constantFrom(
    "2026-03-01",
    "2026-03",
    "2026-02-30",
    "0001-01-01",
    "unknown",
    "refused",
    "+44 20 7946 0018",
    "someone@body.example",
    "en",
    "GB",
    "UTC",
    "=1+1",
    "'; drop table core.person; --",
    "<img src=x onerror=alert(1)>",
    "\u202Eabc",
    "e\u0301",
    "𠮷👩‍🔬",
    " ",
    "",
  ),
);

const says = (shape: Shape | undefined) =>
  shape !== undefined && Object.keys(shape).some((key) => !["$schema", "default"].includes(key));

function texts(shape: Shape, ids: readonly string[]): fc.Arbitrary<unknown> {
  if (shape.format === "uuid") return fc.oneof(fc.uuid(), fc.constantFrom(...ids));
  if (shape.format === "email") return fc.oneof(fc.emailAddress(), typed);
  if (shape.format === "date-time") return fc.constantFrom("2026-03-01T10:00:00Z", "2026-03-01");
  if (shape.pattern && !/\(\?/.test(shape.pattern)) {
    return fc.oneof(fc.stringMatching(new RegExp(shape.pattern, "u")), typed);
  }
  return typed;
}

function numbers(shape: Shape): fc.Arbitrary<unknown> {
  const min = shape.minimum ?? shape.exclusiveMinimum ?? -1000;
  const max = Math.max(min, shape.maximum ?? 1_000_000);
  return shape.type === "integer"
    ? fc.integer({ min: Math.ceil(min), max: Math.min(Math.floor(max), 2 ** 31 - 1) })
    : fc.double({ min, max, noNaN: true });
}

function ofShape(
  input: Shape,
  output: Shape | undefined,
  ids: readonly string[],
): fc.Arbitrary<unknown> {
  // What a field takes may be hidden behind a preparation; then what it becomes says more.
  const shape = says(input) ? input : (output ?? {});
  const choices = shape.anyOf ?? shape.oneOf;
  if (choices?.length) return fc.oneof(...choices.map((one) => ofShape(one, undefined, ids)));
  if (shape.allOf?.[0]) return ofShape(shape.allOf[0], undefined, ids);
  if (shape.const !== undefined) return fc.constant(shape.const);
  if (shape.enum?.length) return fc.constantFrom(...shape.enum);
  const type = Array.isArray(shape.type) ? shape.type[0] : shape.type;
  switch (type) {
    case "string":
      return texts(shape, ids);
    case "integer":
    case "number":
      return numbers(shape);
    case "boolean":
      return fc.boolean();
    case "null":
      return fc.constant(null);
    case "array":
      return fc.array(ofShape(shape.items ?? {}, output?.items, ids), {
        maxLength: Math.min(4, shape.maxItems ?? 4),
      });
    case "object": {
      const fields = Object.entries(shape.properties ?? {}).map(
        ([key, one]) => [key, ofShape(one, output?.properties?.[key], ids)] as const,
      );
      if (fields.length === 0) return fc.dictionary(fc.string({ maxLength: 8 }), fc.jsonValue());
      return fc.record(Object.fromEntries(fields), { requiredKeys: shape.required ?? [] });
    }
    default:
      return fc.oneof(typed, fc.integer(), fc.boolean(), fc.constant(null));
  }
}

function jsonSchema(schema: z.ZodType, io: "input" | "output"): Shape {
  return z.toJSONSchema(schema, { io, unrepresentable: "any", reused: "inline" }) as Shape;
}

/**
 * Values of the shape that a contract takes: most keep its types and bounds, not all keep what its
 * checks ask beyond them.
 *
 * @param ids identifiers of records that exist
 */
export function valuesOf(schema: z.ZodType, ids: readonly string[]): fc.Arbitrary<unknown> {
  return ofShape(jsonSchema(schema, "input"), jsonSchema(schema, "output"), ids);
}
