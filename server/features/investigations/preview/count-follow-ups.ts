import { sql } from "drizzle-orm";
import { followState } from "../../../../shared/follow-state.ts";
import type { CheckOutcome, Classification } from "../../../../shared/vocabulary.ts";
import { addDays } from "../../../../shared/windows.ts";
import type { Tx } from "../../../db/with-tx.ts";
import type { SettingsRow } from "../settings-store.ts";

/** Contacts of whom everything that states follow from is the same, and how many they are. */
export interface AlikeContacts {
  classification: Classification | null;
  dayZero: string;
  /** First day on which the absence of a check counts as missed. */
  expectedFrom: string;
  /** A symptom report that no later day has taken back. */
  symptomatic: boolean;
  checks: { day: string; outcome: CheckOutcome }[];
  count: number;
}

interface Row extends Omit<AlikeContacts, "checks"> {
  /** Each check as its day and the first letter of its outcome, by day. */
  checks: string | null;
}

const OUTCOME_OF: Record<string, CheckOutcome> = {
  s: "seen",
  p: "spoken",
  m: "message",
  n: "not_reached",
};

/**
 * Contacts with a day 0, grouped in the database by what their state is derived from: many have the
 * same, so that a hundred thousand become some thousands.
 */
export async function loadContacts(tx: Tx, settings: SettingsRow): Promise<AlikeContacts[]> {
  const found = await tx.execute<{ rows: Row[] | null }>(
    sql`with days as materialized (
          select d.person_id, d.day_zero from core.follow_up_days(null) d
          where d.day_zero is not null),
        sick as materialized (
          select distinct y.person_id from core.follow_check y
          where y.investigation_id = ${settings.id} and y.symptoms = 'yes'
            and y.withdrawn_at is null and not exists (
              select 1 from core.follow_check n where n.person_id = y.person_id
                and n.day > y.day and n.symptoms = 'no' and n.withdrawn_at is null)),
        checked as materialized (
          select k.person_id, string_agg(k.day || case k.outcome when 'seen' then 's'
              when 'spoken' then 'p' when 'message' then 'm' else 'n' end, ' ' order by k.day) as all
          from core.follow_check k
          where k.investigation_id = ${settings.id} and k.withdrawn_at is null
          group by k.person_id),
        alike as (
          select p.classification, d.day_zero, k.all, s.person_id is not null as symptomatic,
            (p.recorded_at at time zone ${settings.timeZone})::date + 1 as expected_from,
            count(*)::int as count
          from days d join core.person p on p.id = d.person_id
          left join sick s on s.person_id = d.person_id
          left join checked k on k.person_id = d.person_id
          group by 1, 2, 3, 4, 5)
        select json_agg(json_build_object('classification', classification, 'dayZero', day_zero,
          'expectedFrom', expected_from::text, 'symptomatic', symptomatic, 'checks', "all",
          'count', count)) as rows
        from alike`,
  );
  return (found.rows[0]?.rows ?? []).map((row) => ({
    ...row,
    checks: (row.checks ?? "").split(" ").flatMap((word) => {
      const outcome = OUTCOME_OF[word.slice(10)];
      return outcome ? [{ day: word.slice(0, 10), outcome }] : [];
    }),
  }));
}

/** What the round of a day looks like under some settings. */
export interface FollowCounts {
  /** Contacts whom the round of today lists as due. */
  due: number;
  /** Contacts whose last due day is over. */
  ended: number;
  lost: number;
}

/**
 * Counts contacts as the round lists them: due on days 1 … M, or symptomatic on whichever day;
 * ended after day M; lost by their state.
 *
 * @param today local day in the investigation's zone
 */
export function countFollowUps(
  contacts: readonly AlikeContacts[],
  settings: Pick<SettingsRow, "monitoringDays" | "lostAfterDays">,
  today: string,
): FollowCounts {
  const { monitoringDays, lostAfterDays } = settings;
  const [first, last] = [addDays(today, -monitoringDays), addDays(today, -1)];
  const counts: FollowCounts = { due: 0, ended: 0, lost: 0 };
  for (const { count, ...contact } of contacts) {
    const { classification, dayZero } = contact;
    const current = classification === null || classification === "contact";
    if (current && (contact.symptomatic || (dayZero >= first && dayZero <= last))) {
      counts.due += count;
    }
    if (dayZero < first) counts.ended += count;
    const state = followState({ ...contact, monitoringDays, lostAfterDays, today });
    if (state === "lost") counts.lost += count;
  }
  return counts;
}
