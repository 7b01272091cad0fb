export function ensureClientBuild(root: string): Promise<void>;
