export function packagesComplete(root: string, options: { dev: boolean }): boolean;
