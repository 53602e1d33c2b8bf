import "server-only";
import { randomUUID } from "node:crypto";
import { and, desc, eq, isNull, sql } from "drizzle-orm";
import { customers, estimates, files, links, receivingChecks, workOrders, workPieces } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { linkAddress } from "@/modules/access/link";
import { takeNumber } from "@/modules/access/numbers";
import { queueMail } from "@/modules/documents/mail";
import { headForPiece } from "@/modules/flow/commands/head";
import { dateTime } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse } from "@/modules/kernel/result";
import { PHOTOS_WANTED } from "../domain/photos-wanted";
import { trayText } from "../domain/tray-kinds";
import { pieceIdInput, placeInput, receiveInput } from "../input";
import { onAnotherOrder } from "./open-order";

/** Address of the newest standing link to one of the order's estimates, to send a customer back to their page. */
async function standingPage(ctx: TxContext, workOrderId: string): Promise<string | null> {
  const [link] = await ctx.tx.select({ id: links.id }).from(links).innerJoin(estimates, and(eq(estimates.shopId, links.shopId), eq(estimates.id, links.subjectId)))
    .where(and(eq(links.shopId, ctx.shop.id), eq(links.workOrderId, workOrderId), eq(links.purpose, "estimate"), isNull(links.revokedAt), sql`${links.expiresAt} > ${ctx.now.toISOString()}::timestamptz`))
    .orderBy(desc(estimates.estimateNo)).limit(1);
  return link ? linkAddress(link.id) : null;
}

/**
 * Books a piece in: what came, in which state, what is missing; gives it its tag number and a place in the flow room.
 * The customer is sent what was found: a record of their property.
 */
export const receivePiece = defineCommand({
  name: "pieces.receive",
  act: "pieces.receive",
  input: receiveInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const at = and(eq(workPieces.shopId, shop.id), eq(workPieces.id, input.pieceId));
    const [row] = await tx.select({ p: workPieces, o: workOrders, c: customers }).from(workPieces)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(at).for("update", { of: workPieces });
    if (!row) return refuse("NOT_FOUND", "This piece is not here.");
    const { p, o, c } = row;
    if (p.bookedInAt) return refuse("ALREADY_BOOKED_IN", `This piece is booked in already, under tag ${p.tag ?? ""}.`);
    if (o.closedAt || o.cancelledAt) return refuse("ORDER_CLOSED", "This order is closed. Open a new one for the piece.");
    if (p.version !== input.version) return changedMeanwhile("This piece");
    const marks = { castingNumber: input.castingNumber || p.castingNumber, serial: input.serial || p.serial };
    const elsewhere = await onAnotherOrder(ctx, marks, "serial", p.id);
    if (elsewhere) return elsewhere;
    const [{ photos } = { photos: 0 }] = await tx.select({ photos: sql<number>`count(*)::int` }).from(files)
      .where(and(eq(files.shopId, shop.id), eq(files.kind, "photo"), eq(files.subjectKind, "piece"), eq(files.subjectId, p.id)));
    if (photos < PHOTOS_WANTED && !input.fewPhotosOk) {
      return refuse("FEW_PHOTOS", `There ${photos === 1 ? "is 1 photo" : `are ${photos} photos`}; ${PHOTOS_WANTED} are usual: both faces, the ports, any damage. Add more, or tick that it is so.`, { field: "fewPhotosOk", data: { photos } });
    }
    const day = localDate(ctx.now, shop.zone).slice(2).replaceAll("-", "");
    const tag = `${day}-${String(await takeNumber(ctx, `TAG-${day}`)).padStart(2, "0")}`;
    await tx.update(workPieces).set({ ...marks, tag, bookedInAt: ctx.now, place: input.place || "Counter", version: sql`${workPieces.version} + 1` }).where(at);
    await tx.insert(receivingChecks).values({
      shopId: shop.id, id: randomUUID(), pieceId: p.id, at: ctx.now, personId: personIdOf(ctx), parcelCondition: input.parcelCondition, counts: input.counts,
      missing: input.missing, damage: input.damage, notes: input.notes,
    });
    // With the cylinders, bore and cam lifts of the shop's family, so that every port of it can be flowed.
    const head = await headForPiece(ctx, p.id);
    if (!head.ok) return head;
    if (c.email) {
      const url = await standingPage(ctx, o.id);
      await queueMail(ctx, {
        kind: "head-arrived", to: c.email, toName: c.name, subject: `${o.number}: your ${p.family} is here`,
        paragraphs: [
          `Your ${p.family}${marks.castingNumber ? `, casting ${marks.castingNumber}` : ""}${marks.serial ? `, serial ${marks.serial}` : ""}, was booked in ${dateTime(ctx.now, shop)} under tag ${tag}.`,
          `Parcel: ${input.parcelCondition}. In the tray: ${trayText(input.counts)}.`,
          `Missing: ${input.missing || "nothing"}.\nDamage seen: ${input.damage || "none"}.`,
          ...(photos > 0 ? [`We took ${photos} photo${photos === 1 ? "" : "s"}${url ? "; you see them on your page" : ""}.`] : []),
          "Tell us at once if any of this is not as you sent it.",
        ],
        ...(url ? { button: { label: "See your order", url } } : {}), workOrderId: o.id, about: { kind: "piece", id: p.id },
      });
    }
    return ok({ pieceId: p.id, tag, photos, mailed: Boolean(c.email), number: o.number, pieceNo: p.pieceNo });
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});

/** Logs that a tag went to the printer: a tag is the key to somebody's property. */
export const printTag = defineCommand({
  name: "pieces.print-tag",
  act: "pieces.receive",
  input: pieceIdInput,
  async run(ctx, input) {
    const [p] = await ctx.tx.select({ tag: workPieces.tag }).from(workPieces).where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId)));
    if (!p?.tag) return refuse("NOT_BOOKED_IN", "This piece has no tag yet. Book it in first.");
    return ok({ tag: p.tag });
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});

/** Where the piece lies: shelf, bench, rack. */
export const movePiece = defineCommand({
  name: "pieces.place",
  act: "floor.see",
  input: placeInput,
  async run(ctx, input) {
    const [row] = await ctx.tx.update(workPieces).set({ place: input.place, version: sql`${workPieces.version} + 1` })
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId), eq(workPieces.version, input.version))).returning({ version: workPieces.version });
    return row ? ok({ version: row.version }) : changedMeanwhile("This piece");
  },
  subject: (input) => ({ kind: "piece", id: input.pieceId }),
});
