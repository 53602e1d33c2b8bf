import "server-only";
import { randomUUID } from "node:crypto";

/** The messages behind an error, nearest first; undefined when there is none. */
function causesOf(error: Error): string | undefined {
  const causes: string[] = [];
  for (let e = error.cause; e instanceof Error && causes.length < 4; e = e.cause) causes.push(e.message.slice(0, 1000));
  return causes.length ? causes.join("; from: ") : undefined;
}

/** Logs a fault under a short reference; the person sees the reference, never the words. */
export function logFault(where: string, error: unknown, more: Record<string, unknown> = {}): string {
  const reference = randomUUID().slice(0, 8);
  const e = error instanceof Error ? { name: error.name, message: error.message.slice(0, 2000), stack: error.stack?.slice(0, 4000), cause: causesOf(error) } : { message: String(error).slice(0, 2000) };
  console.error(JSON.stringify({ at: new Date().toISOString(), event: "fault", reference, where, ...more, ...e }));
  return reference;
}
