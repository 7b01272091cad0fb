import { shiftDay } from "../../server/clock.ts";
import { LAST_DAY } from "./bench-database.ts";
import type { BenchClient } from "./http-client.ts";

/** Twelve people named for the first time, different in each round. */
function contacts(round: number): Record<string, unknown>[] {
  return Array.from({ length: 12 }, (_, index) => ({
    name: `Given${round * 12 + index} Family${index}`,
    phone: `+44 20 7946 ${String((round * 12 + index) % 10_000).padStart(4, "0")}`,
    setting: ["household", "workplace", "social"][index % 3],
    place: index % 3 === 1 ? "Bench Works" : null,
    firstExposure: shiftDay(LAST_DAY, -4),
    lastExposure: shiftDay(LAST_DAY, -2),
    minutes: 30 + index,
    physical: index % 2 === 0,
    indoors: true,
    relation: "colleague",
  }));
}

/** Ids of cases that a tracer may interview. */
export async function heldCases(tracer: BenchClient, base: string): Promise<string[]> {
  const queue = await tracer.call<{ items: { id: string; can: { interview?: boolean } }[] }>(
    "GET",
    `${base}/people?pageSize=200&classification=case&assigned=me`,
  );
  return queue.body.items.filter((person) => person.can.interview).map(({ id }) => id);
}

/** Submits a 12-contact interview with one of the cases, by turns. */
export async function submitInterview(
  tracer: BenchClient,
  base: string,
  cases: readonly string[],
  round: number,
): Promise<{ ms: number; graphVersion: number }> {
  const personId = cases[round % cases.length];
  if (!personId) throw new Error("the tracer holds no case");
  const made = await tracer.call<{ graphVersion: number }>("POST", `${base}/interviews`, {
    personId,
    outcome: "complete",
    channel: "telephone",
    contacts: contacts(round),
  });
  return { ms: made.ms, graphVersion: made.body.graphVersion };
}
