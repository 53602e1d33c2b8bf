export interface Ports {
  web: number;
  mail: number;
  inbox: number;
  pay: number;
}
export interface Secrets {
  ownerPassword: string;
  appPassword: string;
  jobPassword: string;
  backupPassword: string;
  sessionSecret: string;
  pinPepper: string;
  paymentKey: string;
  paymentWebhookSecret: string;
}
type Environment = Record<string, string | undefined>;
export interface DatabaseUrls {
  VK_OWNER_URL: string;
  VK_DATABASE_URL: string;
  VK_JOB_DATABASE_URL: string;
  VK_BACKUP_URL: string;
}
export const PROJECT: string;
export const PORTS: Record<"product" | "test", Record<keyof Ports, [variable: string, fallback: number]>>;
export function portsFor(kind: "product" | "test", environment?: Environment): Ports;
export function loadSecrets(folder: string): Secrets;
export function outsideServices(environment?: Environment): { database: boolean; payments: boolean; mail: boolean; files: boolean };
export function databaseUrls(cluster: { port: number }, secrets: Secrets, name: string): DatabaseUrls;
export function assemble(options: {
  folder: string;
  ports: Ports;
  secrets: Secrets;
  database?: DatabaseUrls;
  clockFile?: string;
  environment?: Environment;
}): {
  env: Environment;
  workerEnv: Environment;
  ownerEnv: Environment;
  local: { database: boolean; mail: boolean; payments: boolean };
  addresses: { app: string; inbox: string; payments: string };
};
export function standInEnvironment(options: { folder: string; ports: Ports; secrets: Secrets; appUrl: string; clockFile?: string }): Environment;
