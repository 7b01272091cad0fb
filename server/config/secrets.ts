import { randomBytes } from "node:crypto";
import { chmodSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { z } from "zod";
import { LOGIN_NAMES, type LoginPasswords } from "../db/roles.ts";

const schema = z.object({
  masterKey: z.base64(),
  sessionSecrets: z.array(z.string().min(32)).min(1),
  logins: z.record(z.string(), z.string().min(16)),
});

/** What an installation keeps outside its database; losing `masterKey` loses every identity. */
export interface Secrets {
  masterKey: Buffer;
  sessionSecrets: string[];
  logins: LoginPasswords;
}

/**
 * Reads the secrets of a data folder, or makes them at the first start (file mode 0600).
 *
 * @throws Error with one clear line when the file is unreadable or the key is short or all zero
 */
export function loadSecrets(dataDir: string): Secrets {
  const file = join(dataDir, "secrets.json");
  if (!existsSync(file)) {
    mkdirSync(dataDir, { recursive: true });
    const fresh = {
      masterKey: randomBytes(32).toString("base64"),
      sessionSecrets: [randomBytes(32).toString("base64url")],
      logins: Object.fromEntries(
        LOGIN_NAMES.map((name) => [name, randomBytes(24).toString("base64url")]),
      ),
    };
    // Written aside and renamed, so that a crash leaves either no file or a whole one.
    const part = `${file}.${process.pid}`;
    writeFileSync(part, `${JSON.stringify(fresh, null, 2)}\n`, { mode: 0o600, flag: "wx" });
    renameSync(part, file);
    chmodSync(file, 0o600);
  }
  let parsed: z.output<typeof schema>;
  try {
    parsed = schema.parse(JSON.parse(readFileSync(file, "utf8")));
  } catch {
    throw new Error(`${file} cannot be read as Strandline's secrets; restore it from its backup`);
  }
  const masterKey = Buffer.from(parsed.masterKey, "base64");
  if (masterKey.length !== 32 || masterKey.every((byte) => byte === 0)) {
    throw new Error(`the master key in ${file} is not 32 random bytes`);
  }
  for (const name of LOGIN_NAMES) {
    if (!parsed.logins[name]) throw new Error(`${file} has no password for the login ${name}`);
  }
  return {
    masterKey,
    sessionSecrets: parsed.sessionSecrets,
    logins: parsed.logins as LoginPasswords,
  };
}
