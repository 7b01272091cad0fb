/** Coded values of the trade, used by forms, files, tables and the database's own checks. */
export const CLASSIFICATIONS = [
  "confirmed",
  "probable",
  "suspected",
  "not_a_case",
  "contact",
] as const;
export type Classification = (typeof CLASSIFICATIONS)[number];

/** Classifications that count as a case (any certainty). */
export const CASE_CLASSIFICATIONS = ["confirmed", "probable", "suspected"] as const;

/** True when a classification is one of a case. */
export function isCase(classification: string | null): boolean {
  return (CASE_CLASSIFICATIONS as readonly (string | null)[]).includes(classification);
}

export const SETTINGS = [
  "household",
  "workplace",
  "school",
  "health_care",
  "social",
  "transport",
  "other",
] as const;
export type Setting = (typeof SETTINGS)[number];

export const SEXES = ["female", "male", "other", "unknown"] as const;
export const TEST_RESULTS = ["positive", "negative", "inconclusive", "pending"] as const;
export const OUTCOMES = ["recovered", "died", "unknown"] as const;

/** States an interview attempt can end in (methods A.3); "not started" is the absence of a row. */
export const INTERVIEW_OUTCOMES = [
  "attempted",
  "partial",
  "complete",
  "refused",
  "unreachable",
  "died",
  "not_able",
] as const;
export type InterviewOutcome = (typeof INTERVIEW_OUTCOMES)[number];

/** How a contact was reached on a day, best first; the best of a day counts. */
export const CHECK_OUTCOMES = ["seen", "spoken", "message", "not_reached"] as const;
export type CheckOutcome = (typeof CHECK_OUTCOMES)[number];

/** Why a follow-up was ended by somebody's word (methods A.3); the last: entered in error. */
export const FOLLOW_ENDS = ["refused", "moved", "died", "not_a_contact"] as const;
export type FollowEnd = (typeof FOLLOW_ENDS)[number];

/**
 * States of a contact's follow-up (methods A.3). The first four follow from the checks, the fifth
 * from the classification, the others from a recorded end (the last also from a classification).
 */
export const FOLLOW_STATES = [
  "to_be_notified",
  "under_follow_up",
  "completed",
  "lost",
  "became_case",
  ...FOLLOW_ENDS,
] as const;
export type FollowState = (typeof FOLLOW_STATES)[number];

/** Who answered when a contact was asked. */
export const RESPONDENTS = [
  "self",
  "parent_or_guardian",
  "relative",
  "carer",
  "facility_staff",
] as const;

/** Symptoms that can be ticked beside a check. */
export const SYMPTOMS = [
  "fever",
  "rash",
  "cough",
  "sore_throat",
  "breathlessness",
  "headache",
  "muscle_pain",
  "tiredness",
  "vomiting",
  "diarrhoea",
  "bleeding",
  "other",
] as const;
export type Symptom = (typeof SYMPTOMS)[number];

export const CHANNELS = ["telephone", "visit", "other"] as const;
/** Words that stand for a value that was asked for and not got; blank (null) means not asked. */
export const MISSING = ["unknown", "refused"] as const;
export type Missing = (typeof MISSING)[number];

export const AGE_BANDS = ["0-4", "5-14", "15-24", "25-44", "45-64", "65-79", "80+"] as const;
export type AgeBand = (typeof AGE_BANDS)[number];

/** Age band on a day, from a birth date or year-month; null when the year is not known. */
export function ageBandOf(birth: string | null, onDay: string): AgeBand | null {
  if (!birth || !/^\d{4}/.test(birth)) return null;
  let age = Number(onDay.slice(0, 4)) - Number(birth.slice(0, 4));
  if (birth.length >= 7 && onDay.slice(5, birth.length) < birth.slice(5)) age -= 1;
  if (age < 0) return null;
  if (age < 5) return "0-4";
  if (age < 15) return "5-14";
  if (age < 25) return "15-24";
  if (age < 45) return "25-44";
  if (age < 65) return "45-64";
  return age < 80 ? "65-79" : "80+";
}
