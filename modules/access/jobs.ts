import "server-only";
import { randomUUID } from "node:crypto";
import { jobs } from "@/db/schema";
import type { TxContext } from "./context";

/** Tasks a worker knows. Each is safe to run twice. */
export type Task = "mail.send" | "payments.openPage" | "payments.settleEvent" | "payments.payout" | "payments.refund" | "payments.reconcile" | "invoices.paper" | "estimates.paper" | "purchasing.paper";

/** Leaves work for later in the transaction of the fact that causes it. A dedupe key makes a repeat one job. */
export async function leaveJob(ctx: TxContext, task: Task, payload: Record<string, unknown>, options: { dedupeKey?: string; runAt?: Date } = {}): Promise<void> {
  await ctx.tx.insert(jobs).values({
    shopId: ctx.shop.id, id: randomUUID(), task, payload, dedupeKey: options.dedupeKey ?? null, ...(options.runAt ? { runAt: options.runAt } : {}),
  }).onConflictDoNothing();
}
