/**
 * Restores a backup into a database of its own, compares it with its manifest, asks every invariant, drops it again.
 *
 *   npm run restore:check -- FOLDER
 *
 * Without the project's own cluster, VK_RESTORE_URL names a superuser of the server to restore in.
 */
import path from "node:path";
import { openInstallation, runHere } from "./installation.mjs";
import { Problem, run } from "./say.mjs";

await run(async () => {
  const folder = process.argv[2];
  if (!folder || folder.startsWith("-")) throw new Problem("Usage: npm run restore:check -- FOLDER");
  const here = await openInstallation(process.env.VK_RESTORE_URL ? ["VK_RESTORE_URL"] : []);
  try {
    if (!here.superuser) throw new Problem("Restoring makes a database: set VK_RESTORE_URL to the address of a superuser.");
    runHere("scripts/backup/run-check.ts", { ...here.env, RESTORE_URL: here.superuser("postgres"), BACKUP_PROGRAMS: here.programs }, [path.resolve(folder)], "The backup does not hold.");
  } finally {
    here.close();
  }
});
