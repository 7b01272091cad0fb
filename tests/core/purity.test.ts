import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";

const CORE = fileURLToPath(new URL("../../shared/core", import.meta.url));
const FILES = readdirSync(CORE, { recursive: true, encoding: "utf8" }).filter((file) =>
  file.endsWith(".ts"),
);

/** Code without comments: words in a docstring are no calls. */
const codeOf = (file: string) =>
  readFileSync(join(CORE, file), "utf8")
    .replace(/\/\*[\s\S]*?\*\//g, "")
    .replace(/\/\/.*$/gm, "");

it("finds the core", () => {
  expect(FILES).toContain("index.ts");
  expect(FILES.length).toBeGreaterThan(15);
});

// Source: the house rule that the same input and seed give the same bytes anywhere.
describe.each(FILES)("%s", (file) => {
  const code = codeOf(file);

  it("imports nothing from outside the core", () => {
    for (const [, from = ""] of code.matchAll(/(?:from|import)\s*\(?\s*"([^"]+)"/g)) {
      expect(from.startsWith(".")).toBe(true);
      const target = relative(CORE, resolve(CORE, dirname(file), from));
      expect(target.startsWith("..")).toBe(false);
    }
  });

  it("reads no clock, draws no chance and touches no surroundings", () => {
    expect(code).not.toMatch(
      /\b(Date|performance|process|crypto|window|document|globalThis|console|require)\b|Math\.random|setTimeout|Intl/,
    );
  });
});
