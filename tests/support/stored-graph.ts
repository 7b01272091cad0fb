import { randomUUID } from "node:crypto";
import pg from "pg";

export type StoredPerson = {
  id?: string;
  classification?: string | null;
  interviewed?: string | null;
  recordedAt?: string;
};
export type StoredTelling = {
  a: string;
  b: string;
  namedBy?: string | null;
  first?: string | null;
  last?: string | null;
  recordedAt?: string;
};
export type Change = { kind: string; a?: string; b?: string };

/** Writes graph rows as commands do, with any time of entry, through an administrator. */
export class StoredGraph {
  readonly client: pg.Client;
  readonly id: string;
  #number = 0;

  private constructor(client: pg.Client, id: string) {
    this.client = client;
    this.id = id;
  }

  /** Makes an investigation with an infectious window of 2 days before to 10 after onset. */
  static async make(
    adminUrl: string,
    options: { zone?: string; population?: number | null } = {},
  ): Promise<StoredGraph> {
    const client = new pg.Client({ connectionString: adminUrl });
    client.on("error", () => {});
    await client.connect();
    const id = randomUUID();
    await client.query(
      `insert into core.investigation (id, name, invented, time_zone, country_code,
         population_at_risk, infectious_before, infectious_after, incubation_min, incubation_max,
         monitoring_days)
       values ($1, 'Invented', true, $2, 'NZ', $3, 2, 10, 1, 14, 14)`,
      [id, options.zone ?? "Pacific/Auckland", options.population ?? null],
    );
    return new StoredGraph(client, id);
  }

  async close(): Promise<void> {
    await this.client.end();
  }

  /** Adds people; returns their ids. */
  async people(rows: readonly StoredPerson[]): Promise<string[]> {
    const ids = rows.map((row) => row.id ?? randomUUID());
    const values = rows.map((row, k) => ({
      id: ids[k],
      study_number: `S${++this.#number}`,
      classification: row.classification ?? null,
      interviewed: row.interviewed ?? null,
      recorded_at: row.recordedAt ?? null,
    }));
    await this.client.query(
      `insert into core.person (id, investigation_id, study_number, classification, interviewed,
         recorded_at)
       select r.id, $1, r.study_number, r.classification, r.interviewed,
         coalesce(r.recorded_at, now())
       from jsonb_to_recordset($2) as r (id uuid, study_number text, classification text,
         interviewed text, recorded_at timestamptz)`,
      [this.id, JSON.stringify(values)],
    );
    return ids;
  }

  async classify(person: string, classification: string, recordedAt: string): Promise<void> {
    await this.client.query(
      `insert into core.classification (id, investigation_id, person_id, classification,
         case_definition_version, recorded_at) values ($1, $2, $3, $4, 1, $5)`,
      [randomUUID(), this.id, person, classification, recordedAt],
    );
    await this.client.query("update core.person set classification = $2 where id = $1", [
      person,
      classification,
    ]);
  }

  async interview(person: string, outcome: string, recordedAt?: string): Promise<string> {
    const id = randomUUID();
    await this.client.query(
      `insert into core.interview (id, investigation_id, person_id, outcome, held_at, day, recorded_at)
       values ($1, $2, $3, $4, now(), '2026-01-01', coalesce($5, now()))`,
      [id, this.id, person, outcome, recordedAt ?? null],
    );
    return id;
  }

  /** Adds tellings, and the pairs they are of. */
  async tellings(rows: readonly StoredTelling[]): Promise<void> {
    const values = rows.map((row) => ({
      ...row,
      id: randomUUID(),
      pair: randomUUID(),
      low: row.a < row.b ? row.a : row.b,
      high: row.a < row.b ? row.b : row.a,
    }));
    await this.client.query(
      `with told as (select * from jsonb_to_recordset($2) as r (id uuid, pair uuid, low uuid,
           high uuid, "namedBy" uuid, first text, last text, "recordedAt" timestamptz)),
         added as (
           insert into core.contact_pair (id, investigation_id, person_a, person_b, recorded_at)
           select distinct on (low, high) pair, $1::uuid, low, high, coalesce("recordedAt", now())
           from told on conflict do nothing returning id, person_a, person_b)
       insert into core.exposure (id, investigation_id, pair_id, named_by, first_exposure,
         last_exposure, recorded_at)
       select t.id, $1, p.id, t."namedBy", t.first, t.last, coalesce(t."recordedAt", now())
       from told t join (
         select id, person_a, person_b from added
         union select id, person_a, person_b from core.contact_pair where investigation_id = $1) p
         on p.person_a = t.low and p.person_b = t.high`,
      [this.id, JSON.stringify(values)],
    );
  }

  /** Withdraws every telling of a pair. */
  async withdraw(a: string, b: string): Promise<void> {
    await this.client.query(
      `update core.exposure e set withdrawn_at = clock_timestamp() from core.contact_pair p
       where p.id = e.pair_id and p.person_a = least($1::uuid, $2::uuid)
         and p.person_b = greatest($1::uuid, $2::uuid)`,
      [a, b],
    );
  }

  /** Raises the graph version, logs what changed and announces it; returns the version. */
  async changed(...changes: readonly Change[]): Promise<number> {
    await this.client.query("begin");
    const { rows } = await this.client.query<{ v: string }>(
      "update core.investigation set graph_version = graph_version + 1 where id = $1 returning graph_version as v",
      [this.id],
    );
    const version = Number(rows[0]?.v);
    for (const { kind, a, b } of changes) {
      await this.client.query(
        `insert into core.graph_change (investigation_id, graph_version, kind, person_a, person_b)
         values ($1, $2, $3, $4, $5)`,
        [this.id, version, kind, a ?? null, b ?? null],
      );
    }
    await this.client.query(
      "insert into core.outbox (investigation_id, topic, graph_version) values ($1, 'graph', $2)",
      [this.id, version],
    );
    await this.client.query("select pg_notify('strandline', $1)", [this.id]);
    await this.client.query("commit");
    return version;
  }
}
