import { randomUUID } from "node:crypto";
import type { FollowUpCheck, Outbreak } from "./generator/types.ts";
import { insertRows, type Row, SLICE } from "./insert-rows.ts";
import type { LoadTarget } from "./load-target.ts";

const COLUMNS = {
  id: "uuid",
  investigation_id: "uuid",
  person_id: "uuid",
  day: "text",
  outcome: "text",
  symptoms: "text",
  symptom_codes: "text[]",
  respondent: "text",
  recorded_at: "timestamptz",
  recorded_by: "uuid",
};

/** Loads the daily calls to contacts: spoken to or not reached, with their true entry times. */
export async function loadChecks(
  target: LoadTarget,
  outbreak: Outbreak,
  idOf: (index: number) => string,
): Promise<void> {
  const { client, investigationId, accounts } = target;
  // Slice by slice: at load size there are a million of them.
  for (let at = 0; at < outbreak.checks.length; at += SLICE) {
    await insertRows(
      client,
      "core.follow_check",
      COLUMNS,
      outbreak.checks.slice(at, at + SLICE).map(row),
    );
  }

  function row(check: FollowUpCheck): Row {
    const spoken = check.result === "seen";
    const tracer = outbreak.people[check.personId]?.assignedTracer ?? null;
    return {
      investigation_id: investigationId,
      id: randomUUID(),
      person_id: idOf(check.personId),
      day: check.day,
      outcome: spoken ? "spoken" : "not_reached",
      symptoms: spoken ? (check.symptoms ? "yes" : "no") : null,
      symptom_codes: check.symptoms ? ["fever"] : [],
      respondent: spoken ? "self" : null,
      recorded_at: check.recordedAt,
      recorded_by: tracer === null ? null : (accounts.get(tracer) ?? null),
    };
  }
}
