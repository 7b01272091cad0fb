/** A person on record that a row is tied to; enough to recognise them, nothing more. */
export interface KnownPerson {
  personId: string;
  studyNumber: string;
  name: string | null;
  ageBand: string | null;
  area: string | null;
}

/** What the boxes of one contact hold: text as typed, "" = not asked. */
export interface ContactValues {
  known: KnownPerson | null;
  name: string;
  phone: string;
  setting: string;
  place: string;
  firstExposure: string;
  lastExposure: string;
  minutes: string;
  distanceM: string;
  physical: string;
  indoors: string;
  relation: string;
}

/** What the boxes of people who cannot be named hold; `count` is "12", "10-15", "12 ±3" or "". */
export interface GroupValues {
  setting: string;
  place: string;
  firstExposure: string;
  lastExposure: string;
  count: string;
}

/** What the whole form holds. */
export interface InterviewValues {
  outcome: string;
  channel: string;
  /** Local wall time in the investigation's zone, "YYYY-MM-DD HH:MM". */
  heldAt: string;
  contacts: ContactValues[];
  groupExposures: GroupValues[];
}

export const contactTextKeys = [
  "name",
  "phone",
  "setting",
  "place",
  "firstExposure",
  "lastExposure",
  "minutes",
  "distanceM",
  "physical",
  "indoors",
  "relation",
] as const;
export type ContactTextKey = (typeof contactTextKeys)[number];

export const groupKeys = ["setting", "place", "firstExposure", "lastExposure", "count"] as const;
export type GroupKey = (typeof groupKeys)[number];

/** What "same as above" carries over: where and when, never who. */
export const carriedKeys = ["setting", "place", "firstExposure", "lastExposure"] as const;

/** An empty contact row. */
export function blankContact(): ContactValues {
  const texts = Object.fromEntries(contactTextKeys.map((key) => [key, ""]));
  return { known: null, ...(texts as Record<ContactTextKey, string>) };
}

/** An empty group row. */
export function blankGroup(): GroupValues {
  return { setting: "", place: "", firstExposure: "", lastExposure: "", count: "" };
}

/** True when nothing is typed in a contact row. */
export function isBlankContact(row: ContactValues): boolean {
  return row.known === null && contactTextKeys.every((key) => row[key].trim() === "");
}

/** True when nothing is typed in a group row. */
export function isBlankGroup(row: GroupValues): boolean {
  return groupKeys.every((key) => row[key].trim() === "");
}

/** The form as it opens for the first time. */
export function blankInterview(heldAt: string): InterviewValues {
  return { outcome: "", channel: "", heldAt, contacts: [blankContact()], groupExposures: [] };
}
