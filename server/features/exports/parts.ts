import { createHash } from "node:crypto";
import { sql } from "drizzle-orm";
import { type Tx, type TxContext, withTx } from "../../db/with-tx.ts";
import { open, seal } from "../../identity/cipher.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import type { Services } from "../../services.ts";

/** Plain bytes of a part; the last one is shorter. */
const PART_BYTES = 256 * 1024;

const placeOf = (id: string, part: number) => `identity.export_part|body_cipher|${id}|${part}`;

/**
 * The investigation's keys for sealing a file. Read by the accounts login: an epidemiologist's has
 * no right on identity, and its files of study numbers are kept as safely as the others.
 */
export async function keysForFile(
  services: Pick<Services, "pools" | "keys">,
  investigationId: string,
): Promise<InvestigationKeys> {
  const found = await services.pools.auth.query<{ wrapped_key: Buffer }>(
    "select wrapped_key from identity.data_key where investigation_id = $1",
    [investigationId],
  );
  const wrapped = found.rows[0]?.wrapped_key;
  if (!wrapped) throw new Error("the investigation has no data key");
  return services.keys.unwrap(investigationId, wrapped);
}

/** Takes a file's text bit by bit and keeps it encrypted, a part at a time. */
export interface PartWriter {
  add(text: string): Promise<void>;
  /** Keeps what is left. */
  end(): Promise<{ bytes: number; parts: number; sha256: string }>;
}

/** Makes the writer of one file inside the transaction that makes it. */
export function createPartWriter(tx: Tx, keys: InvestigationKeys, id: string): PartWriter {
  const hash = createHash("sha256");
  let held: string[] = [];
  let length = 0;
  let bytes = 0;
  let parts = 0;
  async function flush(): Promise<void> {
    if (held.length === 0) return;
    const plain = Buffer.from(held.join(""), "utf8");
    held = [];
    length = 0;
    hash.update(plain);
    bytes += plain.length;
    const sealed = seal(keys.seal, placeOf(id, parts), plain);
    await tx.execute(sql`select core.keep_export_part(${id}::uuid, ${parts}, ${sealed}::bytea)`);
    parts += 1;
  }
  return {
    async add(text) {
      held.push(text);
      length += text.length;
      if (length >= PART_BYTES) await flush();
    },
    async end() {
      await flush();
      return { bytes, parts, sha256: hash.digest("hex") };
    },
  };
}

/**
 * Reads a file part by part, each in a short transaction of its own: a slow reader holds no
 * connection, and somebody who signs out, or whose file is deleted, gets no further part.
 *
 * @throws Error when a part is gone
 */
export async function* readParts(
  context: TxContext,
  keys: InvestigationKeys,
  id: string,
  parts: number,
): AsyncGenerator<Buffer> {
  for (let part = 0; part < parts; part++) {
    const sealed = await withTx(context, async (tx) => {
      const found = await tx.execute<{ body: Buffer | null }>(
        sql`select core.read_export_part(${id}::uuid, ${part}) as body`,
      );
      return found.rows[0]?.body;
    });
    if (!sealed) throw new Error("a part of the file is gone");
    yield open(keys.seal, placeOf(id, part), sealed);
  }
}
