// @vitest-environment jsdom
import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { groupColors } from "../../src/components/person-mark/group-colors.ts";
import { markBlobUrl, markSvg } from "../../src/components/person-mark/mark-svg.ts";
import { markText } from "../../src/components/person-mark/mark-text.ts";
import { PersonMark } from "../../src/components/person-mark/person-mark.tsx";
import type { PersonMarkInput } from "../../src/components/person-mark/person-mark-input.ts";
import { tokens } from "../../src/styles/tokens.ts";

afterEach(cleanup);

const kinds: readonly PersonMarkInput[] = [
  { classification: "confirmed" },
  { classification: "probable" },
  { classification: "suspected" },
  { classification: "not_a_case" },
  { classification: "confirmed", wasContact: true },
  { classification: "contact" },
  { classification: "contact", followUp: { share: 0.5, state: "active" } },
  { classification: "contact", followUp: { share: 1, state: "completed" } },
  { classification: "contact", followUp: { share: 0.5, state: "lost" } },
];

describe("person mark", () => {
  it("has a text alternative for all that it shows", () => {
    expect(markText({ classification: "probable" })).toBe("probable case");
    expect(
      markText({
        classification: "contact",
        followUp: { share: 0.6, state: "active" },
        group: 2,
        groupLabel: "group 7",
      }),
    ).toMatch(/^contact, 60\s?% of follow-up done, group 7$/);
    render(<PersonMark classification="contact" followUp={{ share: 0.2, state: "lost" }} />);
    expect(screen.getByRole("img", { name: "contact, lost to follow-up" })).toBeTruthy();
  });

  it("gives each kind its own text and its own drawing, in ink alone", () => {
    expect(new Set(kinds.map(markText)).size).toBe(kinds.length);
    expect(new Set(kinds.map((kind) => markSvg(kind, "light"))).size).toBe(kinds.length);
  });

  it.each(["light", "dark"] as const)("%s: a coloured mark keeps an ink outline", (theme) => {
    for (const kind of kinds.filter(({ classification }) => classification !== "not_a_case")) {
      const svg = markSvg({ ...kind, group: 1 }, theme);
      expect(svg).toContain(`stroke="${tokens[theme].ink}"`);
      expect(svg).toContain(`"${groupColors[theme][1]}"`);
    }
  });

  it("paints groups past the set grey", () => {
    const rest = markSvg({ classification: "confirmed", group: "rest" }, "light");
    expect(markSvg({ classification: "confirmed", group: 99 }, "light")).toBe(rest);
    expect(rest).toContain(`fill="${tokens.light["ink-2"]}"`);
  });

  it("writes pictures without style attributes, which the policy would refuse", () => {
    for (const kind of kinds) {
      const svg = markSvg({ ...kind, group: 0 }, "dark");
      expect(svg).not.toMatch(/style|script|var\(/);
      const parsed = new DOMParser().parseFromString(svg, "image/svg+xml");
      expect(parsed.querySelector("parsererror")).toBeNull();
    }
  });

  it("makes one blob for one look, follow-up in steps of a twentieth", () => {
    let made = 0;
    const create = vi.fn(() => `blob:mark-${++made}`);
    vi.stubGlobal("URL", Object.assign(URL, { createObjectURL: create }));
    const mark = (share: number): PersonMarkInput => ({
      classification: "contact",
      followUp: { share, state: "active" },
      group: 3,
    });
    const first = markBlobUrl(mark(0.501), "light");
    expect(markBlobUrl(mark(0.499), "light")).toBe(first);
    expect(markBlobUrl(mark(0.499), "dark")).not.toBe(first);
    expect(create).toHaveBeenCalledTimes(2);
    vi.unstubAllGlobals();
  });
});
