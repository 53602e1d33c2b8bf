import "server-only";
import { logFault } from "@/modules/access/fault";
import { allowed } from "@/modules/access/rate-limit";
import { reconcile } from "@/modules/payments/reconcile";

/** What runs by the clock, once in each span whichever worker comes first. Each is safe to run twice. */
const REGULAR = [{ name: "payments.reconcile", everySeconds: 15 * 60, run: reconcile }] as const;
const looked = new Map<string, number>();

/** Runs what is due; called whenever the worker has nothing else to do. A failure is logged and tried at the next turn. */
export async function runDue(atMs: number): Promise<void> {
  for (const task of REGULAR) {
    // The database is asked once a minute, not at every idle turn.
    if (atMs - (looked.get(task.name) ?? 0) < 60_000) continue;
    looked.set(task.name, atMs);
    try {
      if (await allowed(`schedule:${task.name}`, 1, task.everySeconds)) await task.run();
    } catch (error) {
      logFault(task.name, error);
    }
  }
}
