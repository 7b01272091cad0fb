export function processIdentity(pid: number): string | undefined;
export function isAlive(identity: string | undefined): boolean;
