import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, sql } from "drizzle-orm";
import { customers, estimates, inspections, links, operations, workOrders, workPieces } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { linkAddress } from "@/modules/access/link";
import { queueMail } from "@/modules/documents/mail";
import { ok, refuse } from "@/modules/kernel/result";
import { CHECKLIST, missingForRelease } from "../domain/release-check";
import { refuseReleaseInput, releaseInput, reopenPieceInput } from "../input";
import { releaseFactsOf } from "../queries/release-facts";

/**
 * Final inspection passed: the piece is proved, read only and ready for the counter. Refused with each thing that is
 * missing. Whoever ported it does not release it; in a shop of one it is allowed and marked.
 */
export const releasePiece = defineCommand({
  name: "pieces.release",
  act: "release",
  input: releaseInput,
  async run(ctx, input) {
    const personId = personIdOf(ctx);
    if (personId === null) return refuse("NOT_A_PERSON", "A person of the shop releases a piece, with their own name.");
    const at = and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId));
    const [piece] = await ctx.tx.select().from(workPieces).where(at).for("update");
    if (!piece) return refuse("NOT_FOUND", "This piece is not here.");
    if (piece.version !== input.version) return changedMeanwhile("This piece");
    const facts = await releaseFactsOf(ctx, piece.id, personId);
    const accounted = new Map(input.tray.map((t) => [t.kind as string, t.fitted + t.returned + t.scrapped]));
    const missing = missingForRelease({
      ...facts, tray: Object.entries(facts.came).map(([kind, came]) => ({ kind, came, accounted: accounted.get(kind) ?? 0 })),
      unchecked: CHECKLIST.filter((c) => !input.checked.includes(c.key)).map((c) => c.words),
    });
    if (missing.length > 0) return refuse("NOT_READY", `Not released. ${missing.join(" ")}`, { data: { missing: missing.join("\n") } });
    const alone = facts.isOwnPorting && facts.isAlone;
    await ctx.tx.insert(inspections).values({ shopId: ctx.shop.id, id: randomUUID(), pieceId: piece.id, at: ctx.now, personId, checklist: { checked: input.checked, tray: input.tray }, outcome: "released", reason: input.note, alone });
    await ctx.tx.update(workPieces).set({ releasedAt: ctx.now, releasedBy: personId, version: sql`${workPieces.version} + 1` }).where(at);
    await ctx.tx.update(operations).set({ doneAt: ctx.now, doneBy: personId, startedAt: sql`coalesce(${operations.startedAt}, ${ctx.now.toISOString()}::timestamptz)`, version: sql`${operations.version} + 1` })
      .where(and(eq(operations.shopId, ctx.shop.id), eq(operations.pieceId, piece.id), eq(operations.skill, "inspection"), isNull(operations.doneAt), isNull(operations.skippedAt), isNull(operations.removedAt)));
    await tellReady(ctx, piece.workOrderId, piece.family, piece.tag ?? "");
    return ok({ pieceId: piece.id, alone });
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});

/** "Proved": sent once the last piece of the order that is in the house is released. */
async function tellReady(ctx: TxContext, workOrderId: string, family: string, tag: string): Promise<void> {
  const { tx, shop } = ctx;
  const [open] = await tx.select({ id: workPieces.id }).from(workPieces)
    .where(and(eq(workPieces.shopId, shop.id), eq(workPieces.workOrderId, workOrderId), isNull(workPieces.releasedAt), isNull(workPieces.stoppedAt))).limit(1);
  if (open) return;
  const [row] = await tx.select({ number: workOrders.number, name: customers.name, email: customers.email }).from(workOrders)
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId))).where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, workOrderId)));
  if (!row?.email) return;
  const [link] = await tx.select({ id: links.id }).from(links).innerJoin(estimates, and(eq(estimates.shopId, links.shopId), eq(estimates.id, links.subjectId)))
    .where(and(eq(links.shopId, shop.id), eq(links.workOrderId, workOrderId), eq(estimates.state, "approved"), isNull(links.revokedAt))).limit(1);
  await queueMail(ctx, {
    kind: "proved", to: row.email, toName: row.name, subject: `${row.number}: your ${family} is proved and ready`,
    paragraphs: [`Your ${family} (tag ${tag}) passed final inspection. The invoice follows; after that it is ready to be fetched or shipped.`],
    ...(link ? { button: { label: "See your order", url: linkAddress(link.id) } } : {}), workOrderId, about: { kind: "work-order", id: workOrderId },
  });
}

/** Final inspection not passed: said in words, and the piece goes back to work. */
export const refuseRelease = defineCommand({
  name: "pieces.refuse-release",
  act: "release",
  input: refuseReleaseInput,
  async run(ctx, input) {
    const personId = personIdOf(ctx);
    if (personId === null) return refuse("NOT_A_PERSON", "A person of the shop inspects a piece, with their own name.");
    const [piece] = await ctx.tx.select({ released: workPieces.releasedAt }).from(workPieces).where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId)));
    if (!piece) return refuse("NOT_FOUND", "This piece is not here.");
    if (piece.released) return refuse("RELEASED", "This piece is released already. Open it again instead.");
    await ctx.tx.insert(inspections).values({ shopId: ctx.shop.id, id: randomUUID(), pieceId: input.pieceId, at: ctx.now, personId, checklist: {}, outcome: "refused", reason: input.reason });
    return ok({ pieceId: input.pieceId });
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});

/** Opens a released piece again, with a reason. Not once it has left. */
export const reopenPiece = defineCommand({
  name: "pieces.reopen",
  act: "work.override",
  input: reopenPieceInput,
  async run(ctx, input) {
    const [row] = await ctx.tx.update(workPieces).set({ releasedAt: null, releasedBy: null, version: sql`${workPieces.version} + 1` })
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId), eq(workPieces.version, input.version), isNull(workPieces.handedOverAt))).returning({ version: workPieces.version });
    if (!row) return changedMeanwhile("This piece");
    await ctx.tx.update(operations).set({ doneAt: null, doneBy: null, version: sql`${operations.version} + 1` })
      .where(and(eq(operations.shopId, ctx.shop.id), eq(operations.pieceId, input.pieceId), eq(operations.skill, "inspection"), isNull(operations.removedAt)));
    return ok({ pieceId: input.pieceId, version: row.version });
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});
