import type { PersonMarkInput } from "../person-mark/person-mark-input.ts";

type RowBase = {
  id: string;
  /** Words at the start of the row. */
  label: string;
  /** Person mark after the label. */
  mark?: PersonMarkInput;
};

/** A window of days: dotted for the source window, washed for the infectious one. */
export type WindowRow = RowBase & {
  type: "window";
  window: "source" | "infectious";
  /** Null when the window is not known; then `unknown` says why. */
  from: string | null;
  to: string | null;
  /** Day of the disc, with its word ("onset", "first positive test"). */
  reference?: { day: string; label: string };
  unknown?: string;
};

/** Exposures of one contact pair as bars; a household is drawn stronger than the rest. */
export type ExposureRow = RowBase & {
  type: "exposure";
  bars: readonly {
    from: string;
    to: string;
    setting: string;
    household?: boolean;
    /** Dates known to the month only: dashed outline. */
    partial?: boolean;
  }[];
};

/** An exposure of people who could not be named. */
export type GroupRow = RowBase & {
  type: "group";
  from: string;
  to: string;
  /** "12", "12 ±3", "10–15", "unknown number". */
  count: string;
};

export type DueState = "seen" | "message" | "missed" | "due" | "to_come" | "no_check";

/**
 * Follow-up days of one contact. `message` is a day on which word was left and nothing heard; `due`
 * is today's, not seen yet; `no_check` is a past day of which
 * nothing was recorded here, which says neither that the contact was seen nor that they were missed.
 */
export type DueRow = RowBase & {
  type: "due";
  days: readonly { day: string; state: DueState }[];
};

/** Onsets by day: of a cluster, or of all cases (the epi curve). */
export type OnsetRow = RowBase & {
  type: "onsets";
  counts: readonly { day: string; count: number }[];
  /** Days from here on are not complete yet and are drawn hollow. */
  incompleteFrom?: string;
  joins?: readonly { day: string; label: string }[];
};

/** Every kind of row of a day strip. */
export type DayStripRow = WindowRow | ExposureRow | GroupRow | DueRow | OnsetRow;

/** Words for the states of a due day. */
export const dueWords: Readonly<Record<DueState, string>> = {
  seen: "seen",
  message: "message left",
  missed: "missed",
  due: "due today",
  to_come: "to come",
  no_check: "no check recorded here",
};
