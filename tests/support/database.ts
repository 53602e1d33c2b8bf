import { sql } from "@/scripts/postgres.mjs";
import { copyDatabase, openTestCluster, superuserUrl, urlOf } from "./test-cluster";

export interface TestDatabase {
  readonly name: string;
  /** Migrates; owns the tables. Row security binds it too. */
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly jobUrl: string;
  readonly backupUrl: string;
  /** Sees and may do everything: only for arranging and for looking behind the curtain. */
  readonly superuserUrl: string;
}

let made = 0;

/**
 * A fresh, migrated, empty database. Points this process at it: whatever opens a connection afterwards, opens it there.
 * Each integration test file has one already when it begins (`currentDatabase`); call this for another fresh one,
 * after closing the application's pool.
 */
export async function testDatabase(): Promise<TestDatabase> {
  const template = process.env.VK_TEST_TEMPLATE;
  if (!template) throw new Error("There is no template: run integration tests with vitest's project `integration`.");
  const cluster = await openTestCluster();
  made += 1;
  const name = `vk_w_${process.ppid}_${process.pid}_${made}_${Date.now().toString(36)}`;
  copyDatabase(cluster, name, template);
  const database: TestDatabase = {
    name,
    ownerUrl: urlOf(cluster, "owner", name),
    appUrl: urlOf(cluster, "app", name),
    jobUrl: urlOf(cluster, "job", name),
    backupUrl: urlOf(cluster, "backup", name),
    superuserUrl: superuserUrl(cluster, name),
  };
  process.env.VK_DATABASE_URL = database.appUrl;
  process.env.VK_JOB_DATABASE_URL = database.jobUrl;
  current = database;
  return database;
}

let current: TestDatabase | undefined;

/** The database of this test file. */
export function currentDatabase(): TestDatabase {
  if (current === undefined) throw new Error("no test database yet");
  return current;
}

/** Rows of one column of SQL run as superuser, as text, one a line. For arranging and checking, not for the code under test. */
export async function behindTheCurtain(text: string): Promise<string[]> {
  const out = sql(await openTestCluster(), text, currentDatabase().name);
  return out === "" ? [] : out.split("\n");
}
