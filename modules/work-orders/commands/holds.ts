import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull } from "drizzle-orm";
import { holds, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { endHoldInput, holdInput } from "../input";

/** Work on a piece stands still for a reason, from now on. */
export const setHold = defineCommand({
  name: "holds.set",
  act: "floor.see",
  input: holdInput,
  async run(ctx, input) {
    const [piece] = await ctx.tx.select({ released: workPieces.releasedAt, gone: workPieces.handedOverAt }).from(workPieces)
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId))).for("update");
    if (!piece) return refuse("NOT_FOUND", "This piece is not here.");
    if (piece.gone) return refuse("PIECE_GONE", "This piece has left. There is nothing to hold.");
    const [same] = await ctx.tx.select({ id: holds.id }).from(holds)
      .where(and(eq(holds.shopId, ctx.shop.id), eq(holds.pieceId, input.pieceId), eq(holds.reason, input.reason), isNull(holds.endedAt)));
    if (same) return refuse("HELD_ALREADY", `It is on hold for ${input.reason} already.`, { field: "reason" });
    const id = randomUUID();
    await ctx.tx.insert(holds).values({ shopId: ctx.shop.id, id, pieceId: input.pieceId, reason: input.reason, words: input.words, since: ctx.now, setBy: personIdOf(ctx) });
    return ok({ id });
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});

export const endHold = defineCommand({
  name: "holds.end",
  act: "floor.see",
  input: endHoldInput,
  async run(ctx, input) {
    const [row] = await ctx.tx.update(holds).set({ endedAt: ctx.now, endedBy: personIdOf(ctx) })
      .where(and(eq(holds.shopId, ctx.shop.id), eq(holds.id, input.holdId), isNull(holds.endedAt))).returning({ pieceId: holds.pieceId });
    return row ? ok({ pieceId: row.pieceId }) : refuse("NOT_HELD", "This hold was ended already.");
  },
  subject: (_, value) => ({ kind: "piece", id: value.pieceId }),
});
