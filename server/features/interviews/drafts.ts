import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";
import { open, seal } from "../../identity/cipher.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";

/** Bytes of a draft's JSON at most. */
const MOST_BYTES = 256 * 1024;

/** What an interviewer has typed about a person and not yet submitted. */
export interface StoredDraft {
  version: number;
  body: Record<string, unknown>;
  updatedAt: string;
}

/** Where a draft's ciphertext is bound to: one person, one interviewer. */
const bindingOf = (actor: Actor, personId: string) =>
  `identity.interview_draft|body_cipher|${personId.toLowerCase()}|${actor.accountId}`;

/** The acting person's own draft about a person, opened; null when there is none. */
export async function readDraft(
  tx: Tx,
  keys: InvestigationKeys,
  actor: Actor,
  personId: string,
): Promise<StoredDraft | null> {
  const found = await tx.execute<{ body_cipher: Buffer; version: number; updated_at: string }>(
    sql`select body_cipher, version, updated_at from identity.read_draft(${personId}::uuid)`,
  );
  const row = found.rows[0];
  if (!row) return null;
  const plain = open(keys.seal, bindingOf(actor, personId), row.body_cipher).toString();
  return { version: row.version, body: JSON.parse(plain), updatedAt: row.updated_at };
}

/**
 * Keeps a draft, encrypted.
 *
 * @param version the version it was typed upon; 0 for the first
 * @throws HttpProblem stale_version when another page saved or submitted meanwhile; too_large above
 *   256 kB
 */
export async function keepDraft(
  tx: Tx,
  keys: InvestigationKeys,
  actor: Actor,
  personId: string,
  draft: { version: number; body: Record<string, unknown> },
): Promise<void> {
  const plain = JSON.stringify(draft.body);
  if (Buffer.byteLength(plain) > MOST_BYTES) throw new HttpProblem("too_large");
  const sealed = seal(keys.seal, bindingOf(actor, personId), plain);
  const kept = await tx.execute<{ version: number | null }>(
    sql`select identity.keep_draft(${personId}::uuid, ${sealed}::bytea, ${draft.version}) as version`,
  );
  if (kept.rows[0]?.version == null) throw new HttpProblem("stale_version");
}
