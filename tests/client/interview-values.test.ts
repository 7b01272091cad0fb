import { describe, expect, it } from "vitest";
import { readDraft } from "../../src/features/interviews/form/draft-body.ts";
import { instantOf, wallTime } from "../../src/features/interviews/form/held-at.ts";
import {
  blankContact,
  blankGroup,
  blankInterview,
} from "../../src/features/interviews/form/interview-values.ts";
import { mayLookUp } from "../../src/features/interviews/form/place-book.ts";
import {
  countWords,
  figureValue,
  readCount,
  readDay,
} from "../../src/features/interviews/form/read-box.ts";
import { dayNotice, exposureDays } from "../../src/features/interviews/form/row-notices.ts";
import {
  exposureRows,
  stripScale,
  windowRows,
} from "../../src/features/interviews/form/strip-rows.ts";
import { boxPath, toSendable } from "../../src/features/interviews/form/to-input.ts";

const today = "2026-05-27";
const windows = {
  infectious: { from: "2026-05-18", to: "2026-05-30", basis: "onset" as const },
  source: { from: "2026-05-06", to: "2026-05-19" },
};

describe("what is typed in a box", () => {
  it("reads counts as exact, between or not known, and nothing else", () => {
    const read = (text: string) => {
      const count = readCount(text);
      return count.kind === "invalid" ? "invalid" : [count.kind, count.min, count.max];
    };
    expect(read("12")).toEqual(["exact", 12, 12]);
    expect(read("10-15")).toEqual(["between", 10, 15]);
    expect(read("10 to 15")).toEqual(["between", 10, 15]);
    expect(read("12 ±3")).toEqual(["between", 9, 15]);
    expect(read("2+-5")).toEqual(["between", 0, 7]);
    expect(read("u")).toEqual(["unknown", null, null]);
    expect(read("")).toEqual(["unknown", null, null]);
    expect(read("a dozen")).toBe("invalid");
    expect(countWords(readCount("10-15"))).toBe("10–15");
  });

  it("takes a day of the month as the latest one that is not after today", () => {
    expect(readDay("27", today)).toBe("2026-05-27");
    expect(readDay("28", today)).toBe("2026-04-28");
    expect(readDay("31", "2026-05-30")).toBe("2026-03-31");
    expect(readDay("0", today)).toBe("0");
    expect(readDay("=", today, "2026-05-20")).toBe("2026-05-20");
    expect(readDay("=", today, "")).toBe("=");
  });

  it("keeps what is no figure, so that the contract can refuse it", () => {
    expect(figureValue("1,5")).toBe(1.5);
    expect(figureValue("")).toBeNull();
    expect(figureValue("R")).toBe("refused");
    expect(figureValue("lots")).toBe("lots");
  });
});

describe("held at", () => {
  it("is wall time in the investigation's zone, either way", () => {
    expect(instantOf("2026-05-27 14:30", "Europe/Dublin")).toBe("2026-05-27T13:30:00.000Z");
    expect(instantOf("2026-05-27 14:30", "Pacific/Kiritimati")).toBe("2026-05-27T00:30:00.000Z");
    expect(wallTime("2026-05-27T00:30:00Z", "Pacific/Kiritimati")).toBe("2026-05-27 14:30");
  });

  it("knows no time that the clocks leave out, and no day that is none", () => {
    expect(instantOf("2026-03-29 01:30", "Europe/Dublin")).toBeNull();
    expect(instantOf("2026-02-30 10:00", "Europe/Dublin")).toBeNull();
    expect(instantOf("yesterday", "Europe/Dublin")).toBeNull();
  });
});

describe("days of an exposure", () => {
  it("stretch over a month that is known alone", () => {
    expect(exposureDays("2026-02", "")).toEqual({
      from: "2026-02-01",
      to: "2026-02-28",
      partial: true,
    });
    expect(exposureDays("unknown", "refused")).toBeNull();
  });

  it("are noticed when missing, outside or still to come", () => {
    const notice = (firstExposure: string, lastExposure: string) =>
      dayNotice({ firstExposure, lastExposure }, windows, today);
    expect(notice("", "")).toBe("no day of exposure yet");
    expect(notice("2026-05-20", "2026-05-21")).toBeNull();
    expect(notice("2026-05-20", "")).toBe("last day not asked");
    expect(notice("2026-05-28", "2026-05-28")).toBe("after today");
    expect(notice("2026-05-07", "2026-05-08")).toMatch(/source window only/);
    expect(notice("2026-04-07", "2026-04-08")).toMatch(/^outside the infectious window/);
    expect(notice("unknown", "unknown")).toBeNull();
    const none = { infectious: null, source: null };
    const row = { firstExposure: "2020-01-01", lastExposure: "2020-01-01" };
    expect(dayNotice(row, none, today)).toBeNull();
  });
});

describe("day strip of an interview", () => {
  const subject = { windows, onsetDate: "2026-05-20", specimenDate: null };

  it("marks the day a window is counted from, and says when it is not known", () => {
    expect(windowRows(subject)[1]).toMatchObject({ reference: { label: "onset" } });
    const unknown = { windows: { infectious: null, source: null }, onsetDate: null };
    const [source, infectious] = windowRows({ ...unknown, specimenDate: null });
    expect(source).toMatchObject({ from: null, unknown: "not known: no onset day on record" });
    expect(infectious).not.toHaveProperty("reference");
  });

  it("has the latest contact on top and people not named below, blank rows left out", () => {
    const rows = exposureRows({
      contacts: [
        { ...blankContact(), name: "Ada", firstExposure: "2026-05-20", setting: "household" },
        { ...blankContact(), name: "Bo" },
        blankContact(),
      ],
      groupExposures: [
        { ...blankGroup(), place: "ferry", firstExposure: "2026-05-22", count: "u" },
      ],
    });
    expect(rows.map(({ label }) => label)).toEqual(["Bo", "Ada", "ferry"]);
    expect(rows[1]).toMatchObject({ bars: [{ from: "2026-05-20", household: true }] });
    expect(rows[2]).toMatchObject({ type: "group", count: "number not known" });
  });

  it("holds windows and today, and exposures as long as the windows stay readable", () => {
    expect(stripScale(subject, [], today)).toEqual({ from: "2026-05-05", to: "2026-05-31" });
    const at = (day: string) =>
      exposureRows({
        contacts: [{ ...blankContact(), name: "Ada", firstExposure: day }],
        groupExposures: [],
      });
    expect(stripScale(subject, at("2026-05-01"), today).from).toBe("2026-04-30");
    expect(stripScale(subject, at("2025-05-01"), today).from).toBe("2026-05-05");
  });
});

describe("what is sent", () => {
  const context = {
    personId: "0b0e7c1e-6d0a-4f7e-9d0e-0d8f1c2b3a41",
    zone: "UTC",
    today,
    placeIdOf: () => undefined,
  };

  it("leaves blank rows out and finds the way back to the rows on screen", () => {
    const values = blankInterview("2026-05-27 10:00");
    values.contacts = [blankContact(), { ...blankContact(), name: "Ada" }, blankContact()];
    values.groupExposures = [blankGroup(), { ...blankGroup(), setting: "social" }];
    const sent = toSendable(values, context);
    expect(sent.contactRows).toEqual([1]);
    expect(sent.body.heldAt).toBe("2026-05-27T10:00:00.000Z");
    expect(boxPath("contacts.0.phone", sent)).toBe("contacts.1.phone");
    expect(boxPath("contacts.0.personId", sent)).toBe("contacts.1.known");
    expect(boxPath("groupExposures.0.countMin", sent)).toBe("groupExposures.1.count");
    expect(boxPath("contacts.7.phone", sent)).toBe("contacts");
    expect(boxPath("heldAt", sent)).toBe("heldAt");
  });

  it("puts only names of facilities into an address", () => {
    expect(mayLookUp("Ropewalk", "workplace")).toBe(true);
    expect(mayLookUp("12 Gull Row", "household")).toBe(false);
    expect(mayLookUp("Ada's garden", "social")).toBe(false);
    expect(mayLookUp("12 Gull Row", "")).toBe(false);
  });
});

describe("a stored draft", () => {
  it("is read without what it should not hold, and refused when it is none", () => {
    const submitKey = "9c9e6679-7425-40de-944b-e07fc1f90ae7";
    const form = { ...blankInterview(""), contacts: [{ name: "Ada", minutes: 7, extra: true }] };
    const read = readDraft({ submitKey, form });
    expect(read?.form.contacts).toEqual([{ ...blankContact(), name: "Ada" }]);
    expect(readDraft({ form })).toBeNull();
    expect(readDraft(null)).toBeNull();
  });
});
