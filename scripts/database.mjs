/** The product's database in its cluster: made, migrated, and told the demo once. */
import { spawn } from "node:child_process";
import path from "node:path";
import { ensureDatabase, ensureRoles, sql, startCluster } from "./postgres.mjs";
import { Problem, say } from "./say.mjs";

const PROJECT = path.resolve(import.meta.dirname, "..");

/** How far the demo is in a database, kept as the database's own comment. */
const MARKS = { wanted: "demo wanted", loaded: "demo loaded", none: "no demo" };

/** Start the cluster and make sure of roles and database. */
export async function openDatabase(place, secrets, name) {
  const cluster = await startCluster(place);
  ensureRoles(cluster, { owner: secrets.ownerPassword, app: secrets.appPassword, job: secrets.jobPassword, backup: secrets.backupPassword });
  const mark = () => sql(cluster, `select coalesce(shobj_description(oid, 'pg_database'), '') from pg_database where datname = '${name}';`);
  // A demo that was interrupted half-way: nobody can have worked in it yet, so begin anew.
  if (mark() === MARKS.wanted) sql(cluster, `drop database ${name} with (force);`);
  if (ensureDatabase(cluster, name)) {
    say("Made a new database");
    sql(cluster, `comment on database ${name} is '${process.env.VK_DEMO === "0" ? MARKS.none : MARKS.wanted}';`);
  }
  return cluster;
}

/** Run one of our TypeScript programs to its end. Returns what it printed. */
export function runTypescript(file, env, failure, conditions = []) {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [...conditions.map((c) => `--conditions=${c}`), "--import", "tsx", file], { cwd: PROJECT, env, stdio: ["ignore", "pipe", "pipe"] });
    let out = "";
    let err = "";
    child.stdout.on("data", (chunk) => { out += chunk; });
    child.stderr.on("data", (chunk) => { err += chunk; });
    child.once("error", reject);
    child.once("close", (code) => (code === 0 ? resolve(out) : reject(new Problem(`${failure}\n${`${out}\n${err}`.trim()}`))));
  });
}

/**
 * Bring the database up to date. In a cluster of ours the roles are made already; outside, the owner makes them when
 * VK_APP_PASSWORD, VK_JOB_PASSWORD and VK_BACKUP_PASSWORD are given.
 */
export async function migrate(ownerEnv, environment = process.env) {
  const { VK_APP_PASSWORD, VK_JOB_PASSWORD, VK_BACKUP_PASSWORD } = environment;
  await runTypescript("db/migrate.ts", { ...ownerEnv, ...(VK_APP_PASSWORD && VK_JOB_PASSWORD && VK_BACKUP_PASSWORD ? { VK_APP_PASSWORD, VK_JOB_PASSWORD, VK_BACKUP_PASSWORD } : {}) }, "The database could not be brought up to date:");
}

async function ask(ownerEnv, text, values) {
  const { default: pg } = await import("pg");
  const client = new pg.Client({ connectionString: ownerEnv.VK_OWNER_URL, connectionTimeoutMillis: 10_000 });
  await client.connect();
  try {
    return (await client.query(text, values)).rows;
  } finally {
    await client.end();
  }
}

/** Whether the demo is still to be loaded. An outside database gets it only when asked for, and only when empty. */
export async function demoWanted(ownerEnv, outside) {
  const [row] = await ask(ownerEnv, "select shobj_description(oid, 'pg_database') as mark from pg_database where datname = current_database()");
  if (!outside) return row?.mark === MARKS.wanted;
  if (process.env.VK_DEMO !== "1" || row?.mark === MARKS.loaded) return false;
  const [{ n }] = await ask(ownerEnv, "select count(*)::int as n from shops");
  if (n > 0) throw new Problem("VK_DEMO=1 is set, but the database holds a shop already. The demo is only loaded into an empty one.");
  return true;
}

export async function markDemo(ownerEnv, mark) {
  await ask(ownerEnv, `do $$ begin execute format('comment on database %I is %L', current_database(), '${MARKS[mark]}'); end $$`);
}

export async function seedDemo(ownerEnv) {
  await runTypescript("seed/run.ts", ownerEnv, "The demo shop could not be loaded:", ["react-server"]);
}
