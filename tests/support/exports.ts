import { createHash } from "node:crypto";
import { type Export, exportAnswer } from "../../shared/contracts/exports.ts";
import type { Member } from "./factories.ts";

const WAIT_MS = 60_000;

/** Waits, a bounded time, until an export is no longer being made. */
export async function settled(member: Member, id: string): Promise<Export> {
  const end = Date.now() + WAIT_MS;
  while (Date.now() < end) {
    const answer = await member.client.get(`${member.base}/exports/${id}`);
    if (answer.status !== 200) throw new Error(`the export answered ${answer.status}`);
    const one = exportAnswer.parse(answer.body);
    if (one.state !== "building") return one;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  throw new Error("the export did not end in time");
}

/** Asks for an export and waits until it is made. */
export async function takeOut(member: Member, body: Record<string, unknown>): Promise<Export> {
  const asked = { purpose: "analysis", ...body };
  const answer = await member.client.post(`${member.base}/exports`, asked);
  if (answer.status !== 201)
    throw new Error(`the export answered ${answer.status}: ${answer.text}`);
  return settled(member, answer.body.id);
}

/** The file of a made export, whose length and checksum must be what its entry says. */
export async function fileOf(member: Member, one: Pick<Export, "id">): Promise<string> {
  const path = `${member.base}/exports/${one.id}`;
  const answer = await member.client.get(`${path}/file`).buffer(true);
  if (answer.status !== 200) throw new Error(`the file answered ${answer.status}`);
  const entry = exportAnswer.parse((await member.client.get(path)).body);
  const sha256 = createHash("sha256").update(answer.text, "utf8").digest("hex");
  if (sha256 !== entry.sha256) throw new Error("the file is not the one that was made");
  return answer.text;
}
