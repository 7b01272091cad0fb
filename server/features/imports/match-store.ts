import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { MatchedOn } from "../../../shared/contracts/imports.ts";
import type { Tx } from "../../db/with-tx.ts";
import { open, seal } from "../../identity/cipher.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { refToken } from "../../identity/records.ts";
import type { Doubt } from "./find-doubts.ts";
import type { StagedPerson } from "./staged-row.ts";

/** A row that waits for a decision, opened. */
export interface WaitingRow {
  id: string;
  matchedOn: MatchedOn;
  row: StagedPerson;
  /** The person it looks like; null when that is an earlier row, named by its reference. */
  otherId: string | null;
  otherRef: string | null;
}

const bodyPlace = (id: string) => `identity.import_match|body_cipher|${id}`;

/** Sets rows of a file aside, encrypted. */
export async function keepDoubts(
  tx: Tx,
  keys: InvestigationKeys,
  importId: string,
  doubts: readonly Doubt[],
): Promise<void> {
  if (doubts.length === 0) return;
  const rows = doubts.map(({ row, matchedOn, otherId, otherRef }) => {
    const id = randomUUID();
    return {
      id,
      line: row.line,
      ref_token: refToken(keys, row.cells.ref).toString("base64"),
      other_id: otherId,
      matched_on: matchedOn,
      body: seal(keys.seal, bodyPlace(id), JSON.stringify({ row, otherRef })).toString("base64"),
    };
  });
  await tx.execute(
    sql`select identity.keep_import_matches(${importId}::uuid, ${JSON.stringify(rows)}::jsonb)`,
  );
}

/** Forgets the rows set aside of a file that is checked again. */
export async function dropDoubts(tx: Tx, importId: string): Promise<void> {
  await tx.execute(sql`select identity.drop_import_matches(${importId}::uuid)`);
}

/** Rows that wait, in the order of the file: all, those of some ids, or those of a kind. */
export async function waitingRows(
  tx: Tx,
  keys: InvestigationKeys,
  importId: string,
  some: { ids?: readonly string[] | undefined; matchedOn?: string | undefined },
  page: { limit: number; offset: number },
): Promise<WaitingRow[]> {
  const ids = some.ids ? sql.param(`{${some.ids.join(",")}}`) : null;
  const found = await tx.execute<{
    id: string;
    other_id: string | null;
    matched_on: MatchedOn;
    body_cipher: Buffer;
  }>(
    sql`select id, other_id, matched_on, body_cipher from identity.open_import_matches(
      ${importId}::uuid, ${ids}::uuid[], ${some.matchedOn ?? null}, ${page.limit}, ${page.offset})`,
  );
  return found.rows.map(({ id, other_id: otherId, matched_on: matchedOn, body_cipher: body }) => ({
    id,
    otherId,
    matchedOn,
    ...(JSON.parse(open(keys.seal, bodyPlace(id), body).toString()) as {
      row: StagedPerson;
      otherRef: string | null;
    }),
  }));
}

/** How many rows of an import wait, by what makes them doubtful. */
export async function countWaiting(
  tx: Tx,
  importId: string,
): Promise<{ matchedOn: MatchedOn; waiting: number }[]> {
  const found = await tx.execute<{ matchedOn: MatchedOn; waiting: number }>(
    sql`select matched_on as "matchedOn", waiting from identity.count_import_matches(${importId}::uuid)`,
  );
  return found.rows;
}

/**
 * Takes rows out of the list for a decision and deletes what they held.
 *
 * @returns those that were still waiting
 */
export async function closeRows(
  tx: Tx,
  importId: string,
  ids: readonly string[],
  decision: "same" | "other",
): Promise<Set<string>> {
  const found = await tx.execute<{ id: string }>(
    sql`select id from identity.decide_import_matches(${importId}::uuid,
      ${sql.param(`{${ids.join(",")}}`)}::uuid[], ${decision})`,
  );
  return new Set(found.rows.map(({ id }) => id));
}

/** From now on these references name these people too. */
export async function addRefAliases(
  tx: Tx,
  keys: InvestigationKeys,
  aliases: readonly { ref: string; personId: string }[],
): Promise<void> {
  if (aliases.length === 0) return;
  const rows = aliases.map(({ ref, personId }) => ({
    token: refToken(keys, ref).toString("base64"),
    person_id: personId,
  }));
  await tx.execute(sql`select identity.add_ref_aliases(${JSON.stringify(rows)}::jsonb)`);
}

/** Those of some references whose rows are set aside in a file on record. */
export async function waitingRefs(
  tx: Tx,
  keys: InvestigationKeys,
  refs: readonly string[],
): Promise<Set<string>> {
  if (refs.length === 0) return new Set();
  const refOf = new Map(refs.map((ref) => [refToken(keys, ref).toString("hex"), ref]));
  const tokens = `{${[...refOf.keys()].map((hex) => `"\\\\x${hex}"`).join(",")}}`;
  const found = await tx.execute<{ token: Buffer }>(
    sql`select token from identity.waiting_refs(${sql.param(tokens)}::bytea[])`,
  );
  return new Set(found.rows.flatMap(({ token }) => refOf.get(token.toString("hex")) ?? []));
}
