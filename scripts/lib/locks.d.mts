export type LockHolder = { pid: number; identity: string };
export class LockHeldError extends Error {
  holder: LockHolder & Record<string, unknown>;
}
export type Lock = { update(extra: object): void; release(): void };
export function takeLock(
  file: string,
  patience: (holder: LockHolder & Record<string, unknown>) => number,
): Promise<Lock>;
