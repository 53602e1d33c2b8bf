import "server-only";
import { readFileSync } from "node:fs";
import { env } from "./env";

let start: { file: number; real: number; text: string } | undefined;

/** Now. A test may hand the process an instant through a file; time then runs on from it. */
export function now(): Date {
  const file = env().VK_CLOCK_FILE;
  if (!file) return new Date();
  const text = readFileSync(file, "utf8").trim();
  if (!text) return new Date();
  if (start?.text !== text) start = { file: new Date(text).getTime(), real: Date.now(), text };
  return new Date(start.file + (Date.now() - start.real));
}
