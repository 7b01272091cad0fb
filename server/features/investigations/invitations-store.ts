import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Invitation } from "../../../shared/contracts/accounts.ts";
import type { Role } from "../../../shared/roles.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { KeyRing } from "../../identity/keys.ts";
import { sealOrder } from "../../mail/store.ts";
import { freshToken, tokenHash } from "../../mail/tokens.ts";

/** Invitations of the acting investigation that nobody took up yet, the newest first. */
export async function listInvitations(
  tx: Tx,
  query: { page: number; pageSize: number; q?: string | undefined },
): Promise<{ items: Invitation[]; total: number }> {
  const found = query.q?.toLowerCase() ?? null;
  const where = sql`(${found}::text is null or position(${found}::text in lower(i.email)) > 0)`;
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from views.invitation i where ${where}`,
  );
  const rows = await tx.execute<Invitation & Record<string, unknown>>(
    sql`select i.id, i.email, i.role, i.team, i.invited_by as "invitedBy",
        i.recorded_at as "invitedAt", i.ends_on as "endsOn", i.expires_at as "expiresAt"
      from views.invitation i where ${where} order by i.recorded_at desc, i.id
      limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { items: rows.rows, total: counted.rows[0]?.total ?? 0 };
}

/**
 * Keeps an invitation with the sealed letter that carries its token.
 *
 * @returns its id, or null when the acting account sent too many in the last hour
 */
export async function insertInvitation(
  tx: Tx,
  keys: KeyRing,
  invitation: { email: string; role: Role; teamId: string | null; endsOn: string | null },
): Promise<string | null> {
  const id = randomUUID();
  const token = freshToken();
  const letter = sealOrder(keys, { kind: "invitation", to: invitation.email, token });
  const done = await tx.execute<{ kept: boolean }>(
    sql`select auth.invite(${id}::uuid, ${invitation.email}, ${invitation.role},
      ${invitation.teamId}::uuid, ${invitation.endsOn}, ${tokenHash(token)}, ${letter.id}::uuid, ${letter.sealed}::bytea)
      as kept`,
  );
  return done.rows[0]?.kept ? id : null;
}

/** Takes an open invitation back; false when there is none here. */
export async function withdrawInvitation(tx: Tx, id: string): Promise<boolean> {
  const done = await tx.execute<{ done: boolean }>(
    sql`select auth.withdraw_invitation(${id}::uuid) as done`,
  );
  return done.rows[0]?.done === true;
}
