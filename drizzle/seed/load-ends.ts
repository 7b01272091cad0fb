import { randomUUID } from "node:crypto";
import type { Outbreak } from "./generator/types.ts";
import { insertRows } from "./insert-rows.ts";
import type { LoadTarget } from "./load-target.ts";

// One in so many of the contacts who are called goes away or will not be called again.
const ONE_IN = 40;
const REASONS = ["moved", "refused", "died", "not_a_contact"] as const;

/**
 * Ends the follow-up of a few contacts on the day of their last call, by whoever made it: they moved
 * away, will not be called again, died, or were none.
 */
export async function loadEnds(
  target: LoadTarget,
  outbreak: Outbreak,
  idOf: (index: number) => string,
): Promise<void> {
  const { client, investigationId, accounts } = target;
  const last = new Map<number, Outbreak["checks"][number]>();
  for (const check of outbreak.checks) {
    const known = last.get(check.personId);
    if (!known || check.day > known.day) last.set(check.personId, check);
  }
  // The story's lost contacts stay lost, and whoever became a case did not leave before.
  const kept = new Set(outbreak.story.lostContacts);
  for (const { personId, classification } of outbreak.classifications) {
    if (classification !== "contact") kept.add(personId);
  }
  const ended = [...last.values()]
    .filter(({ personId, symptoms }) => !kept.has(personId) && !symptoms)
    .filter((_, index) => index % ONE_IN === ONE_IN - 1);
  await insertRows(
    client,
    "core.follow_end",
    {
      id: "uuid",
      investigation_id: "uuid",
      person_id: "uuid",
      reason: "text",
      day: "text",
      recorded_at: "timestamptz",
      recorded_by: "uuid",
    },
    ended.map((check, index) => {
      const tracer = outbreak.people[check.personId]?.assignedTracer ?? null;
      return {
        id: randomUUID(),
        investigation_id: investigationId,
        person_id: idOf(check.personId),
        reason: REASONS[index % REASONS.length],
        day: check.day,
        recorded_at: check.recordedAt,
        recorded_by: tracer === null ? null : (accounts.get(tracer) ?? null),
      };
    }),
  );
}
