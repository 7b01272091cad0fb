/** What a person, a form or a tracer may leave open: three different things, never mixed up. */
export const UNKNOWN = "unknown";
export const REFUSED = "refused";

export type Setting =
  | "household"
  | "workplace"
  | "school"
  | "health_care"
  | "social"
  | "transport"
  | "other";
export type Classification = "confirmed" | "probable" | "suspected" | "not_a_case" | "contact";
export type TestResult = "positive" | "negative" | "inconclusive" | "pending";
export type InterviewOutcome = "complete" | "partial" | "refused" | "unreachable" | "attempted";

export interface OutbreakOptions {
  seed: number;
  /** People on record to aim for (300 or more); the result lands within a few per cent. */
  people?: number;
  /** Length of the story in days (28 or more), last day included. */
  days?: number;
  /** Last local day of the story, YYYY-MM-DD. */
  lastDay: string;
  /** Minutes of local day after which nothing is recorded on the last day (default 18:00). */
  lastMinute?: number;
  /** Local time minus UTC in minutes, east positive. */
  timeZoneOffsetMinutes?: number;
  monitoringDays: number;
  infectiousBefore: number;
  infectiousAfter: number;
  incubationMin: number;
  incubationMax: number;
  /** Opaque ids of the people who interview; at least one. */
  tracers: readonly string[];
  /** Distinct contact pairs per person on record to aim for: 1.05, and 3 from 5,000 people.
   * Below 0.9 too few people are named and fewer than `people` come on record. */
  pairsPerPerson?: number;
  /** False leaves out the daily follow-up rows, by far the longest array. */
  followUpChecks?: boolean;
}

export interface District {
  id: number;
  name: string;
}

export interface Place {
  id: number;
  name: string;
  setting: Setting;
  area: string;
  recordedAt: string;
}

export interface Person {
  id: number;
  /** The reference the team writes on paper; unique. */
  ref: string;
  name: string;
  /** E.164, or "unknown", "refused", or null when not asked. */
  phone: string | null;
  email: string | null;
  /** YYYY-MM-DD, YYYY-MM, YYYY, "unknown", "refused" or null. */
  birthDate: string | null;
  sex: "female" | "male" | "other" | "unknown" | null;
  address: string | null;
  area: string;
  occupation: string | null;
  householdPlaceId: number | null;
  recordedAt: string;
  source: "form" | "interview";
  enteredBy: string;
  assignedTracer: string | null;
  isolationDate: string | null;
  outcome: null | "recovered" | "died" | "unknown";
  outcomeDate: string | null;
  /** Day and instant the case reached the team; null for people who are contacts only. */
  reportDate: string | null;
  reportedAt: string | null;
  /** YYYY-MM-DD, YYYY-MM, "unknown", "refused" or null (not asked, or never ill). */
  onsetDate: string | null;
  /** The truth about a double entry (id of the first record), for proposals and for tests. */
  duplicateOf: number | null;
  note: string | null;
}

export interface ClassificationEntry {
  personId: number;
  classification: Classification;
  recordedAt: string;
}

export interface TestEntry {
  personId: number;
  specimenDate: string;
  kind: "pcr" | "antigen";
  result: TestResult;
  resultDate: string | null;
  recordedAt: string;
}

export interface Interview {
  id: number;
  personId: number;
  /** When the conversation took place; recordedAt is when it was entered, at times days later. */
  at: string;
  recordedAt: string;
  tracer: string;
  outcome: InterviewOutcome;
  channel: "telephone" | "visit";
}

export interface Exposure {
  /** Null for a telling that came by form, outside any interview. */
  interviewId: number | null;
  personA: number;
  personB: number;
  /** Whoever told it: personA or personB. */
  namedBy: number;
  /** Both null when the teller could not say when. */
  firstDay: string | null;
  lastDay: string | null;
  setting: Setting;
  placeId: number | null;
  minutes: number | null;
  distanceM: number | null;
  physical: boolean | null;
  indoors: boolean | null;
  relation: string | null;
  recordedAt: string;
  withdrawnAt: string | null;
}

export interface GroupExposure {
  interviewId: number;
  setting: Setting;
  placeId: number | null;
  firstDay: string;
  lastDay: string;
  /** Equal when the count is exact, both null when unknown. */
  countMin: number | null;
  countMax: number | null;
  recordedAt: string;
}

export interface FollowUpCheck {
  personId: number;
  day: string;
  result: "seen" | "missed";
  symptoms: boolean;
  recordedAt: string;
}

export interface TrailPoint {
  day: string;
  /** Interviewed people known by the end of that day. */
  interviewed: number;
  /** Distinct pairs with an interviewed end, exposures in the window, known by then. */
  pairs: number;
  /** Pairs per person as seen through the interviews: (n - 1) * pairs / eligible pairs. */
  pairsPerPerson: number | null;
}

export interface GroupJoin {
  day: string;
  recordedAt: string;
  interviewId: number;
  /** Ends of the joining pair. */
  personA: number;
  personB: number;
  /** Sizes of the two groups at that moment without the joining pair. */
  sizes: [number, number];
  areas: [string, string];
}

export interface Story {
  place: string;
  illness: string;
  firstDay: string;
  lastDay: string;
  /** Declared population at risk that goes with this town. */
  populationAtRisk: number;
  casesOnRecord: number;
  join: GroupJoin | null;
  /** The workplace whose cases stopped, and the last reference date among them. */
  quiet: { placeId: number; name: string; cases: number[]; lastCaseDay: string } | null;
  /** Length in days of the window in which the trail is counted. */
  windowDays: number;
  trail: TrailPoint[];
  /** First day of the last seven on which the trail stands above 1 after standing at or below. */
  crossingDay: string | null;
  lostContacts: number[];
  becameCases: number[];
  duplicates: number[];
  lateInterviews: number[];
  reclassified: number[];
  /** True contacts that nobody named: what recall took away. */
  forgotten: number;
}

export interface Outbreak {
  districts: District[];
  places: Place[];
  people: Person[];
  classifications: ClassificationEntry[];
  tests: TestEntry[];
  interviews: Interview[];
  exposures: Exposure[];
  groupExposures: GroupExposure[];
  checks: FollowUpCheck[];
  story: Story;
}
