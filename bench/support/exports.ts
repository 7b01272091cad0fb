import { setTimeout as sleep } from "node:timers/promises";
import type { BenchClient } from "./http-client.ts";

const MOST_MS = 10 * 60_000;

interface Made {
  id: string;
  state: string;
  rows: number;
  bytes: number;
}

/**
 * Times a file of everybody and one of all pairs, from the request until it is ready.
 *
 * @param base address of the investigation, `/api/investigations/<id>`
 * @returns seconds, rows and bytes by kind
 */
export async function benchExports(officer: BenchClient, base: string) {
  const out: Record<string, { seconds: number; rows: number; bytes: number }> = {};
  for (const kind of ["people", "pairs"] as const) {
    const started = performance.now();
    const asked = { kind, purpose: "analysis", identified: kind === "people" };
    const { body } = await officer.call<{ id: string }>("POST", `${base}/exports`, asked);
    for (;;) {
      const made = (await officer.call<Made>("GET", `${base}/exports/${body.id}`)).body;
      const seconds = Math.round((performance.now() - started) / 100) / 10;
      if (made.state === "ready") {
        out[kind] = { seconds, rows: made.rows, bytes: made.bytes };
        break;
      }
      if (made.state !== "building" || seconds * 1000 > MOST_MS)
        throw new Error(`the export of ${kind} is ${made.state}`);
      await sleep(100);
    }
  }
  return out;
}
