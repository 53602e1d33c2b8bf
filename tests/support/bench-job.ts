import { randomUUID } from "node:crypto";
import { customers, operations, workOrders, workPieces } from "@/db/schema";
import { withShop } from "@/db/scope";
import type { TestShop } from "./shop";

export interface BenchJob {
  workOrderId: string;
  pieceId: string;
  /** Id of the operation with that code. @throws when it was not asked for */
  op(code: string): string;
}

let made = 0;

/** A work order with one head and the operations named by code, put there directly: for tests of the clocks. */
export async function benchJob(shop: TestShop, codes: readonly (string | { code: string; needsBefore?: string[]; notBefore?: Date })[], tag?: string): Promise<BenchJob> {
  made += 1;
  const shopId = shop.shop.id;
  const ids = new Map<string, string>();
  const job: BenchJob = {
    workOrderId: randomUUID(), pieceId: randomUUID(),
    op(code) {
      const id = ids.get(code);
      if (!id) throw new Error(`no operation ${code}`);
      return id;
    },
  };
  await withShop(shopId, async (tx) => {
    const customerId = randomUUID();
    await tx.insert(customers).values({ shopId, id: customerId, name: `Customer ${made}`, nameKey: `customer ${made}` });
    await tx.insert(workOrders).values({ shopId, id: job.workOrderId, number: `WO-TEST-${made}`, customerId, openedAt: new Date("2026-02-17T16:00:00Z") });
    await tx.insert(workPieces).values({ shopId, id: job.pieceId, workOrderId: job.workOrderId, pieceNo: 1, tag: tag ?? `T-${made}`, family: "S250-4V" });
    for (const [i, c] of codes.entries()) {
      const { code, needsBefore = [], notBefore = null } = typeof c === "string" ? { code: c } : c;
      const id = randomUUID();
      ids.set(code, id);
      await tx.insert(operations).values({
        shopId, id, workOrderId: job.workOrderId, pieceId: job.pieceId, sequence: (i + 1) * 10, code, name: code.replaceAll("-", " "), station: "porting", skill: "porting",
        qtyMilli: 1000, bookMinutes: 60, priceMinor: 10_000, needsBefore, notBefore, notBeforeReason: notBefore ? "epoxy cure" : null,
      });
    }
  });
  return job;
}
