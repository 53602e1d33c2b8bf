import { checkBackup } from "./check";

const [, , folder = ""] = process.argv;
const superuser = (database: string): string => Object.assign(new URL(process.env.RESTORE_URL ?? ""), { pathname: `/${database}` }).toString();
const { faults, manifest, restoreSeconds } = await checkBackup({ folder, superuser, programs: process.env.BACKUP_PROGRAMS ?? "", scratch: `vk_restore_${process.pid}` });
const rows = Object.values(manifest.rows).reduce((a, b) => a + b, 0);
console.log(`Backup of ${manifest.madeAt}: ${rows} rows, ${manifest.files.length} files; restored in ${restoreSeconds.toFixed(1)} s`);
for (const fault of faults) console.log(`  ${fault}`);
console.log(faults.length === 0 ? "It holds: counts, digests, invariants and trails are as they were." : `${faults.length} faults.`);
if (faults.length > 0) process.exitCode = 1;
