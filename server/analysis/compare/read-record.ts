import type pg from "pg";
import type { MixingAttribute } from "../../../shared/contracts/compare.ts";
import type { SummaryQuery } from "../../../shared/contracts/network.ts";
import { MISSING, SETTINGS } from "../../../shared/vocabulary.ts";
import { now } from "../../clock.ts";
import type { GraphSnapshot } from "../graph-store.ts";
import { readGraph } from "../load-graph.ts";
import { type AnalysisSettings, type AskedReport, reportQuestion } from "../report-question.ts";
import { snapshotTx } from "../snapshot-tx.ts";

/** The record of an investigation at one moment, as far as a comparison needs it. */
export type ComparedRecord = {
  readonly snapshot: GraphSnapshot;
  readonly asked: AskedReport;
  readonly studyNumbers: readonly string[];
  /** Day of each person's first complete interview, or what their record says; "" = none. */
  readonly interviewDay: readonly string[];
  /** Instant (ms) that interview was held at; Infinity without one. */
  readonly heldAt: Float64Array;
  /** Value of the attribute by person, null = missing; null where the attribute is no column. */
  readonly values: readonly (string | null)[] | null;
};

const isMissing = (value: string | null) =>
  value === null || value === "" || (MISSING as readonly string[]).includes(value);

async function readSettings(
  client: pg.PoolClient,
  investigationId: string,
): Promise<AnalysisSettings | null> {
  const found = await client.query<AnalysisSettings>(
    `select time_zone as "timeZone", population_at_risk as "populationAtRisk",
       infectious_before as "infectiousBefore", infectious_after as "infectiousAfter"
     from core.investigation where id = $1`,
    [investigationId],
  );
  return found.rows[0] ?? null;
}

type Value = { id: string; value: string | null };

/** Query of an attribute: person and value. "Interviewed" comes from the graph itself. */
const ATTRIBUTE_SQL: Record<Exclude<MixingAttribute, "interviewed" | "setting">, string> = {
  age_band: "select id, age_band as value from core.person where investigation_id = $1",
  area: "select id, area as value from core.person where investigation_id = $1",
  household: `select p.id, h.number::text as value from core.person p
    left join core.place h on h.id = p.household_id where p.investigation_id = $1`,
};

/** The setting that most tellings about a person name; of equals the first of the vocabulary. */
const SETTING_SQL = `select distinct on (t.id) t.id, t.value from (
    select x.id, e.setting as value, count(*) as told from core.exposure e
    join core.contact_pair cp on cp.id = e.pair_id
    cross join lateral (values (cp.person_a), (cp.person_b)) as x (id)
    where e.investigation_id = $1 and e.setting = any ($3::text[])
      and e.recorded_at < $2::timestamptz
      and coalesce(least(e.withdrawn_at, cp.withdrawn_at) >= $2::timestamptz, true)
    group by 1, 2) t
  order by t.id, t.told desc, array_position($3::text[], t.value)`;

async function readValues(
  client: pg.PoolClient,
  investigationId: string,
  attribute: MixingAttribute | null,
  before: string,
): Promise<Value[] | null> {
  if (attribute === null || attribute === "interviewed") return null;
  const found =
    attribute === "setting"
      ? await client.query<Value>(SETTING_SQL, [investigationId, before, [...SETTINGS]])
      : await client.query<Value>(ATTRIBUTE_SQL[attribute], [investigationId]);
  return found.rows;
}

/**
 * Reads what a comparison is computed on in one moment of the database: graph, settings, order of
 * interviews and attribute. Attributes are those of that moment also for an earlier cut-off, since
 * the record keeps no history of them.
 *
 * @param pool of the system login
 * @returns null when there is no such investigation
 */
export async function readRecord(
  pool: pg.Pool,
  investigationId: string,
  query: SummaryQuery,
  attribute: MixingAttribute | null,
): Promise<ComparedRecord | null> {
  return await snapshotTx(pool, async (client) => {
    const settings = await readSettings(client, investigationId);
    const store = await readGraph(client, investigationId);
    if (!settings || !store) return null;
    const asked = reportQuestion(query, settings, now());
    const { asOf } = asked.question;
    // Whole milliseconds count, as in the graph: what was recorded before the next one.
    const before = asOf === null ? "infinity" : new Date(asOf + 1).toISOString();
    const interviews = await client.query<{ id: string; day: string | null; held: string }>(
      `select distinct on (person_id) person_id as id, day,
         floor(date_part('epoch', held_at) * 1000) as held
       from core.interview where investigation_id = $1 and outcome = 'complete'
         and recorded_at < $2::timestamptz and coalesce(withdrawn_at >= $2::timestamptz, true)
       order by person_id, day, held_at, recorded_at, id`,
      [investigationId, before],
    );
    const people = await client.query<{ id: string; day: string | null }>(
      `select id, interview_date as day from core.person
       where investigation_id = $1 and interview_date is not null`,
      [investigationId],
    );
    const { studyNumbers } = store;
    const interviewDay = studyNumbers.map(() => "");
    const heldAt = new Float64Array(studyNumbers.length).fill(Number.POSITIVE_INFINITY);
    for (const { id, day } of people.rows) {
      const at = store.indexOf(id);
      if (at !== undefined && !isMissing(day)) interviewDay[at] = day ?? "";
    }
    for (const { id, day, held } of interviews.rows) {
      const at = store.indexOf(id);
      if (at === undefined) continue;
      if (!isMissing(day)) interviewDay[at] = day ?? "";
      heldAt[at] = Number(held);
    }
    const rows = await readValues(client, investigationId, attribute, before);
    const values = rows && studyNumbers.map((): string | null => null);
    for (const { id, value } of rows ?? []) {
      const at = store.indexOf(id);
      if (values && at !== undefined && !isMissing(value)) values[at] = value;
    }
    return { snapshot: store.snapshot(), asked, studyNumbers, interviewDay, heldAt, values };
  });
}
