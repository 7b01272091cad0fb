import { hash, verify } from "@node-rs/argon2";

// OWASP's second parameter set for argon2id: 19 MiB, two passes, one lane.
const ARGON2ID = 2;
const OPTIONS = { algorithm: ARGON2ID, memoryCost: 19_456, timeCost: 2, parallelism: 1 };
const MOST_AT_ONCE = 4;

let running = 0;
const waiting: (() => void)[] = [];

/** Bounds memory and processor use: at most four hashes at once, the rest wait their turn. */
async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= MOST_AT_ONCE) await new Promise<void>((resolve) => waiting.push(resolve));
  running += 1;
  try {
    return await work();
  } finally {
    running -= 1;
    waiting.shift()?.();
  }
}

/** Hashes a password with argon2id. */
export function hashPassword(password: string): Promise<string> {
  return inTurn(() => hash(password, OPTIONS));
}

const dummy = hash("no account has this password", OPTIONS);

/**
 * Verifies a password. Without an account a fixed hash is verified instead, so that known and
 * unknown e-mails take the same time.
 */
export async function verifyPassword(stored: string | null, password: string): Promise<boolean> {
  const against = stored ?? (await dummy);
  const right = await inTurn(() => verify(against, password));
  return stored !== null && right;
}
