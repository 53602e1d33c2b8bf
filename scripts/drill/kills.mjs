/** Kills, hard, and brings back what was killed. */
import { clusterState, startCluster } from "../postgres.mjs";

const sleep = (ms) => new Promise((resolve) => setTimeout(resolve, ms));
export const KINDS = ["web", "worker", "backend", "postmaster", "all"];

const killGroup = (pid) => {
  try {
    process.kill(-pid, "SIGKILL");
  } catch {
    // Gone already.
  }
};

/** Ends a process and its children, and waits until it is gone; the supervisor does not bring it back by itself. */
async function killProcess(product, name) {
  const pid = product.supervised.pidOf(name);
  const gone = product.supervised.stopOne(name, "SIGKILL");
  if (pid) killGroup(pid);
  await gone;
}

function killPostmaster(product) {
  const now = clusterState(product.place);
  if (now.state === "running") process.kill(now.pid, "SIGKILL");
}

/** One of the application's own connections; killed hard, it takes all the others with it and the server starts over. */
async function killBackend(ask) {
  const [row] = await ask("select pid from pg_stat_activity where usename in ('vk_app', 'vk_job') and backend_type = 'client backend' order by query_start desc nulls last limit 1").catch(() => []);
  if (row) process.kill(row.pid, "SIGKILL");
  return Boolean(row);
}

async function databaseBack(product, ask) {
  for (let tries = 0; ; tries++) {
    try {
      await startCluster(product.place);
      await ask("select 1");
      return;
    } catch (error) {
      if (tries > 120) throw error;
      await sleep(250);
    }
  }
}

/**
 * @param product from openProduct; `ask` a query as superuser on a connection of its own
 * @returns `{ kind, downMs }`: from the kill until all of it is started again
 */
export async function kill(kind, product, ask) {
  const began = Date.now();
  if (kind === "web" || kind === "all") await killProcess(product, "web");
  if (kind === "worker" || kind === "all") await killProcess(product, "worker");
  if (kind === "postmaster" || kind === "all") killPostmaster(product);
  const hit = kind === "backend" ? await killBackend(ask) : true;
  if (["postmaster", "all", "backend"].includes(kind)) await databaseBack(product, ask);
  if (kind === "worker" || kind === "all") product.startWorker();
  if (kind === "web" || kind === "all") await product.startWeb();
  return { kind: hit ? kind : `${kind} (none there)`, downMs: Date.now() - began };
}
