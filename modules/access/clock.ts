import "server-only";
import { readFileSync, statSync } from "node:fs";
import { env } from "./env";

/**
 * Now. A test may hand the process an instant through a file; time then runs on from the moment the file was written, so
 * that all processes that read it agree.
 */
export function now(): Date {
  const file = env().VK_CLOCK_FILE;
  if (!file) return new Date();
  try {
    const text = readFileSync(file, "utf8").trim();
    return text ? new Date(new Date(text).getTime() + (Date.now() - statSync(file).mtimeMs)) : new Date();
  } catch {
    return new Date();
  }
}
