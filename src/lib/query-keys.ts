/** First word of every query key inside an investigation; live topics are mapped onto these. */
export type QueryWord =
  | "investigation"
  | "settings"
  | "members"
  | "invitations"
  | "teams"
  | "people"
  | "saved-filters"
  | "tests"
  | "places"
  | "match-reviews"
  | "interviews"
  | "follow-up"
  | "imports"
  | "exports"
  | "compare"
  | "groups"
  | "network"
  | "clusters"
  | "field-policy"
  | "access-events";

/** Key of a query: `["i", investigation, word, …]`. */
export function investigationKey(investigationId: string, word: QueryWord, ...rest: unknown[]) {
  return ["i", investigationId, word, ...rest] as const;
}
