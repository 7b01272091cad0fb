import type { Import } from "../../shared/contracts/imports.ts";
import type { Member } from "./factories.ts";

const WAIT_MS = 60_000;

/** Uploads a file and answers the staged import; throws when it was refused. */
export async function stage(
  member: Member,
  kind: "people" | "pairs",
  text: string | Buffer,
  name?: string,
): Promise<Import> {
  const answer = await member.client.upload(`${member.base}/imports`, { kind }, text, name);
  if (answer.status !== 201) throw new Error(`upload answered ${answer.status}: ${answer.text}`);
  return answer.body as Import;
}

/** Commits a staged import and waits, a bounded time, until it has ended. */
export async function commit(
  member: Member,
  id: string,
  body: { createMissing?: boolean } = {},
): Promise<Import> {
  const path = `${member.base}/imports/${id}`;
  const answer = await member.client.call("post", `${path}/commit`, { body });
  if (answer.status !== 202) throw new Error(`commit answered ${answer.status}: ${answer.text}`);
  const end = Date.now() + WAIT_MS;
  while (Date.now() < end) {
    const { body: now } = await member.client.get(path);
    if (now.state !== "committing") return now as Import;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  throw new Error("the import did not end in time");
}

/** Stages and commits a file. */
export async function bringIn(
  member: Member,
  kind: "people" | "pairs",
  text: string,
  body: { createMissing?: boolean } = {},
): Promise<Import> {
  return commit(member, (await stage(member, kind, text)).id, body);
}

/** Problems of an import in one line each. */
export function problemLines(answer: Pick<Import, "problems">): string[] {
  return answer.problems.map(({ line, column, code }) => `${line} ${column} ${code}`);
}
