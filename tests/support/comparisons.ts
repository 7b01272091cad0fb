import { type CompareRun, compareRunAnswer } from "../../shared/contracts/compare.ts";
import type { PublishedNetwork } from "../core/support/published-networks.ts";
import type { Member } from "./factories.ts";
import { bringIn } from "./imports.ts";

const WAIT_MS = 60_000;

/** A run as a member sees it now. */
export async function runOf(member: Member, id: string): Promise<CompareRun> {
  const answer = await member.client.get(`${member.base}/compare/runs/${id}`);
  if (answer.status !== 200) throw new Error(`the run answered ${answer.status}: ${answer.text}`);
  return compareRunAnswer.parse(answer.body);
}

/** Waits, a bounded time, until a run has ended. */
export async function ended(member: Member, id: string): Promise<CompareRun> {
  const end = Date.now() + WAIT_MS;
  while (Date.now() < end) {
    const run = await runOf(member, id);
    if (run.state !== "running") return run;
    await new Promise((resolve) => setTimeout(resolve, 40));
  }
  throw new Error("the comparison did not end in time");
}

/** Asks for a run; its id. */
export async function askRun(member: Member, body: Record<string, unknown>): Promise<string> {
  const answer = await member.client.post(`${member.base}/compare/runs`, {
    name: "A comparison",
    replicates: 199,
    window: "all",
    ...body,
  });
  if (answer.status !== 201) throw new Error(`asking answered ${answer.status}: ${answer.text}`);
  return answer.body.id;
}

/** Asks for a run and waits until it is ready. */
export async function compareNow(
  member: Member,
  body: Record<string, unknown> = {},
): Promise<CompareRun> {
  const run = await ended(member, await askRun(member, body));
  if (run.state !== "ready") throw new Error(`the run ended as ${run.state}: ${run.failure}`);
  return run;
}

/** The result of a run that is ready. */
export function resultOf(run: CompareRun): NonNullable<CompareRun["result"]> {
  if (run.result === null) throw new Error("the run has no result");
  return run.result;
}

/** Brings a published network in as files; with `people` columns beside the reference. */
export async function bringInNetwork(
  member: Member,
  { n, links }: PublishedNetwork,
  people: Record<string, (person: number) => string> = {},
): Promise<void> {
  const columns = Object.keys(people);
  const rows = Array.from({ length: n }, (_, u) =>
    [`p${u}`, ...columns.map((column) => people[column]?.(u) ?? "")].join(","),
  );
  await bringIn(member, "people", `${["ref", ...columns].join(",")}\n${rows.join("\n")}\n`);
  const pairs = links.map(([a, b]) => `p${a},p${b}`).join("\n");
  await bringIn(member, "pairs", `ref_a,ref_b\n${pairs}\n`);
}
