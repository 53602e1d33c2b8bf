/**
 * The test clock: a file with an ISO instant. Processes started with VK_CLOCK_FILE naming it take that instant as now,
 * and time runs on from the moment the file was written. Without the file, or with an empty one, it is the real time.
 *
 *   node scripts/clock.mjs FILE                       shows it
 *   node scripts/clock.mjs FILE 2026-03-13T15:00:00Z  sets it
 *   node scripts/clock.mjs FILE real                  takes it away
 */
import fs from "node:fs";
import path from "node:path";
import { Problem, run } from "./say.mjs";

export function setClock(file, instant) {
  const date = new Date(instant);
  if (Number.isNaN(date.getTime())) throw new Problem(`"${instant}" is not an instant. Write it like 2026-03-13T15:00:00Z.`);
  fs.mkdirSync(path.dirname(file), { recursive: true });
  // Whoever reads it in between sees the old time or the new one, never half a line.
  fs.writeFileSync(`${file}.new`, date.toISOString());
  fs.renameSync(`${file}.new`, file);
}

export const clearClock = (file) => fs.rmSync(file, { force: true });

if (process.argv[1] && path.resolve(process.argv[1]) === import.meta.filename) {
  await run(async () => {
    const [, , file, instant] = process.argv;
    if (!file) throw new Problem("Usage: node scripts/clock.mjs FILE [INSTANT|real]");
    if (instant === "real") clearClock(file);
    else if (instant) setClock(file, instant);
    console.log(fs.existsSync(file) ? `${fs.readFileSync(file, "utf8").trim()} since ${fs.statSync(file).mtime.toISOString()}` : "real time");
  });
}
