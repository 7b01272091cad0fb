/** What a person mark shows. A disc is a case, a ring is a contact. */
export type PersonMarkInput = {
  classification: "confirmed" | "probable" | "suspected" | "not_a_case" | "contact";
  /** A case that was a contact under follow-up before: disc inside a ring. */
  wasContact?: boolean;
  /** Follow-up of a contact; `share` is days done of days due, 0 … 1. */
  followUp?: { share: number; state: "active" | "completed" | "lost" | "ended" };
  /**
   * Place of the group in the colour set (0 = first); "rest" or a place past the set is grey;
   * undefined draws in ink, where groups are not the question.
   */
  group?: number | "rest";
  /** Name of the group for the text alternative: "group 7". */
  groupLabel?: string;
};
