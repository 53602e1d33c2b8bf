/**
 * Dumps the database as `vk_backup` and copies the files, with a manifest of rows, digests and hashes.
 *
 *   npm run backup -- FOLDER        FOLDER must not exist yet
 *
 * An outside database is named by VK_BACKUP_URL (role vk_backup).
 */
import path from "node:path";
import { openInstallation, runHere } from "./installation.mjs";
import { Problem, run } from "./say.mjs";

await run(async () => {
  const folder = process.argv[2];
  if (!folder || folder.startsWith("-")) throw new Problem("Usage: npm run backup -- FOLDER");
  const here = await openInstallation(["VK_BACKUP_URL"]);
  try {
    runHere("scripts/backup/run-make.ts", { ...here.env, BACKUP_URL: here.urls.VK_BACKUP_URL, BACKUP_PROGRAMS: here.programs }, [path.resolve(folder)], "There is no backup.");
  } finally {
    here.close();
  }
});
