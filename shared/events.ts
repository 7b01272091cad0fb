/** Names of audit events; each command, and each query that returns identity fields, writes one. */
export const EVENTS = [
  "session.started",
  "session.ended",
  "session.role_changed",
  "account.first_officer_made",
  "account.joined",
  "account.password_changed",
  "account.password_reset",
  "investigation.created",
  "investigation.changed",
  "investigation.practice_reset",
  "member.invited",
  "member.invitation_withdrawn",
  "member.added",
  "member.ended",
  "person.registered",
  "person.changed",
  "person.opened",
  "people.listed",
  "people.searched",
  "people.matched",
  "place.registered",
  "places.opened",
  "test.recorded",
  "interview.drafted",
  "interview.draft_opened",
  "interview.submitted",
  "interviews.listed",
  "follow_up.listed",
  "follow_check.recorded",
  "follow_check.withdrawn",
  "follow_checks.opened",
  "match_reviews.listed",
  "import.staged",
  "import.committed",
  "access_events.read",
  "field_policy.read",
] as const;
export type EventName = (typeof EVENTS)[number];

/** Topics of the live stream; a message carries ids and versions only. */
export const TOPICS = ["graph", "people", "interviews", "imports", "members", "settings"] as const;
export type Topic = (typeof TOPICS)[number];
