import { createHash } from "node:crypto";
import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { clusterPlace, databaseUrl, ensureRoles, sql, startCluster, type Cluster } from "@/scripts/postgres.mjs";

/** The tests' own cluster is thrown away at will and listens on loopback only, so its passwords may stand here. */
export const PASSWORDS = { owner: "test-owner", app: "test-app", job: "test-job", backup: "test-backup" } as const;

export const openTestCluster = (): Promise<Cluster> => startCluster(clusterPlace("test"));

const ROOT = path.resolve(import.meta.dirname, "../..");

/** Names the template by what it is made from, so that a changed schema gets a new one. */
export function templateName(): string {
  const hash = createHash("sha256");
  const add = (file: string) => hash.update(`${file}\0`).update(readFileSync(path.join(ROOT, file)));
  for (const file of readdirSync(path.join(ROOT, "drizzle"), { recursive: true }).map(String).sort()) {
    if (file.endsWith(".sql") || file.endsWith(".json")) add(path.join("drizzle", file));
  }
  add("db/house.sql");
  add("db/migrate.ts");
  return `vk_template_${hash.digest("hex").slice(0, 12)}`;
}

export const urlOf = (cluster: Cluster, role: keyof typeof PASSWORDS, database: string): string =>
  databaseUrl(cluster, `vk_${role}`, PASSWORDS[role], database);

export const superuserUrl = (cluster: Cluster, database: string): string => databaseUrl(cluster, "postgres", cluster.password, database);

export function makeRoles(cluster: Cluster): void {
  ensureRoles(cluster, PASSWORDS);
}

export function databasesLike(cluster: Cluster, pattern: string): string[] {
  const rows = sql(cluster, `select datname from pg_database where datname like '${pattern}' order by 1;`);
  return rows === "" ? [] : rows.split("\n");
}

/** A copy of a template by file copy: a few hundredths of a second. Nobody may be connected to the template. */
export function copyDatabase(cluster: Cluster, name: string, template: string): void {
  sql(cluster, `create database ${name} template ${template} strategy file_copy owner vk_owner;`);
}

export function dropDatabase(cluster: Cluster, name: string): void {
  sql(cluster, `drop database if exists ${name} with (force);`);
}
