import type { ExposureGrading } from "./contracts/settings.ts";

/** How strongly a contact was exposed (methods A.1: high-risk, low-risk contact). */
export const EXPOSURE_GRADES = ["high", "unknown", "low"] as const;
export type ExposureGrade = (typeof EXPOSURE_GRADES)[number];

/** Why an exposure has its grade; `*_not_known` names what would have to be asked. */
export type GradeReason =
  | "physical"
  | "setting"
  | "long_and_near"
  | "short"
  | "far"
  | "minutes_not_known"
  | "distance_not_known"
  | "minutes_and_distance_not_known";

/** What one telling says of an exposure. `null` is not known, whether asked or not. */
export interface ExposureFacts {
  setting: string | null;
  /** `yes`, `no`, `unknown`, `refused` or null. */
  physical: string | null;
  minutes: number | null;
  /** Metres. */
  distanceM: number | null;
}

export interface GradedExposure {
  grade: ExposureGrade;
  reason: GradeReason;
}

/**
 * Grade of one exposure under an investigation's settings. High for physical contact or a setting
 * where that is asked for, and for an exposure that was both long and near enough; low as soon as
 * it is known to have been too short or too far; unknown where what is missing would decide.
 * Cut-offs differ between bodies and are settings. Source: methods A.1, A.3 (3), F.1.
 */
export function gradeExposure(facts: ExposureFacts, grading: ExposureGrading): GradedExposure {
  if (grading.physicalIsHigh && facts.physical === "yes") {
    return { grade: "high", reason: "physical" };
  }
  if ((grading.highSettings as readonly (string | null)[]).includes(facts.setting)) {
    return { grade: "high", reason: "setting" };
  }
  const { minutes, distanceM } = facts;
  if (minutes !== null && minutes < grading.highMinutes) return { grade: "low", reason: "short" };
  if (distanceM !== null && distanceM > grading.highDistanceM) {
    return { grade: "low", reason: "far" };
  }
  if (minutes !== null && distanceM !== null) return { grade: "high", reason: "long_and_near" };
  if (minutes !== null) return { grade: "unknown", reason: "distance_not_known" };
  if (distanceM !== null) return { grade: "unknown", reason: "minutes_not_known" };
  return { grade: "unknown", reason: "minutes_and_distance_not_known" };
}

/**
 * Grade of a contact pair: that of its gravest telling, high before unknown before low, since
 * nothing that another telling leaves open may be read as low. Null without a telling.
 */
export function gradePair(
  tellings: readonly ExposureFacts[],
  grading: ExposureGrading,
): GradedExposure | null {
  let gravest: GradedExposure | null = null;
  const rank = (one: GradedExposure) => EXPOSURE_GRADES.indexOf(one.grade);
  for (const telling of tellings) {
    const graded = gradeExposure(telling, grading);
    if (gravest === null || rank(graded) < rank(gravest)) gravest = graded;
  }
  return gravest;
}
