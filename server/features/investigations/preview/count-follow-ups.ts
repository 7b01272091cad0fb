import { sql } from "drizzle-orm";
import { followState } from "../../../../shared/follow-state.ts";
import type { CheckOutcome, Classification } from "../../../../shared/vocabulary.ts";
import { addDays } from "../../../../shared/windows.ts";
import type { Tx } from "../../../db/with-tx.ts";
import type { SettingsRow } from "../settings-store.ts";

/** Contacts of whom everything that states follow from is the same, and how many they are. */
export interface AlikeContacts {
  classification: Classification | null;
  /** Null: not known to the day; such a contact is listed while symptomatic, and once ended. */
  dayZero: string | null;
  /** Still followed: neither a case, nor found to be none, nor ended otherwise. */
  open: boolean;
  /** First day on which the absence of a check counts as missed. */
  expectedFrom: string;
  /** A symptom report that no later day has taken back. */
  symptomatic: boolean;
  checks: { day: string; outcome: CheckOutcome }[];
  count: number;
}

interface Row extends Omit<AlikeContacts, "checks"> {
  /** Last day on which the contact was seen or spoken to. */
  seen: string | null;
  /** Last due day on which they were reached in any way, by the shorter and the longer monitoring. */
  reachedShort: string | null;
  reachedLong: string | null;
  /** Days without success that count although a gap there would not: today, and before entry. */
  missed: string | null;
}

/** The checks that a state can depend on; all others leave it as it is. */
function decisiveChecks(row: Row): AlikeContacts["checks"] {
  const missed = row.missed === null ? [] : row.missed.split(" ");
  return [
    ...(row.seen ? [{ day: row.seen, outcome: "seen" as const }] : []),
    ...[row.reachedShort, row.reachedLong].flatMap((day) =>
      day ? [{ day, outcome: "message" as const }] : [],
    ),
    ...missed.map((day) => ({ day, outcome: "not_reached" as const })),
  ];
}

/**
 * Contacts with a day 0, grouped in the database by what their state is derived from: many have the
 * same, so that a hundred thousand become some thousands. Of more than a million checks only those
 * come along that the state can depend on (`followState`): the last day seen, the last due day
 * reached in any way, and unsuccessful days that are no gap. A gap and a day without success count
 * alike on the days between entry and today.
 *
 * @param today local day in the investigation's zone
 * @param monitoring the numbers of monitoring days to be counted with, the lower one first
 */
export async function loadContacts(
  tx: Tx,
  settings: SettingsRow,
  today: string,
  [short, long]: readonly [number, number],
): Promise<AlikeContacts[]> {
  // Once for each contact, not for each of their checks.
  const lastDue = (days: number) => sql`(d.day_zero::date + ${days}::int)::text collate "C"`;
  const reached = sql`k.outcome <> 'not_reached' and k.day <= ${today}`;
  const found = await tx.execute<{ rows: Row[] | null }>(
    sql`with listed as materialized (
          select p.id, p.classification, d.day_zero, d.open, d.symptomatic,
            greatest((p.recorded_at at time zone ${settings.timeZone})::date + 1,
              r.reopened)::text collate "C" as expected_from,
            ${lastDue(short)} as last_short, ${lastDue(long)} as last_long
          from core.follow_up d join core.person p on p.id = d.person_id
          left join (
            select e.person_id, max((e.withdrawn_at at time zone ${settings.timeZone})::date)
              as reopened
            from core.follow_end e where e.investigation_id = ${settings.id} group by 1) r
            on r.person_id = p.id
          where d.investigation_id = ${settings.id}
            and (d.day_zero is not null or not d.open or d.symptomatic)),
        checked as materialized (
          select k.person_id,
            max(k.day collate "C") filter (where k.outcome in ('seen', 'spoken')) as seen,
            max(k.day collate "C") filter (where ${reached} and k.day <= l.last_short) as short,
            max(k.day collate "C") filter (where ${reached} and k.day <= l.last_long) as long,
            string_agg(k.day, ' ') filter (where k.outcome = 'not_reached'
              and (k.day = ${today} or k.day < l.expected_from)) as missed
          from core.follow_check k join listed l on l.id = k.person_id
          where k.investigation_id = ${settings.id} and k.withdrawn_at is null
            and l.open
          group by k.person_id),
        alike as (
          select l.classification, l.day_zero, l.expected_from, k.seen, k.short, k.long, k.missed,
            l.symptomatic, l.open, count(*)::int as count
          from listed l left join checked k on k.person_id = l.id
          group by 1, 2, 3, 4, 5, 6, 7, 8, 9)
        select json_agg(json_build_object('classification', classification, 'dayZero', day_zero,
          'expectedFrom', expected_from, 'symptomatic', symptomatic, 'open', open, 'seen', seen,
          'reachedShort', short, 'reachedLong', long, 'missed', missed, 'count', count)) as rows
        from alike`,
  );
  return (found.rows[0]?.rows ?? []).map((row) => ({ ...row, checks: decisiveChecks(row) }));
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
 * ended after day M or otherwise; lost by their state.
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
    const { dayZero, open } = contact;
    if (contact.open && (contact.symptomatic || (dayZero && dayZero >= first && dayZero <= last))) {
      counts.due += count;
    }
    if ((dayZero && dayZero < first) || !open) counts.ended += count;
    if (!open) continue;
    const rules = { monitoringDays, lostAfterDays, today };
    if (followState({ ...contact, ...rules, ended: null }) === "lost") counts.lost += count;
  }
  return counts;
}
