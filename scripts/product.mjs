/** A whole product beside the one people use: own database, ports and files. For the journeys, the drill and the benchmark. */
import fs from "node:fs";
import path from "node:path";
import { assemble, databaseUrls, loadSecrets, PROJECT, standInEnvironment } from "./environment.mjs";
import { migrate, runTypescript } from "./database.mjs";
import { clusterPlace, clusterState, ensureDatabase, ensureRoles, sql, startCluster } from "./postgres.mjs";
import { freeFrom } from "./ports.mjs";
import { ensureServer } from "./prepare.mjs";
import { supervisor } from "./supervise.mjs";
import { say } from "./say.mjs";

/** The tests' cluster is shared by all its users, so its passwords are fixed: the same as in tests/support/test-cluster.ts. */
const TEST_PASSWORDS = { ownerPassword: "test-owner", appPassword: "test-app", jobPassword: "test-job", backupPassword: "test-backup" };

export const TEST_FOLDER = path.join(PROJECT, ".test");

/**
 * @param options `name` of the database, made anew; `place` of its cluster (the tests' own when left out);
 *   `ports` to begin looking for free ones; `clock` gives it a test clock; `demo` loads the demo shops;
 *   `serve: false` leaves out web and worker (start them with the returned `supervised`); `fromSources` serves by the
 *   development server, without a build.
 */
export async function openProduct({ name, place = clusterPlace("test"), ports: from, folder = path.join(TEST_FOLDER, name), clock = false, demo = false, serve = true, fromSources = false }) {
  const startedHere = clusterState(place).state !== "running";
  const supervised = supervisor({ logs: path.join(folder, "logs"), quiet: true });
  if (startedHere) supervised.adoptCluster(place);
  try {
    const cluster = await startCluster(place);
    const own = { ...loadSecrets(folder), ...(place.durable ? {} : TEST_PASSWORDS) };
    ensureRoles(cluster, { owner: own.ownerPassword, app: own.appPassword, job: own.jobPassword, backup: own.backupPassword });
    sql(cluster, `drop database if exists ${name} with (force);`);
    ensureDatabase(cluster, name);
    for (const kept of ["mail", "payments.json", "files"]) fs.rmSync(path.join(folder, kept), { recursive: true, force: true });
    const ports = {};
    let next = 0;
    for (const [what, port] of Object.entries(from)) {
      ports[what] = await freeFrom(Math.max(port, next));
      next = ports[what] + 1;
    }
    const clockFile = clock ? path.join(folder, "clock") : undefined;
    if (clockFile) fs.rmSync(clockFile, { force: true });
    // Keys of the surroundings must not reach a product that tests may do anything with.
    const environment = Object.fromEntries(Object.entries(process.env).filter(([key]) => !/^(VK_|STRIPE_|SMTP_|S3_|NEXTAUTH_)/.test(key)));
    const parts = assemble({ folder, ports, secrets: own, database: databaseUrls(cluster, own, name), clockFile, environment });
    await migrate(parts.ownerEnv, {});
    const standIns = standInEnvironment({ folder, ports, secrets: own, appUrl: parts.addresses.app, clockFile });
    supervised.start("mail", { env: standIns });
    supervised.start("payments", { env: standIns });
    await supervised.waitFor("mail", parts.addresses.inbox);
    await supervised.waitFor("payments", parts.addresses.payments);
    if (demo) {
      say("Loading the demo shops");
      await runTypescript("seed/run.ts", parts.ownerEnv, "The demo shops could not be loaded:", ["react-server"]);
    }
    const server = fromSources ? PROJECT : await ensureServer(TEST_FOLDER);
    const web = fromSources ? { args: [path.join(PROJECT, "node_modules/next/dist/bin/next"), "dev", "-p", String(ports.web), "-H", "127.0.0.1"], NODE_ENV: "development" } : { NODE_ENV: "production" };
    const product = {
      ...parts, server, ports, cluster, place, folder, clockFile, supervised,
      startWeb: async () => {
        supervised.start("web", { server, args: web.args, env: { ...parts.env, NODE_ENV: web.NODE_ENV, PORT: String(ports.web), HOSTNAME: "127.0.0.1" } });
        await supervised.waitFor("web", `http://127.0.0.1:${ports.web}/api/health`);
      },
      startWorker: () => supervised.start("worker", { env: parts.workerEnv }),
      close: () => supervised.stop(),
    };
    if (serve) {
      await product.startWeb();
      product.startWorker();
    }
    return product;
  } catch (error) {
    await supervised.stop();
    throw error;
  }
}
