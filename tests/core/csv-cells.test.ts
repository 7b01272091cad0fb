import { stringify } from "csv-stringify/sync";
import fc from "fast-check";
import { expect, test } from "vitest";
import { csvRecord, guardCell, unguardCell } from "../../shared/csv-cells.ts";

// ASVS 5.0.0-1.2.10, and what spreadsheets of some regions read alike.
const RISKY = ["=", "+", "-", "@", "\t", "\r", "\0", "＝", "＋", "－", "＠"];

const cell = fc.oneof(
  fc.string({ unit: "binary" }),
  fc
    .tuple(fc.array(fc.constantFrom(...RISKY, "'", '"', ","), { maxLength: 4 }), fc.string())
    .map(([head, tail]) => head.join("") + tail),
);

test("guarding and taking away is lossless, and nothing guarded begins a formula", () => {
  fc.assert(
    fc.property(cell, (text) => {
      const guarded = guardCell(text);
      expect(unguardCell(guarded)).toBe(text);
      expect(RISKY.some((first) => guarded.startsWith(first))).toBe(false);
    }),
    { numRuns: 10_000 },
  );
});

test("exactly one apostrophe is taken, and only one that guards something", () => {
  expect(guardCell("+44 7700 900123")).toBe("'+44 7700 900123");
  expect(unguardCell("'+44 7700 900123")).toBe("+44 7700 900123");
  expect(unguardCell("''t Zand")).toBe("'t Zand");
  expect(unguardCell("'t Zand")).toBe("'t Zand");
  expect(unguardCell("'")).toBe("'");
  expect(guardCell("plain")).toBe("plain");
});

test("a record is what the CSV library writes with every cell quoted", () => {
  fc.assert(
    fc.property(fc.array(cell, { minLength: 1, maxLength: 6 }), (cells) => {
      const theirs = stringify([cells.map(guardCell)], {
        quoted: true,
        quoted_empty: true,
        record_delimiter: "windows",
      });
      expect(csvRecord(cells)).toBe(theirs);
    }),
    { numRuns: 1000 },
  );
});
