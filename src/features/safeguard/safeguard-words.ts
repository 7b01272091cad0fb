import type { EventName } from "../../../shared/events.ts";
import { ROLE_NAMES, type Role } from "../../../shared/roles.ts";

/** What an event says was done, as the record shows it. */
export const actionWords: Readonly<Record<EventName, string>> = {
  "session.started": "signed in",
  "session.ended": "signed out",
  "session.role_changed": "changed the acting role",
  "account.joined": "took up an invitation",
  "account.password_changed": "changed the password",
  "account.password_reset": "chose a new password by mail",
  "account.first_officer_made": "made the first data officer",
  "investigation.created": "opened the investigation",
  "investigation.changed": "changed settings",
  "investigation.practice_reset": "emptied and refilled the practice investigation",
  "member.invited": "invited a member",
  "member.invitation_withdrawn": "withdrew an invitation",
  "member.added": "added a member",
  "member.changed": "changed a membership",
  "member.ended": "ended a membership",
  "team.made": "made a team",
  "team.renamed": "renamed a team",
  "team.removed": "removed a team",
  "person.registered": "registered a person",
  "person.changed": "changed a person",
  "person.opened": "opened a person",
  "people.listed": "read the line list",
  "people.searched": "searched people",
  "people.matched": "was offered matches",
  "people.assigned": "several people assigned",
  "place.registered": "recorded a place",
  "places.opened": "read household names",
  "test.recorded": "recorded a test",
  "interview.drafted": "saved a draft",
  "interview.draft_opened": "opened a draft",
  "interview.submitted": "submitted an interview",
  "interviews.listed": "read the interviews",
  "follow_up.listed": "read the follow-up list",
  "follow_check.recorded": "recorded a check",
  "follow_check.withdrawn": "took back a check",
  "follow_up.ended": "ended a follow-up",
  "follow_up.reopened": "reopened a follow-up",
  "follow_checks.opened": "read the notes of checks",
  "match_reviews.listed": "read possible matches",
  "import.staged": "checked a file",
  "import.committed": "took a file in",
  "import.matches_listed": "read doubtful rows of a file",
  "import.matches_decided": "decided doubtful rows of a file",
  "export.requested": "asked for an export",
  "export.opened": "opened people for an export",
  "export.made": "made an export",
  "export.downloaded": "downloaded an export",
  "export.deleted": "deleted an export",
  "compare.requested": "comparison asked for",
  "compare.renamed": "comparison renamed",
  "compare.cancelled": "comparison stopped",
  "compare.deleted": "comparison deleted",
  "compare.downloaded": "comparison downloaded",
  "access_events.read": "read this record",
  "field_policy.read": "read the field policy",
};

/** Words for an action; the code itself where an older event has none. */
export function actionWord(action: string): string {
  return (actionWords as Record<string, string>)[action] ?? action;
}

/** Name of a role as a stored word, for roles of events and members. */
export function roleWord(role: string | null): string {
  return role === null ? "no role" : (ROLE_NAMES[role as Role] ?? role);
}

/** How much of a field a role gets, with what that means. `direct` and `absent` are faults. */
export const accessWords: Readonly<Record<string, string>> = {
  full: "the whole value; identity only through an opening that goes on record",
  masked: "initials, the last two digits, the first letter of an address",
  coarse: "the year instead of the day",
  none: "nothing; the database refuses",
};

/** Classes of fields in the order of the policy table. */
export const CLASS_ORDER = ["unlisted", "direct", "quasi", "health", "operational"] as const;
export type FieldClassName = (typeof CLASS_ORDER)[number];

export const classWords: Readonly<Record<FieldClassName, { title: string; says: string }>> = {
  unlisted: { title: "Not in the registry", says: "Columns nobody has decided on." },
  direct: { title: "Says who somebody is", says: "Kept encrypted, apart from everything else." },
  quasi: { title: "Narrows somebody down", says: "Several together may name a person." },
  health: { title: "Says something about health", says: "Dates, results and classifications." },
  operational: { title: "Runs the house", says: "Ids, versions, times, who recorded what." },
};
