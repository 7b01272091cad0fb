export type Cluster = {
  /** Connection string of the superuser. */
  url: string;
  port: number;
  /** Identity of the postmaster process. */
  identity: string;
  /** Folder of the cluster. */
  dir: string;
  /** It already ran. */
  reused: boolean;
};
export function freePort(): Promise<number>;
export function startCluster(
  dir: string,
  options?: { port?: number; throwAway?: boolean },
): Promise<Cluster>;
export function runningCluster(dir: string): Promise<Cluster | undefined>;
export function stopCluster(dir: string, options?: { force?: boolean }): Promise<boolean>;
export function removeCluster(dir: string): Promise<void>;
