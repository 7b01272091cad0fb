import { sql } from "drizzle-orm";
import type { DayZeroGap, StandingEnd } from "../../../shared/contracts/follow-up.ts";
import type { CheckOutcome } from "../../../shared/vocabulary.ts";
import { dayIn } from "../../clock.ts";
import type { Tx } from "../../db/with-tx.ts";

/** A check as states are derived from it. */
export interface CheckRow {
  personId: string;
  day: string;
  outcome: CheckOutcome;
  symptoms: "yes" | "no" | "unknown" | "refused" | null;
  recordedAt: string;
}

const idList = (ids: readonly string[]) => sql`${sql.param(`{${ids.join(",")}}`)}::uuid[]`;

/** Checks by person, oldest first, as far as row security shows them. */
export async function checksOf(
  tx: Tx,
  personIds: readonly string[],
): Promise<Map<string, CheckRow[]>> {
  const checks = new Map<string, CheckRow[]>(personIds.map((id) => [id, []]));
  if (personIds.length === 0) return checks;
  const found = await tx.execute<CheckRow & Record<string, unknown>>(
    sql`select person_id as "personId", day, outcome, symptoms, recorded_at as "recordedAt"
        from core.follow_check
        where person_id = any (${idList(personIds)}) and withdrawn_at is null
        order by day, recorded_at, id`,
  );
  for (const row of found.rows) checks.get(row.personId)?.push(row);
  return checks;
}

/** What was said of the end of somebody's follow-up. */
export interface EndState {
  /** The end that stands, or null. */
  standing: StandingEnd | null;
  /** Local day on which an end was last taken back, or null. */
  reopenedOn: string | null;
}

/** Recorded ends by person, as far as row security shows them; people without any are absent. */
export async function endsOf(
  tx: Tx,
  personIds: readonly string[],
  timeZone: string,
): Promise<Map<string, EndState>> {
  const ends = new Map<string, EndState>();
  if (personIds.length === 0) return ends;
  const found = await tx.execute<StandingEnd & { personId: string; takenBackAt: string | null }>(
    sql`select id, person_id as "personId", reason, day, withdrawn_at as "takenBackAt"
        from core.follow_end where person_id = any (${idList(personIds)})
        order by recorded_at, id`,
  );
  for (const { personId, takenBackAt, ...end } of found.rows) {
    const state = ends.get(personId) ?? { standing: null, reopenedOn: null };
    if (takenBackAt === null) state.standing = end;
    else {
      const day = dayIn(timeZone, takenBackAt);
      if (state.reopenedOn === null || day > state.reopenedOn) state.reopenedOn = day;
    }
    ends.set(personId, state);
  }
  return ends;
}

/** Why people have no day 0, from the tellings that row security shows. */
export async function dayZeroGapsOf(
  tx: Tx,
  personIds: readonly string[],
): Promise<Map<string, DayZeroGap>> {
  if (personIds.length === 0) return new Map();
  const found = await tx.execute<{ id: string; told: number; month: boolean | null }>(
    sql`select u.id, count(e.id)::int as told, bool_or(e.last_exposure ~ '^\\d{4}-\\d{2}$') as month
        from unnest(${idList(personIds)}) u (id)
        left join lateral (
          select cp.id, cp.person_b as other from core.contact_pair cp
          where cp.person_a = u.id and cp.withdrawn_at is null
          union all
          select cp.id, cp.person_a from core.contact_pair cp
          where cp.person_b = u.id and cp.withdrawn_at is null) s on true
        left join core.person q on q.id = s.other and q.withdrawn_at is null and (
          q.classification is null
          or q.classification in ('confirmed', 'probable', 'suspected'))
        left join core.exposure e on e.pair_id = s.id and q.id is not null
          and e.withdrawn_at is null
        group by u.id`,
  );
  return new Map(
    found.rows.map(({ id, told, month }) => [
      id,
      told === 0 ? "no_exposure" : month ? "month_only" : "not_known",
    ]),
  );
}
