export function isLoopback(host: string): boolean;
export function checkSettings(env: Record<string, string | undefined>): void;
