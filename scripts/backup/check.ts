import { spawnSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import path from "node:path";
import pg from "pg";
import { breaches } from "@/db/invariants";
import { chainFault, type KeptRow } from "@/modules/access/audit-chain";
import { sha256Of, type Manifest } from "./make";
import { differences, tablesOf } from "./tables";

export interface Checked { readonly faults: string[]; readonly manifest: Manifest; readonly restoreSeconds: number }

async function chainsOf(client: pg.Client): Promise<string[]> {
  const { rows: shops } = await client.query<{ id: string; slug: string }>("select id, slug from shops order by slug");
  const said: string[] = [];
  for (const shop of shops) {
    const { rows } = await client.query<KeptRow & Record<string, unknown>>(`select seq::int, at, actor, actor_name as "actorName", command, request_id as "requestId", subject_kind as "subjectKind", subject_id as "subjectId",
      note, detail, prev_hash as "prevHash", hash from audit_log where shop_id = $1 order by seq`, [shop.id]);
    const fault = chainFault(rows);
    if (fault) said.push(`The trail of ${shop.slug} is ${fault.why} at row ${fault.seq}`);
  }
  return said;
}

/** Bytes first: what is not whole is not restored. */
async function bytesOf(folder: string, manifest: Manifest): Promise<string[]> {
  const said: string[] = [];
  const look = async (file: string, wanted: string, name: string) => {
    if (!existsSync(file)) said.push(`${name} is missing`);
    else if ((await sha256Of(file)) !== wanted) said.push(`${name} is not as it was written`);
  };
  await look(path.join(folder, manifest.dump.file), manifest.dump.sha256, manifest.dump.file);
  for (const f of manifest.files) await look(path.join(folder, "files", f.key), f.sha256, `files/${f.key}`);
  return said;
}

/**
 * Restores a backup into a database of its own beside the others, compares it with what the manifest says, asks every
 * invariant and the chains of the trail, and drops it again.
 * @param o `superuser`: address of a role that may make databases, with `{database}` for the name
 */
export async function checkBackup(o: { folder: string; superuser: (database: string) => string; programs: string; scratch: string }): Promise<Checked> {
  const manifest = JSON.parse(readFileSync(path.join(o.folder, "manifest.json"), "utf8")) as Manifest;
  const faults = await bytesOf(o.folder, manifest);
  if (faults.length > 0) return { faults, manifest, restoreSeconds: 0 };
  const admin = new pg.Client({ connectionString: o.superuser("postgres") });
  await admin.connect();
  const started = process.hrtime.bigint();
  let restoreSeconds = 0;
  try {
    await admin.query(`drop database if exists "${o.scratch}" with (force)`);
    await admin.query(`create database "${o.scratch}" template template0`);
    const restored = spawnSync(path.join(o.programs, "pg_restore"), ["--exit-on-error", "--no-owner", `--dbname=${o.superuser(o.scratch)}`, path.join(o.folder, manifest.dump.file)], { encoding: "utf8", env: { NODE_ENV: "production", PATH: process.env.PATH, PGCONNECT_TIMEOUT: "10" } });
    restoreSeconds = Number(process.hrtime.bigint() - started) / 1e9;
    if (restored.status !== 0) return { faults: [`pg_restore did not finish: ${(restored.stderr || String(restored.error ?? "")).trim()}`], manifest, restoreSeconds };
    const there = new pg.Client({ connectionString: o.superuser(o.scratch) });
    await there.connect();
    try {
      faults.push(...differences(manifest, await tablesOf(there)), ...(await chainsOf(there)));
      // What waits for its turn waits on in a backup: only what holds at any moment is asked.
      for (const b of await breaches(there)) if (b.id !== "I-11" && b.id !== "I-17") faults.push(`${b.id} (${b.says}) does not hold: ${b.rows.length} rows`);
      const { rows } = await there.query<{ key: string }>("select storage_key as key from files union select thumb_key from files where thumb_key is not null");
      const have = new Set(manifest.files.map((f) => f.key));
      for (const { key } of rows) if (!have.has(key)) faults.push(`files/${key} is named by a row and not in the backup`);
    } finally {
      await there.end();
    }
    return { faults, manifest, restoreSeconds };
  } finally {
    await admin.query(`drop database if exists "${o.scratch}" with (force)`);
    await admin.end();
  }
}
