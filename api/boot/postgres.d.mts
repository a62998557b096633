export interface Cluster {
  /** Address of the database `slipstone`. */
  readonly url: string;
  readonly address: (database: string) => string;
  readonly stop: () => void;
}
export function startCluster(folder: string, options?: { throwAway?: boolean }): Promise<Cluster>;
export function isAlive(pid: number): boolean;
export function findFreePort(): Promise<number>;
export function isFree(port: number, host?: string): Promise<boolean>;
export function installPackages(packages: readonly string[], what: string): void;
