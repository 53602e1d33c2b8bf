import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { createReadStream, existsSync, mkdirSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import pg from "pg";
import type { FilePort } from "@/modules/outbound/files/port";
import { tablesOf, type Tables } from "./tables";

export interface Manifest extends Tables {
  readonly madeAt: string;
  readonly database: string;
  readonly server: string;
  readonly dump: { readonly file: string; readonly bytes: number; readonly sha256: string };
  readonly files: readonly { readonly key: string; readonly bytes: number; readonly sha256: string }[];
}

export class BackupRefused extends Error {}

/** SHA-256 of a file on disk, read in pieces. */
export async function sha256Of(file: string): Promise<string> {
  const hash = createHash("sha256");
  for await (const chunk of createReadStream(file)) hash.update(chunk as Buffer);
  return hash.digest("hex");
}

/** A role that sees one shop at a time would dump a part and say nothing. */
async function mustSeeAll(client: pg.Client): Promise<void> {
  const { rows: [role] } = await client.query<{ name: string; sees: boolean }>("select rolname as name, rolbypassrls or rolsuper as sees from pg_roles where rolname = current_user");
  if (!role?.sees) throw new BackupRefused(`${role?.name ?? "This role"} is bound by row security: its dump would be a part of the whole. Dump as vk_backup (VK_BACKUP_URL).`);
}

/**
 * Dumps the database and copies the files into a folder that does not exist yet. Counts and digests are of the very
 * snapshot that is dumped; a file whose bytes are gone or changed stops it.
 */
export async function makeBackup(o: { backupUrl: string; programs: string; files: FilePort; folder: string; now: Date }): Promise<Manifest> {
  if (existsSync(o.folder)) throw new BackupRefused(`${o.folder} is there already. A backup never writes over another: name a new folder.`);
  const client = new pg.Client({ connectionString: o.backupUrl, connectionTimeoutMillis: 10_000 });
  await client.connect();
  const half = `${o.folder}.half`;
  rmSync(half, { recursive: true, force: true });
  mkdirSync(path.join(half, "files"), { recursive: true, mode: 0o700 });
  try {
    await mustSeeAll(client);
    await client.query("begin isolation level repeatable read read only");
    const { rows: [about] } = await client.query<{ snapshot: string; database: string; server: string }>("select pg_export_snapshot() as snapshot, current_database() as database, current_setting('server_version') as server");
    if (!about) throw new BackupRefused("The database gave no snapshot.");
    const file = "database.dump";
    // Without --enable-row-security: were the role bound after all, the dump would fail instead of being a part.
    const dumped = spawnSync(path.join(o.programs, "pg_dump"), ["--format=custom", `--snapshot=${about.snapshot}`, `--file=${path.join(half, file)}`, `--dbname=${o.backupUrl}`], { encoding: "utf8", env: { NODE_ENV: "production", PATH: process.env.PATH, PGCONNECT_TIMEOUT: "10" } });
    if (dumped.status !== 0) throw new BackupRefused(`pg_dump did not finish: ${(dumped.stderr || String(dumped.error ?? "")).trim()}`);
    const tables = await tablesOf(client);
    const { rows: kept } = await client.query<{ storage_key: string; thumb_key: string | null; sha256: string }>("select storage_key, thumb_key, sha256 from files order by storage_key");
    const files: Manifest["files"][number][] = [];
    for (const row of kept) {
      for (const [key, wanted] of [[row.storage_key, row.sha256], ...(row.thumb_key ? [[row.thumb_key, null] as const] : [])] as const) {
        const bytes = await o.files.get(key);
        if (!bytes) throw new BackupRefused(`The bytes of file ${key} are gone.`);
        const sha256 = createHash("sha256").update(bytes).digest("hex");
        if (wanted && wanted !== sha256) throw new BackupRefused(`The bytes of file ${key} are not those that were stored.`);
        const to = path.join(half, "files", key);
        mkdirSync(path.dirname(to), { recursive: true, mode: 0o700 });
        writeFileSync(to, bytes, { mode: 0o600 });
        files.push({ key, bytes: bytes.length, sha256 });
      }
    }
    await client.query("commit");
    const dump = { file, bytes: statSync(path.join(half, file)).size, sha256: await sha256Of(path.join(half, file)) };
    const manifest: Manifest = { madeAt: o.now.toISOString(), database: about.database, server: about.server, dump, ...tables, files };
    writeFileSync(path.join(half, "manifest.json"), `${JSON.stringify(manifest, null, 2)}\n`, { mode: 0o600 });
    // Only a whole backup gets the name.
    renameSync(half, o.folder);
    return manifest;
  } catch (error) {
    rmSync(half, { recursive: true, force: true });
    throw error;
  } finally {
    await client.end();
  }
}
