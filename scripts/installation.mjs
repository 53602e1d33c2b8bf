/** The installation that a command works on: what the environment names, or the project's own cluster and data folder. */
import path from "node:path";
import { spawnSync } from "node:child_process";
import { assemble, databaseUrls, loadSecrets, outsideServices, portsFor, PROJECT } from "./environment.mjs";
import { clusterPlace, clusterState, databaseUrl, newestPrograms, startCluster, stopCluster } from "./postgres.mjs";
import { Problem } from "./say.mjs";

const DATABASE = "valvekeeper";
export const DATA_FOLDER = path.join(PROJECT, ".data");

/**
 * @param need names of addresses the command cannot do without when the database is outside
 * @returns `env` with every setting, `urls`, `programs` (folder of PostgreSQL's programs), `superuser(database)` or null, `close`
 */
export async function openInstallation(need = []) {
  const secrets = loadSecrets(DATA_FOLDER);
  const outside = need.some((name) => process.env[name]) || outsideServices().database;
  if (outside) {
    const missing = need.filter((name) => !process.env[name]);
    if (missing.length > 0) throw new Problem(`${missing.join(" and ")} ${missing.length > 1 ? "are" : "is"} not set.`);
    const { ownerEnv } = assemble({ folder: DATA_FOLDER, ports: portsFor("product"), secrets, database: process.env });
    const restore = process.env.VK_RESTORE_URL;
    return {
      env: ownerEnv, urls: process.env, programs: newestPrograms(), close: () => {},
      superuser: restore ? (name) => Object.assign(new URL(restore), { pathname: `/${name}` }).toString() : null,
    };
  }
  const place = clusterPlace("product");
  const startedHere = clusterState(place).state !== "running";
  const cluster = await startCluster(place);
  const urls = databaseUrls(cluster, secrets, DATABASE);
  const { ownerEnv } = assemble({ folder: DATA_FOLDER, ports: portsFor("product"), secrets, database: urls });
  return {
    env: ownerEnv, urls, programs: cluster.bin, superuser: (name) => databaseUrl(cluster, "postgres", cluster.password, name),
    close: () => { if (startedHere) stopCluster(place); },
  };
}

/** Runs one of our TypeScript programs with its words shown as they come. @throws Problem when it fails */
export function runHere(file, env, args, failure) {
  const done = spawnSync(process.execPath, ["--conditions=react-server", "--import", "tsx", file, ...args], { cwd: PROJECT, env, stdio: "inherit" });
  if (done.status !== 0) throw new Problem(failure);
}
