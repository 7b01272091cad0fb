import {
  CHANNELS,
  INTERVIEW_OUTCOMES,
  type InterviewOutcome,
  SETTINGS,
  type Setting,
} from "../../../../shared/vocabulary.ts";

/** One choice of a list as the form shows it. */
export interface Choice {
  value: string;
  label: string;
}

const settingWords: Record<Setting, string> = {
  household: "household",
  workplace: "workplace",
  school: "school",
  health_care: "health care",
  social: "social",
  transport: "transport",
  other: "other",
};

const noAnswers: readonly Choice[] = [
  { value: "unknown", label: "unknown" },
  { value: "refused", label: "refused" },
];

export const settingChoices: readonly Choice[] = [
  ...SETTINGS.map((value) => ({ value, label: settingWords[value] })),
  ...noAnswers,
];

export const yesNoChoices: readonly Choice[] = [
  { value: "yes", label: "yes" },
  { value: "no", label: "no" },
  ...noAnswers,
];

/** Words of a stored setting; blank is said to be blank. */
export function settingWord(value: string): string {
  if (value === "") return "setting not asked";
  return value in settingWords ? settingWords[value as Setting] : `setting ${value}`;
}

const outcomeWords: Record<InterviewOutcome, string> = {
  attempted: "attempted – tried, not reached this time",
  partial: "partial – begun, to be taken up again",
  complete: "complete",
  refused: "refused – does not want to take part",
  unreachable: "unreachable – no further attempts for now",
  died: "died",
  not_able: "not able – too ill, or no interpreter",
};

export const outcomeChoices: readonly Choice[] = INTERVIEW_OUTCOMES.map((value) => ({
  value,
  label: outcomeWords[value],
}));

export const channelChoices: readonly Choice[] = CHANNELS.map((value) => ({
  value,
  label: value,
}));

/** "1 contact", "12 contacts". */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}
