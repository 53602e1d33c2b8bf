import { readFile } from "node:fs/promises";
import path from "node:path";
import { drizzle } from "drizzle-orm/node-postgres";
import { migrate } from "drizzle-orm/node-postgres/migrator";
import pg from "pg";

/**
 * Brings a database up to the schema and seals it. Needs the owner's address; makes the working roles when their
 * passwords are given and the owner may. Two migrators at once wait for each other.
 */
export async function migrateDatabase(ownerUrl: string, passwords?: { app: string; job: string; backup: string }) {
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query("select pg_advisory_lock(706601)");
    await client.query("set lock_timeout = '5s'");
    if (passwords) {
      const roles = [["vk_app", passwords.app, "nobypassrls"], ["vk_job", passwords.job, "nobypassrls"], ["vk_backup", passwords.backup, "bypassrls"]] as const;
      for (const [role, password, rls] of roles) {
        const { rowCount } = await client.query("select 1 from pg_roles where rolname = $1", [role]);
        await client.query(`${rowCount ? "alter" : "create"} role ${role} with login nosuperuser nocreatedb nocreaterole noinherit ${rls} password ${client.escapeLiteral(password)}`);
      }
    }
    await migrate(drizzle(client), { migrationsFolder: path.join(import.meta.dirname, "..", "drizzle") });
    await client.query(await readFile(path.join(import.meta.dirname, "house.sql"), "utf8"));
  } finally {
    await client.end();
  }
}

if (process.argv[1] && path.resolve(process.argv[1]) === import.meta.filename) {
  const { VK_OWNER_URL, VK_APP_PASSWORD, VK_JOB_PASSWORD, VK_BACKUP_PASSWORD } = process.env;
  if (!VK_OWNER_URL) throw new Error("VK_OWNER_URL is not set: the address of the database for its owner, who migrates it.");
  await migrateDatabase(VK_OWNER_URL, VK_APP_PASSWORD && VK_JOB_PASSWORD && VK_BACKUP_PASSWORD
    ? { app: VK_APP_PASSWORD, job: VK_JOB_PASSWORD, backup: VK_BACKUP_PASSWORD } : undefined);
}
