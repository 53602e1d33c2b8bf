import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { lots } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { minor } from "@/modules/kernel/money";
import { milli } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { receive } from "../domain/moving-average";
import { checkTakeable } from "./issue-stock";
import { lockOne, stockOf, today, writeMovement, type ShelfPart } from "./shelf";
import { shareOut } from "./share-out";

export interface ReceiveArgs {
  readonly partId: string;
  readonly qtyMilli: number;
  /** Price plus share of freight, for the whole quantity. */
  readonly landedMinor: number;
  readonly lot?: { readonly code: string; readonly expiresOn: string | null } | null;
  readonly kind: "receipt" | "opening";
  readonly receiptLineId?: string | null;
  readonly reason?: string;
}

/**
 * Puts goods on the shelf at their landed value and shares them out to the orders that wait. The caller posts the
 * journal entry of the whole receipt. Lot and expiry are asked for when the part keeps lots.
 */
export async function receiveStock(ctx: TxContext, args: ReceiveArgs): Promise<Result<{ movementId: string }>> {
  const part = await lockOne(ctx, args.partId);
  const fit = checkTakeable(part, args.qtyMilli);
  if (!fit.ok) return fit;
  const after = receive(stockOf(part), milli(args.qtyMilli), minor(args.landedMinor));
  if (!after.ok) return after;
  const lotId = await lotFor(ctx, part, args.lot ?? null);
  if (!lotId.ok) return lotId;
  const movementId = await writeMovement(ctx, {
    partId: part.partId, lotId: lotId.value, qtyMilli: args.qtyMilli, valueMinor: args.landedMinor, kind: args.kind, receiptLineId: args.receiptLineId ?? null, reason: args.reason ?? "",
  });
  await shareOut(ctx, [part.partId]);
  return ok({ movementId });
}

/** The lot the goods go into; made when it is new. A known lot keeps its date. */
async function lotFor(ctx: TxContext, part: ShelfPart, lot: { code: string; expiresOn: string | null } | null): Promise<Result<string | null>> {
  if (!part.lotTracked) return ok(null);
  if (!lot || lot.code === "") return refuse("LOT_MISSING", `${part.sku} is kept by lot. Type the lot number printed on it.`, { field: "lotCode" });
  if (lot.expiresOn && lot.expiresOn < today(ctx)) return refuse("LOT_EXPIRED", `Lot ${lot.code} expired on ${lot.expiresOn}. Refuse it, or check the date on the label.`, { field: "expiresOn" });
  const [known] = await ctx.tx.select({ id: lots.id, expiresOn: lots.expiresOn }).from(lots)
    .where(and(eq(lots.shopId, ctx.shop.id), eq(lots.partId, part.partId), eq(lots.code, lot.code)));
  if (known) {
    if (lot.expiresOn && known.expiresOn !== lot.expiresOn) {
      return refuse("LOT_EXPIRY_DIFFERS", `Lot ${lot.code} is on the shelf with ${known.expiresOn ?? "no expiry date"}. Type the same date, or check the lot number.`, { field: "expiresOn" });
    }
    return ok(known.id);
  }
  if (!lot.expiresOn) return refuse("EXPIRY_MISSING", `Type the date lot ${lot.code} expires, as printed on it.`, { field: "expiresOn" });
  const id = randomUUID();
  await ctx.tx.insert(lots).values({ shopId: ctx.shop.id, id, partId: part.partId, code: lot.code, expiresOn: lot.expiresOn });
  return ok(id);
}
