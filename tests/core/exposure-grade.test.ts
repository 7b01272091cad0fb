import { describe, expect, it } from "vitest";
import { classByRules } from "../../shared/class-by-rules.ts";
import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  type ExposureGrading,
} from "../../shared/contracts/settings.ts";
import { type ExposureFacts, gradeExposure, gradePair } from "../../shared/exposure-grade.ts";

const facts = (more: Partial<ExposureFacts> = {}): ExposureFacts => ({
  setting: "social",
  physical: "no",
  minutes: 5,
  distanceM: 5,
  ...more,
});

// Cut-offs by common practice: 15 minutes and 2 metres (methods F.1 names both).
describe("the grade of an exposure", () => {
  it.each([
    ["touch", { physical: "yes" }, "high", "physical"],
    ["a household, whatever else", { setting: "household" }, "high", "setting"],
    ["long and near", { minutes: 15, distanceM: 2 }, "high", "long_and_near"],
    ["a minute too short", { minutes: 14, distanceM: 0.5 }, "low", "short"],
    ["too far", { minutes: 600, distanceM: 2.1 }, "low", "far"],
    ["short, distance not asked", { minutes: 1, distanceM: null }, "low", "short"],
    ["far, minutes not asked", { minutes: null, distanceM: 9 }, "low", "far"],
    ["long, distance missing", { minutes: 60, distanceM: null }, "unknown", "distance_not_known"],
    ["near, minutes missing", { minutes: null, distanceM: 1 }, "unknown", "minutes_not_known"],
    [
      "neither",
      { minutes: null, distanceM: null, setting: null },
      "unknown",
      "minutes_and_distance_not_known",
    ],
    ["touch unknown does not decide", { physical: "unknown" }, "low", "short"],
  ] as const)("%s", (_title, more, grade, reason) => {
    expect(gradeExposure(facts(more), DEFAULT_EXPOSURE_GRADING)).toEqual({ grade, reason });
  });

  it("follows the settings", () => {
    const strict: ExposureGrading = {
      physicalIsHigh: false,
      highSettings: ["school"],
      highMinutes: 5,
      highDistanceM: 10,
    };
    expect(gradeExposure(facts({ physical: "yes", minutes: 4 }), strict).grade).toBe("low");
    expect(gradeExposure(facts({ setting: "household", minutes: 4 }), strict).grade).toBe("low");
    expect(gradeExposure(facts({ setting: "school", minutes: null }), strict).grade).toBe("high");
    expect(gradeExposure(facts(), strict)).toEqual({ grade: "high", reason: "long_and_near" });
  });

  it("of a pair is that of its gravest telling, high before unknown before low", () => {
    const low = facts();
    const unknown = facts({ minutes: null, distanceM: null });
    const high = facts({ physical: "yes" });
    expect(gradePair([], DEFAULT_EXPOSURE_GRADING)).toBeNull();
    expect(gradePair([low], DEFAULT_EXPOSURE_GRADING)?.grade).toBe("low");
    expect(gradePair([low, unknown], DEFAULT_EXPOSURE_GRADING)?.grade).toBe("unknown");
    expect(gradePair([low, high, unknown], DEFAULT_EXPOSURE_GRADING)).toEqual({
      grade: "high",
      reason: "physical",
    });
  });
});

// Usual pattern of case definitions: methods A.1.
describe("the class by the rules of a case definition", () => {
  const by = (laboratory: boolean, clinical: boolean, link: boolean, rules = DEFAULT_CASE_RULES) =>
    classByRules({ laboratory, clinical, link }, rules);

  it("is the first whose criteria are all on record", () => {
    expect(by(true, false, false)).toBe("confirmed");
    expect(by(true, true, true)).toBe("confirmed");
    expect(by(false, true, true)).toBe("probable");
    expect(by(false, true, false)).toBe("suspected");
    expect(by(false, false, true)).toBeNull();
    expect(by(false, false, false)).toBeNull();
  });

  it("is never one that asks for nothing", () => {
    const rules = {
      ...DEFAULT_CASE_RULES,
      confirmed: { laboratory: false, clinical: false, link: false },
    };
    expect(by(true, false, false, rules)).toBeNull();
    expect(by(true, true, false, rules)).toBe("suspected");
  });
});
