import { randomUUID } from "node:crypto";
import type pg from "pg";
import type { Outbreak } from "./generator/types.ts";
import { insertRows } from "./insert-rows.ts";
import type { LoadTarget } from "./load-target.ts";

const yesNo = (value: boolean | null) => (value === null ? null : value ? "yes" : "no");

/** Loads interviews, contact pairs, exposures and group exposures with their true entry times. */
export async function loadInterviews(
  target: LoadTarget,
  outbreak: Outbreak,
  idOf: (index: number) => string,
  placeOf: (index: number | null) => string | null,
): Promise<void> {
  const { client, investigationId, accounts } = target;
  const inv = { investigation_id: investigationId };
  const interviewId = new Map(outbreak.interviews.map((one) => [one.id, randomUUID()]));
  await insertRows(
    client,
    "core.interview",
    {
      id: "uuid",
      investigation_id: "uuid",
      person_id: "uuid",
      outcome: "text",
      channel: "text",
      held_at: "timestamptz",
      day: "text",
      source: "text",
      graph_version: "bigint",
      recorded_at: "timestamptz",
      recorded_by: "uuid",
    },
    outbreak.interviews.map((one, index) => ({
      ...inv,
      id: interviewId.get(one.id),
      person_id: idOf(one.personId),
      outcome: one.outcome,
      channel: one.channel,
      held_at: one.at,
      day: one.at.slice(0, 10),
      source: "form",
      graph_version: index + 1,
      recorded_at: one.recordedAt,
      recorded_by: accounts.get(one.tracer) ?? null,
    })),
  );
  target.progress?.("interviews", outbreak.interviews.length);
  interface Pair {
    id: string;
    a: string;
    b: string;
    recordedAt: string;
    withdrawnAt: string | null;
  }
  const pairs = new Map<string, Pair>();
  const exposures = outbreak.exposures.map((one) => {
    const [a, b] = [idOf(one.personA), idOf(one.personB)].sort() as [string, string];
    const known = pairs.get(a + b);
    if (!known)
      pairs.set(a + b, {
        id: randomUUID(),
        a,
        b,
        recordedAt: one.recordedAt,
        withdrawnAt: one.withdrawnAt,
      });
    // A pair stands while any telling of it does.
    else if (one.withdrawnAt === null) known.withdrawnAt = null;
    return { one, pairId: (pairs.get(a + b) as Pair).id };
  });
  await insertRows(
    client,
    "core.contact_pair",
    {
      id: "uuid",
      investigation_id: "uuid",
      person_a: "uuid",
      person_b: "uuid",
      recorded_at: "timestamptz",
      withdrawn_at: "timestamptz",
    },
    [...pairs.values()].map((pair) => ({
      ...inv,
      id: pair.id,
      person_a: pair.a,
      person_b: pair.b,
      recorded_at: pair.recordedAt,
      withdrawn_at: pair.withdrawnAt,
    })),
  );
  target.progress?.("contact pairs", pairs.size);
  await insertRows(
    client,
    "core.exposure",
    {
      id: "uuid",
      investigation_id: "uuid",
      pair_id: "uuid",
      interview_id: "uuid",
      named_by: "uuid",
      first_exposure: "text",
      last_exposure: "text",
      setting: "text",
      place_id: "uuid",
      minutes: "integer",
      distance_m: "real",
      physical: "text",
      indoors: "text",
      relation: "text",
      recorded_at: "timestamptz",
      withdrawn_at: "timestamptz",
    },
    exposures.map(({ one, pairId }) => ({
      ...inv,
      id: randomUUID(),
      pair_id: pairId,
      interview_id: one.interviewId === null ? null : (interviewId.get(one.interviewId) ?? null),
      named_by: idOf(one.namedBy),
      first_exposure: one.firstDay,
      last_exposure: one.lastDay,
      setting: one.setting,
      place_id: placeOf(one.placeId),
      minutes: one.minutes,
      distance_m: one.distanceM,
      physical: yesNo(one.physical),
      indoors: yesNo(one.indoors),
      relation: one.relation,
      recorded_at: one.recordedAt,
      withdrawn_at: one.withdrawnAt,
    })),
  );
  await insertRows(
    client,
    "core.group_exposure",
    {
      id: "uuid",
      investigation_id: "uuid",
      interview_id: "uuid",
      person_id: "uuid",
      setting: "text",
      place_id: "uuid",
      first_exposure: "text",
      last_exposure: "text",
      count_min: "integer",
      count_max: "integer",
      recorded_at: "timestamptz",
    },
    outbreak.groupExposures.map((one) => ({
      ...inv,
      id: randomUUID(),
      interview_id: interviewId.get(one.interviewId),
      person_id: idOf(outbreak.interviews[one.interviewId]?.personId ?? 0),
      setting: one.setting,
      place_id: placeOf(one.placeId),
      first_exposure: one.firstDay,
      last_exposure: one.lastDay,
      count_min: one.countMin,
      count_max: one.countMax,
      recorded_at: one.recordedAt,
    })),
  );
  target.progress?.("exposures", exposures.length);
  await bringCopiesUpToDate(client, investigationId, outbreak.interviews.length);
}

/** Copies kept on people for sorting, and counters, computed from the rows just loaded. */
async function bringCopiesUpToDate(
  client: pg.ClientBase,
  investigationId: string,
  version: number,
) {
  await client.query(
    `update core.person p set specimen_date = t.specimen_date, result_date = t.result_date, result = t.result
     from (select distinct on (person_id) person_id, specimen_date, result_date, result
       from core.test_result where investigation_id = $1 and withdrawn_at is null
       order by person_id, (result = 'positive') desc nulls last,
         case when result = 'positive' then specimen_date end, recorded_at desc) t
     where p.id = t.person_id`,
    [investigationId],
  );
  await client.query(
    `update core.person p set interview_state = t.outcome, interviewed = 'yes', interview_date = t.day
     from (select distinct on (person_id) person_id, outcome, day from core.interview
       where investigation_id = $1 and outcome = 'complete' order by person_id, day) t
     where p.id = t.person_id`,
    [investigationId],
  );
  await client.query(
    `update core.person p set interview_state = t.outcome
     from (select distinct on (person_id) person_id, outcome from core.interview
       where investigation_id = $1 order by person_id, (outcome = 'partial') desc, held_at desc) t
     where p.id = t.person_id and p.interview_state is null`,
    [investigationId],
  );
  await client.query(
    `update core.investigation set graph_version = $2,
       next_number = coalesce((select max(number) from core.place where investigation_id = $1), 0) + 1
     where id = $1`,
    [investigationId, version],
  );
}
