import type { Draft, Interview } from "../../../shared/contracts/interviews.ts";
import type { StoredDraft } from "./drafts.ts";
import type { InterviewRow } from "./queries.ts";

/** An interview in a list; nothing in it says who was interviewed. */
export function presentInterview(row: InterviewRow): Interview {
  return {
    id: row.id,
    personId: row.personId,
    studyNumber: row.studyNumber,
    outcome: row.outcome,
    channel: row.channel,
    day: row.day,
    heldAt: row.heldAt,
    recordedAt: row.recordedAt,
    contacts: row.contacts,
    groupExposures: row.groupExposures,
  };
}

/** A draft, or version 0 with no body where there is none. */
export function presentDraft(draft: StoredDraft | null): Draft {
  return draft ?? { version: 0, body: null, updatedAt: null };
}
