import { migrateDatabase } from "@/db/migrate";
import { ensureDatabase, sql } from "@/scripts/postgres.mjs";
import { databasesLike, dropDatabase, makeRoles, openTestCluster, templateName, urlOf } from "./test-cluster";

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

/** The run that made a copy is in its name; copies of runs that are gone go too. */
const makerOf = (copy: string): number => Number(copy.split("_")[2]);

/** Before the integration tests: the cluster, and a migrated template to copy. After them: the copies go. */
export default async function setup() {
  const cluster = await openTestCluster();
  makeRoles(cluster);
  const copies = databasesLike(cluster, "vk\\_w\\_%");
  const left = copies.filter((copy) => !isAlive(makerOf(copy)));
  for (const copy of left) dropDatabase(cluster, copy);

  const name = templateName();
  const known = databasesLike(cluster, "vk\\_template\\_%");
  // Another run beside this one may still be copying from an older template.
  if (left.length === copies.length) for (const old of known) if (old !== name) dropDatabase(cluster, old);
  if (!known.includes(name)) {
    const half = `vk_half_${process.pid}`;
    dropDatabase(cluster, half);
    ensureDatabase(cluster, half);
    await migrateDatabase(urlOf(cluster, "owner", half));
    if (databasesLike(cluster, name.replaceAll("_", "\\_")).length > 0) dropDatabase(cluster, half);
    else sql(cluster, `alter database ${half} rename to ${name};`);
  }
  process.env.VK_TEST_TEMPLATE = name;
  const own = process.pid;
  return () => {
    for (const copy of databasesLike(cluster, `vk\\_w\\_${own}\\_%`)) dropDatabase(cluster, copy);
  };
}
