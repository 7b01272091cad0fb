import type { CheckOutcome } from "../../../../shared/vocabulary.ts";
import type { CheckBody } from "../api/record-check.ts";

/** What may be noted beside an outcome; "" is "not asked". */
export interface CheckDetails {
  day: string;
  symptoms: string;
  symptomCodes: readonly string[];
  respondent: string;
  note: string;
}

export function noDetails(today: string): CheckDetails {
  return { day: today, symptoms: "", symptomCodes: [], respondent: "", note: "" };
}

/** What is sent: only what was answered, and the day only where it is not today. */
export function checkBody(
  outcome: CheckOutcome,
  details: CheckDetails | null,
  today: string,
): CheckBody {
  if (!details) return { outcome };
  const { day, symptoms, symptomCodes, respondent, note } = details;
  return {
    outcome,
    ...(day !== "" && day !== today ? { day } : {}),
    ...(symptoms === "" ? {} : { symptoms }),
    ...(symptoms === "yes" && symptomCodes.length > 0 ? { symptomCodes: [...symptomCodes] } : {}),
    ...(respondent === "" ? {} : { respondent }),
    ...(note.trim() === "" ? {} : { note }),
  };
}
