export interface ClusterPlace {
  base: string;
  port: number;
  variable: string;
  durable: boolean;
}
export interface Cluster {
  base: string;
  bin: string;
  port: number;
  password: string;
  fresh: boolean;
}
export function clusterPlace(kind: "product" | "test", environment?: NodeJS.ProcessEnv): ClusterPlace;
export function startCluster(place: ClusterPlace): Promise<Cluster>;
export function stopCluster(place: ClusterPlace, mode?: "fast" | "smart" | "immediate"): boolean;
export function clusterState(place: ClusterPlace): { state: "stopped" | "running" | "stale" | "reused" | "unburied"; pid?: number; port?: number };
export function sql(cluster: Cluster, text: string, database?: string): string;
export function ensureRoles(cluster: Cluster, passwords: { owner: string; app: string; job: string; backup: string }): void;
export function ensureDatabase(cluster: Cluster, name: string): boolean;
export function databaseUrl(cluster: Pick<Cluster, "port">, role: string, password: string, name: string): string;
