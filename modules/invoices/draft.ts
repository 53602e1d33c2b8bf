import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { invoiceLines, invoices } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { draftLines } from "./domain/draft-lines";
import { draftInvoiceInput, draftRefInput, saveDraftInput } from "./input";
import { billedBefore, orderToBill } from "./sheet";

export const draftAt = (ctx: TxContext, invoiceId: string) => and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, invoiceId));

/** A draft at the version that was opened, locked; or why not. */
export async function lockDraft(ctx: TxContext, ref: { invoiceId: string; version: number }): Promise<Result<typeof invoices.$inferSelect>> {
  const [row] = await ctx.tx.select().from(invoices).where(draftAt(ctx, ref.invoiceId)).for("update");
  if (!row || row.state === "dropped") return refuse("NOT_FOUND", "This draft is not here any more.");
  if (row.state !== "draft") return refuse("ALREADY_ISSUED", `This invoice was issued as ${row.number ?? ""}. What is printed stays; a credit note takes it back.`);
  return row.version === ref.version ? ok(row) : changedMeanwhile("This draft");
}

/** A draft drawn from the agreed work of an order; the standing draft of the order if there is one. It has no number. */
export const draftInvoice = defineCommand({
  name: "invoices.draft",
  act: "invoice.write",
  input: draftInvoiceInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`draft:${shop.id}:${input.workOrderId}`}, 4))`);
    const [standing] = await tx.select({ id: invoices.id }).from(invoices).where(and(eq(invoices.shopId, shop.id), eq(invoices.workOrderId, input.workOrderId), eq(invoices.state, "draft"), eq(invoices.kind, "invoice")));
    if (standing) return ok({ invoiceId: standing.id, made: false });
    const bill = await orderToBill(ctx, input.workOrderId);
    if (!bill.ok) return bill;
    const { order, customer, agreed, lines, pieces } = bill.value;
    const before = await billedBefore(ctx, order.id);
    const made = draftLines({ agreed: lines, pieces, billedIds: before.lineIds, which: input.which, freightMinor: Math.max(0, agreed.freightMinor - before.freightMinor) });
    if (made.length === 0) return refuse("NOTHING_TO_BILL", before.lineIds.size > 0 ? "Everything agreed on this order is billed already." : "No piece of this order is released yet, so there is nothing to bill.");
    const id = randomUUID();
    await tx.insert(invoices).values({ shopId: shop.id, id, kind: "invoice", workOrderId: order.id, customerId: customer.id, state: "draft", terms: customer.terms });
    await tx.insert(invoiceLines).values(made.map((l, i) => ({ ...l, shopId: shop.id, id: randomUUID(), invoiceId: id, lineNo: i + 1 })));
    return ok({ invoiceId: id, made: true });
  },
  subject: (_, value) => ({ kind: "invoice", id: value.invoiceId }),
});

/** Words and amounts of a draft's lines; a line left out is taken off. What is over the approval is refused at issue. */
export const saveDraft = defineCommand({
  name: "invoices.save-draft",
  act: "invoice.write",
  input: saveDraftInput,
  async run(ctx, input) {
    const draft = await lockDraft(ctx, input);
    if (!draft.ok) return draft;
    const { tx, shop } = ctx;
    const at = and(eq(invoiceLines.shopId, shop.id), eq(invoiceLines.invoiceId, input.invoiceId));
    const rows = await tx.select().from(invoiceLines).where(at);
    const unknown = input.lines.findIndex((l) => !rows.some((r) => r.id === l.lineId));
    if (unknown !== -1) return refuse("NOT_FOUND", "This line is not on the draft any more. Reload it.", { field: `lines.${unknown}.description` });
    const kept = input.lines.flatMap((l, i) => rows.filter((r) => r.id === l.lineId).map((r) => ({
      ...r, lineNo: i + 1, description: l.description,
      // A changed amount is a lump sum: quantity and unit price would not multiply to it any more.
      ...(l.amount === r.amountMinor ? {} : { amountMinor: l.amount, qtyMilli: 1000, unitPriceMinor: l.amount }),
    })));
    await tx.delete(invoiceLines).where(at);
    const note = input.note ? [{
      shopId: shop.id, id: randomUUID(), invoiceId: input.invoiceId, lineNo: kept.length + 1, kind: "note", description: input.note, qtyMilli: 1000, unitPriceMinor: 0, amountMinor: 0,
    }] : [];
    await tx.insert(invoiceLines).values([...kept, ...note]);
    const [row] = await tx.update(invoices).set({ version: sql`${invoices.version} + 1` }).where(draftAt(ctx, input.invoiceId)).returning({ version: invoices.version });
    return ok({ version: row?.version ?? input.version });
  },
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});

/** Takes a draft away; it never had a number, so none is missing. */
export const dropDraft = defineCommand({
  name: "invoices.drop-draft",
  act: "invoice.write",
  input: draftRefInput,
  async run(ctx, input) {
    const draft = await lockDraft(ctx, input);
    if (!draft.ok) return draft;
    await ctx.tx.update(invoices).set({ state: "dropped" }).where(draftAt(ctx, input.invoiceId));
    return ok({ invoiceId: input.invoiceId });
  },
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});
