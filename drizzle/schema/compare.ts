import { bigint, index, integer, jsonb, real, text, uuid } from "drizzle-orm/pg-core";
import { investigationId } from "./investigations.ts";
import { at, bytea, core, recordedAt } from "./shared.ts";

/** A comparison of the recorded network with random mixing: what was asked, on what, what came. */
export const compareRun = core.table(
  "compare_run",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    name: text("name").notNull(),
    state: text("state").notNull(),
    progress: real("progress").notNull().default(0),
    reached: integer("reached").notNull().default(0),
    replicates: integer("replicates").notNull(),
    seed: bigint("seed", { mode: "number" }).notNull(),
    population: text("population").notNull(),
    timeWindow: text("time_window").notNull(),
    fromDay: text("from_day"),
    toDay: text("to_day"),
    attribute: text("attribute"),
    // The selection as it was asked for: days and cut-off, before any clock was read.
    question: jsonb("question").notNull(),
    asOf: text("as_of").notNull(),
    cutOff: at("cut_off").notNull(),
    graphVersion: bigint("graph_version", { mode: "number" }).notNull(),
    coreVersion: text("core_version").notNull(),
    generator: text("generator").notNull(),
    people: integer("people").notNull().default(0),
    pairs: integer("pairs").notNull().default(0),
    // Everything that was computed on, compressed: a later change of the record changes no run.
    input: bytea("input"),
    result: jsonb("result"),
    failure: text("failure"),
    againOf: uuid("again_of"),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by").notNull(),
    finishedAt: at("finished_at"),
  },
  (t) => [index("compare_run_recorded").on(t.investigationId, t.recordedAt)],
);
