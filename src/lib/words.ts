import type { DayZeroGap } from "../../shared/contracts/follow-up.ts";
import type {
  CheckOutcome,
  Classification,
  FollowEnd,
  FollowState,
  InterviewOutcome,
  Setting,
} from "../../shared/vocabulary.ts";

/** Stored words as they are shown. Coded values are kept in English and lower case. */
export const classificationWords: Readonly<Record<Classification, string>> = {
  confirmed: "confirmed case",
  probable: "probable case",
  suspected: "suspected case",
  not_a_case: "not a case",
  contact: "contact",
};

export const settingWords: Readonly<Record<Setting, string>> = {
  household: "household",
  workplace: "workplace",
  school: "school",
  health_care: "health care",
  social: "social",
  transport: "transport",
  other: "other",
};

export const interviewWords: Readonly<Record<InterviewOutcome, string>> = {
  attempted: "attempted",
  partial: "partial",
  complete: "complete",
  refused: "refused",
  unreachable: "unreachable",
  died: "died",
  not_able: "not able",
};

export const followStateWords: Readonly<Record<FollowState, string>> = {
  to_be_notified: "to be notified",
  under_follow_up: "under follow-up",
  completed: "completed",
  lost: "lost to follow-up",
  became_case: "became a case",
  refused: "refused",
  moved: "moved away",
  died: "died",
  not_a_contact: "not a contact",
};

export const endWords: Readonly<Record<FollowEnd, string>> = {
  refused: "refused",
  moved: "moved away",
  died: "died",
  not_a_contact: "not a contact, entered in error",
};

export const gapWords: Readonly<Record<DayZeroGap, string>> = {
  no_exposure: "no exposure to a case on record",
  month_only: "last exposure known to the month only",
  not_known: "no whole last exposure day on record",
};

export const checkWords: Readonly<Record<CheckOutcome, string>> = {
  seen: "seen",
  spoken: "spoken to",
  message: "message left",
  not_reached: "not reached",
};

/** The word for a stored code; the code itself with its underscores opened where none is kept. */
export function wordFor(words: Readonly<Record<string, string>>, code: string): string {
  return words[code] ?? code.replaceAll("_", " ");
}
