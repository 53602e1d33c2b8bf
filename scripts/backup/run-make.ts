import { filePort } from "@/modules/documents/ports";
import { BackupRefused, makeBackup } from "./make";

const [, , folder = ""] = process.argv;
try {
  const m = await makeBackup({ backupUrl: process.env.BACKUP_URL ?? "", programs: process.env.BACKUP_PROGRAMS ?? "", files: filePort(), folder, now: new Date() });
  const rows = Object.values(m.rows).reduce((a, b) => a + b, 0);
  console.log(`Backup in ${folder}: ${rows} rows of ${Object.keys(m.rows).length} tables, dump of ${m.dump.bytes} bytes, ${m.files.length} files`);
} catch (error) {
  if (!(error instanceof BackupRefused)) throw error;
  console.error(error.message);
  process.exitCode = 1;
}
