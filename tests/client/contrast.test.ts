// @vitest-environment node
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { coloredGroups, groupColors } from "../../src/components/person-mark/group-colors.ts";
import { type Theme, tokens } from "../../src/styles/tokens.ts";

const css = readFileSync(new URL("../../src/styles/tokens.css", import.meta.url), "utf8");

/** Variables of one rule of tokens.css, found by its selector. */
function variables(selector: string): Record<string, string> {
  const start = css.indexOf(`${selector} {`);
  expect(start, selector).toBeGreaterThanOrEqual(0);
  const block = css.slice(start, css.indexOf("}", start));
  return Object.fromEntries(
    [...block.matchAll(/--([\w-]+): (#[0-9a-f]{6});/g)].map(([, name, value]) => [name, value]),
  );
}

/** Contrast ratio by WCAG 2.2, "relative luminance" and "contrast ratio". */
function contrast(a: string, b: string): number {
  const luminance = (hex: string) => {
    const [red = 0, green = 0, blue = 0] = [1, 3, 5]
      .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
      .map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4));
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
  };
  const [light = 0, dark = 0] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (light + 0.05) / (dark + 0.05);
}

const themes: readonly Theme[] = ["light", "dark"];

describe("colour tokens", () => {
  it("computes the ratio of black on white as WCAG does", () => {
    expect(contrast("#000000", "#ffffff")).toBeCloseTo(21, 10);
    expect(contrast("#777777", "#ffffff")).toBeCloseTo(4.48, 2);
  });

  it.each([
    [":root", "light"],
    ['  :root:not([data-theme="light"])', "dark"],
    ['\n:root[data-theme="dark"]', "dark"],
  ] as const)("css rule %j has the values of tokens.ts", (selector, theme) => {
    const groups = Object.fromEntries(
      groupColors[theme].map((color, place) => [`group-${place + 1}`, color]),
    );
    expect(variables(selector)).toEqual({ ...tokens[theme], ...groups });
  });

  describe.each(themes)("%s", (theme) => {
    const { paper, "paper-2": second, wash, ...rest } = tokens[theme];

    it.each(["ink", "ink-2", "kelp", "coral", "ochre", "blue"] as const)(
      "%s is readable as text on both grounds",
      (name) => {
        expect(contrast(rest[name], paper)).toBeGreaterThanOrEqual(4.5);
        expect(contrast(rest[name], second)).toBeGreaterThanOrEqual(4.5);
      },
    );

    it("ink is readable on a washed window, paper on filled buttons", () => {
      expect(contrast(rest.ink, wash)).toBeGreaterThanOrEqual(4.5);
      for (const fill of [rest.ink, rest["ink-2"], rest.kelp, rest.coral]) {
        expect(contrast(paper, fill)).toBeGreaterThanOrEqual(4.5);
      }
    });

    it("outlines of marks and frames of fields stand out 3:1 from the ground", () => {
      for (const line of [rest.ink, rest["ink-2"], rest.seen, rest.coral, rest.blue]) {
        expect(contrast(line, paper)).toBeGreaterThanOrEqual(3);
      }
    });

    it("has one colour for each coloured group, all different", () => {
      expect(new Set(groupColors[theme]).size).toBe(coloredGroups);
    });
  });

  it("on the dark ground every group colour stands out by itself too", () => {
    for (const color of groupColors.dark) {
      expect(contrast(color, tokens.dark.paper)).toBeGreaterThanOrEqual(3);
    }
  });
});
