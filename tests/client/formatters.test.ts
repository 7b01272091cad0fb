// @vitest-environment node
import { describe, expect, it } from "vitest";
import { addDays, dayNumber, daysBetween } from "../../src/lib/calendar-day.ts";
import {
  formatCount,
  formatDay,
  formatEstimate,
  formatInstant,
  formatInterval,
  formatNumber,
  formatPart,
  formatRelativeDay,
  formatShare,
} from "../../src/lib/formatters.ts";
import { parsePartialDate } from "../../src/lib/partial-date.ts";

const locale = "en-GB";

describe("numbers", () => {
  it("writes a missing figure as a dash, never as 0", () => {
    expect(formatNumber(null)).toBe("—");
    expect(formatNumber(undefined)).toBe("—");
    expect(formatNumber(Number.NaN)).toBe("—");
    expect(formatNumber(0, { locale })).toBe("0");
    expect(formatShare(null)).toBe("—");
    expect(formatInterval(null)).toBe("—");
    expect(formatEstimate(null, [1, 2])).toBe("—");
  });

  it("follows the locale", () => {
    expect(formatNumber(1482, { locale })).toBe("1,482");
    expect(formatNumber(1482.5, { decimals: 1, locale: "de-DE" })).toBe("1.482,5");
    expect(formatShare(0.31, { locale })).toBe("31%");
  });

  it("writes estimates with their interval and the same decimals", () => {
    expect(formatEstimate(1.517, [1.28, 1.7801], { locale })).toBe("1.52 (1.28–1.78)");
    expect(formatEstimate(1.5, null, { locale })).toBe("1.50");
  });

  it("gives no percentage of a small whole", () => {
    expect(formatPart(19, 31, { locale })).toBe("19 of 31 (61%)");
    expect(formatPart(2, 9, { locale })).toBe("2 of 9");
    expect(formatPart(0, 0, { locale, minimum: 0 })).toBe("0 of 0");
    expect(formatCount(1, "person", "people", { locale })).toBe("1 person");
  });
});

describe("days", () => {
  it("are real calendar days or nothing", () => {
    expect(dayNumber("1970-01-01")).toBe(0);
    expect(dayNumber("2026-02-30")).toBeNull();
    expect(dayNumber("2026-13-01")).toBeNull();
    expect(dayNumber("2026-05")).toBeNull();
    expect(addDays("2028-02-28", 1)).toBe("2028-02-29");
    expect(daysBetween("2026-03-28", "2026-03-30")).toBe(2);
  });

  it("do not move with the time zone of the reader", () => {
    const before = process.env.TZ;
    try {
      for (const zone of ["Pacific/Kiritimati", "America/Los_Angeles", "UTC"]) {
        process.env.TZ = zone;
        expect(formatDay("2026-05-18", { locale })).toBe("18 May 2026");
        expect(formatRelativeDay("2026-05-18", "2026-05-27", { locale })).toBe("9 days ago");
      }
    } finally {
      if (before === undefined) delete process.env.TZ;
      else process.env.TZ = before;
    }
  });

  it("stay partial, and words stay words", () => {
    expect(formatDay("2026-05", { locale })).toBe("May 2026");
    expect(formatDay("unknown")).toBe("unknown");
    expect(formatDay("")).toBe("—");
    expect(formatDay("2026-02-30")).toBe("2026-02-30");
  });

  it("are named from today", () => {
    expect(formatRelativeDay("2026-05-27", "2026-05-27", { locale })).toBe("today");
    expect(formatRelativeDay("2026-05-26", "2026-05-27", { locale })).toBe("yesterday");
    expect(formatRelativeDay("2026-05", "2026-05-27", { locale })).toBe("—");
  });

  it("instants are written in the zone that is asked for", () => {
    const instant = "2026-05-27T23:30:00Z";
    expect(formatInstant(instant, "UTC", { locale })).toBe("27 May 2026, 23:30");
    expect(formatInstant(instant, "Pacific/Kiritimati", { locale })).toBe("28 May 2026, 13:30");
    expect(formatInstant("no instant", "UTC")).toBe("—");
  });
});

describe("partial dates as typed", () => {
  const read = (text: string) => parsePartialDate(text, { today: "2026-05-27" });

  it.each([
    ["", "blank", ""],
    ["2026-05-18", "day", "2026-05-18"],
    ["20260518", "day", "2026-05-18"],
    [" 2026-05 ", "month", "2026-05"],
    ["u", "unknown", "unknown"],
    ["Refused", "refused", "refused"],
    ["today", "day", "2026-05-27"],
    ["yesterday", "day", "2026-05-26"],
    ["-30", "day", "2026-04-27"],
  ])("%j is a %s", (text, kind, value) => {
    expect(read(text)).toEqual({ kind, value });
  });

  it.each(["5/6/2026", "2026-02-30", "2026-13", "soon", "2026"])("%j is refused", (text) => {
    expect(read(text)).toMatchObject({
      kind: "invalid",
      reason: "Write YYYY-MM-DD, YYYY-MM, unknown or refused.",
    });
  });

  it("takes no month and no word where a full day is needed", () => {
    const strict = { allowMonth: false, answers: false };
    expect(parsePartialDate("2026-05", strict).kind).toBe("invalid");
    expect(parsePartialDate("unknown", strict)).toMatchObject({ reason: "Write YYYY-MM-DD." });
  });
});
