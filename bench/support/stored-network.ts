import { randomUUID } from "node:crypto";
import type pg from "pg";

/**
 * Writes a made-up investigation straight into the database: `people` people, three pairs each,
 * one telling a pair; every third person was interviewed. Entries and exposure days lie within the
 * last 30 days. Same seed, same shape.
 *
 * @param client an administrator's connection
 * @returns the investigation's id
 */
export async function storeNetwork(client: pg.Client, people: number): Promise<string> {
  const id = randomUUID();
  await client.query(
    `insert into core.investigation (id, name, invented, time_zone, country_code, infectious_before,
       infectious_after, incubation_min, incubation_max, monitoring_days, graph_version)
     values ($1, $2, true, 'Pacific/Auckland', 'NZ', 2, 10, 1, 14, 14, 1)`,
    [id, `Made up, ${people} people`],
  );
  await client.query("select setseed(0.20260101)");
  await client.query("drop table if exists pg_temp.made");
  await client.query(
    `create temp table made as
     select k, gen_random_uuid() as id, now() - (1 - k::float8 / $1) * interval '30 days' as at
     from generate_series(1, $1::int) as k`,
    [people],
  );
  await client.query("create unique index on made (k)");
  await client.query(
    `insert into core.person (id, investigation_id, study_number, classification, interviewed, recorded_at)
     select id, $1::uuid, 'B' || k, case when k % 3 = 0 then 'confirmed' else 'contact' end,
       case when k % 3 = 0 then 'yes' end, at from made order by k`,
    [id],
  );
  await client.query(
    `insert into core.interview (id, investigation_id, person_id, outcome, held_at, day, recorded_at)
     select gen_random_uuid(), $1, id, 'complete', at, at::date::text, at from made where k % 3 = 0`,
    [id],
  );
  await client.query("drop table if exists pg_temp.made_pair");
  await client.query(
    `create temp table made_pair as
     select gen_random_uuid() as id, least(a.id, b.id) as low, greatest(a.id, b.id) as high,
       case when a.k % 3 = 0 then a.id when b.k % 3 = 0 then b.id end as named_by,
       greatest(a.at, b.at) as at
     from (select 1 + floor(random() * $1)::int as u, 1 + floor(random() * $1)::int as v
           from generate_series(1, 3 * $1::int)) as drawn
     join made a on a.k = drawn.u join made b on b.k = drawn.v where drawn.u <> drawn.v`,
    [people],
  );
  await client.query(
    `insert into core.contact_pair (id, investigation_id, person_a, person_b, recorded_at)
     select id, $1, low, high, at from made_pair on conflict do nothing`,
    [id],
  );
  await client.query(
    `insert into core.exposure (id, investigation_id, pair_id, named_by, first_exposure,
       last_exposure, setting, recorded_at)
     select gen_random_uuid(), $1, p.id, m.named_by, (m.at - interval '6 days')::date::text,
       (m.at - interval '2 days')::date::text, 'social', m.at
     from made_pair m join core.contact_pair p
       on p.investigation_id = $1 and p.person_a = m.low and p.person_b = m.high`,
    [id],
  );
  await client.query("analyze");
  return id;
}

/** Writes one interview with 12 new contacts as its command does; returns the graph version. */
export async function storeInterview(client: pg.Client, investigationId: string): Promise<number> {
  const found = await client.query<{ id: string }>(
    "select id from core.person where investigation_id = $1 and study_number = 'B3'",
    [investigationId],
  );
  const index = found.rows[0]?.id ?? "";
  const others = Array.from({ length: 12 }, () => randomUUID());
  await client.query("begin");
  await client.query(
    `insert into core.person (id, investigation_id, study_number, classification)
     select o, $1, o::text, 'contact' from unnest($2::uuid[]) as o`,
    [investigationId, others],
  );
  await client.query(
    `with pairs as (
       insert into core.contact_pair (id, investigation_id, person_a, person_b)
       select gen_random_uuid(), $1, least(o, $3::uuid), greatest(o, $3::uuid)
       from unnest($2::uuid[]) as o returning id)
     insert into core.exposure (id, investigation_id, pair_id, named_by, first_exposure, setting)
     select gen_random_uuid(), $1, id, $3::uuid, current_date::text, 'social' from pairs`,
    [investigationId, others, index],
  );
  const bumped = await client.query<{ version: string }>(
    `update core.investigation set graph_version = graph_version + 1 where id = $1
     returning graph_version as version`,
    [investigationId],
  );
  const version = Number(bumped.rows[0]?.version);
  await client.query(
    `insert into core.graph_change (investigation_id, graph_version, kind, person_a, person_b)
     select $1::uuid, $2::bigint, 'person', o, null::uuid from unnest($3::uuid[]) as o
     union all select $1::uuid, $2::bigint, 'pair', o, $4::uuid from unnest($3::uuid[]) as o
     union all select $1::uuid, $2::bigint, 'interview', $4::uuid, null::uuid`,
    [investigationId, version, others, index],
  );
  await client.query(
    "insert into core.outbox (investigation_id, topic, graph_version) values ($1, 'graph', $2)",
    [investigationId, version],
  );
  await client.query("select pg_notify('strandline', $1)", [investigationId]);
  await client.query("commit");
  return version;
}
