import { randomBytes } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Tx } from "../db/with-tx.ts";
import { open, seal, subkey } from "./cipher.ts";

/** Keys of one investigation: one to encrypt with, one to make search tokens with. */
export interface InvestigationKeys {
  seal: Buffer;
  token: Buffer;
}

/** Unwraps and keeps the data keys of investigations; the master key never leaves it. */
export interface KeyRing {
  /** A fresh data key for a new investigation, wrapped for storing. */
  wrapFresh(investigationId: string): Buffer;
  /** Keys of the acting investigation, read through its context once and kept in memory. */
  of(tx: Tx, investigationId: string): Promise<InvestigationKeys>;
  /** Keys from a wrapped data key at hand. */
  unwrap(investigationId: string, wrapped: Buffer): InvestigationKeys;
  /** Seals a letter that waits to be sent, bound to its row. */
  sealLetter(id: string, plain: string): Buffer;
  openLetter(id: string, sealed: Buffer): string;
  /** Value to store once, and to check at each boot: it opens only with the same master key. */
  checkValue(): string;
  opensCheck(value: string): boolean;
}

/** Makes the key ring of an installation from its 32-byte master key. */
export function createKeyRing(masterKey: Buffer): KeyRing {
  const wrapping = subkey(masterKey, "wrap");
  const letters = subkey(masterKey, "letters");
  const checking = subkey(masterKey, "check");
  const known = new Map<string, InvestigationKeys>();
  const unwrap = (id: string, wrapped: Buffer): InvestigationKeys => {
    const key = open(wrapping, `data_key|${id}`, wrapped);
    return { seal: subkey(key, "seal"), token: subkey(key, "token") };
  };
  return {
    wrapFresh: (id) => seal(wrapping, `data_key|${id}`, randomBytes(32)),
    unwrap,
    async of(tx, id) {
      const kept = known.get(id);
      if (kept) return kept;
      const found = await tx.execute<{ key: Buffer | null }>(
        sql`select identity.wrapped_key() as key`,
      );
      const wrapped = found.rows[0]?.key;
      if (!wrapped) throw new Error("the investigation has no data key");
      const keys = unwrap(id, wrapped);
      known.set(id, keys);
      return keys;
    },
    sealLetter: (id, plain) => seal(letters, `mail|${id}`, plain),
    openLetter: (id, sealed) => open(letters, `mail|${id}`, sealed).toString("utf8"),
    checkValue: () => seal(checking, "check", "strandline").toString("base64"),
    opensCheck(value) {
      try {
        return open(checking, "check", Buffer.from(value, "base64")).toString() === "strandline";
      } catch {
        return false;
      }
    },
  };
}
