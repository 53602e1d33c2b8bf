import { randomUUID } from "node:crypto";
import { asc, eq } from "drizzle-orm";
import { beforeAll, describe, expect, it } from "vitest";
import { invoiceLines, invoices, taxCertificates } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { creditOf } from "@/modules/books/balances";
import { takePayment } from "@/modules/payments/commands";
import { renderPdf } from "@/modules/outbound/pdf/render";
import { answerByLink } from "@/modules/work-orders/commands/answer-estimate";
import { behindTheCurtain } from "@/tests/support/database";
import { asCustomer, hashOf, heroLines, heroMenu, heroParts, openHero, sendVersion, type HeroOrder } from "@/tests/support/hero-order";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { applyCredit, creditInvoice, writeOffInvoice } from "./credit";
import type { InvoiceSnapshot } from "./domain/invoice-snapshot";
import { openOf } from "@/modules/books/domain/open-sum";
import { draftInvoice, dropDraft, saveDraft } from "./draft";
import { issueInvoice } from "./issue";
import { invoicePaper } from "./pdf/invoice-paper";
import { draftSheet } from "./sheet";

let a: TestShop;
let b: TestShop;
let ids: Record<string, string>;
let n = 0;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second", { zone: "Europe/Berlin", currency: "EUR", locale: "de-DE", settings: { taxMode: "vat", taxName: "VAT", taxRateText: "21", laborTaxable: true, partsTaxable: true, suppliesTaxable: true, freightTaxable: true, taxNumber: "DE000000000" } });
  await heroMenu(a);
  ids = await heroParts(a);
});

const at = "2026-03-13T18:00:00Z";
type Lines = Parameters<typeof sendVersion>[2];
const invoiceOf = (shop: TestShop, id: string) => withShop(shop.shop.id, async (tx) => (await tx.select().from(invoices).where(eq(invoices.id, id)))[0]);
const linesOf = (shop: TestShop, id: string) => withShop(shop.shop.id, (tx) => tx.select().from(invoiceLines).where(eq(invoiceLines.invoiceId, id)).orderBy(asc(invoiceLines.lineNo)));

/** An order with these lines agreed and its piece released, ready to bill. */
async function agreed(shop: TestShop, lines: Lines, when = "2026-03-10T17:00:00Z"): Promise<HeroOrder> {
  n += 1;
  const order = await openHero(shop, ids, `S-${n}`);
  const v = await sendVersion(shop, order, lines, when);
  must(await answerByLink(await asCustomer(shop, order, v.estimateId, when), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(shop, v.estimateId) }));
  await behindTheCurtain(`update pieces set booked_in_at = now(), tag = 'T-${n}-${shop.shop.slug}', released_at = '2026-03-12T17:00:00Z' where id = '${order.pieceId}'`);
  return order;
}
async function drafted(shop: TestShop, order: HeroOrder, when = at) {
  const { invoiceId } = must(await draftInvoice(shop.as("mgr", when), { workOrderId: order.orderId }));
  const row = await invoiceOf(shop, invoiceId);
  if (!row) throw new Error("no draft");
  const sheet = await withShop(shop.shop.id, async (tx) => must(await draftSheet({ ...shop.as("mgr", when), tx }, row)));
  return { invoiceId, version: row.version, sheet, totalMinor: sheet.snapshot.totals.totalMinor };
}
async function issued(shop: TestShop, order: HeroOrder, when = at) {
  const d = await drafted(shop, order, when);
  return must(await issueInvoice(shop.as("mgr", when), { invoiceId: d.invoiceId, version: d.version, totalMinor: d.totalMinor }));
}
const freeText = (kind: "labor" | "part", description: string, unitPrice: string): Lines[number] =>
  kind === "labor" ? { kind, pieceNo: 1, operationCode: "PIN", description, qty: "1", unitPrice } : { kind, pieceNo: 1, partId: ids["SEL-55"] ?? null, description, qty: "1", unitPrice };

describe("numbers", () => {
  it("takes fifty presses of Issue as one, and leaves no hole between invoices issued at once", async () => {
    const order = await agreed(a, heroLines(ids, [["PIN", "1"]], []));
    const d = await drafted(a, order);
    const press = () => issueInvoice(a.as("mgr", at), { invoiceId: d.invoiceId, version: d.version, totalMinor: d.totalMinor });
    const all = await Promise.all(Array.from({ length: 50 }, press));
    expect(all.filter((r) => r.ok)).toHaveLength(1);
    expect(new Set(all.filter((r) => !r.ok).map((r) => (r.ok ? "" : r.refusal.code)))).toEqual(new Set(["ALREADY_ISSUED"]));

    const orders: HeroOrder[] = [];
    for (let i = 0; i < 12; i += 1) orders.push(await agreed(a, heroLines(ids, [["CLN", "1"]], [])));
    const drafts = [];
    for (const o of orders) drafts.push(await drafted(a, o));
    // Every third press asks with a stale version and must not take a number.
    const results = await Promise.all(drafts.map((x, i) => issueInvoice(a.as("mgr", at), { invoiceId: x.invoiceId, version: i % 3 === 2 ? 99 : x.version, totalMinor: x.totalMinor })));
    expect(results.filter((r) => r.ok)).toHaveLength(8);
    const numbers = await behindTheCurtain(`select right(number, 5)::int from invoices where shop_id = '${a.shop.id}' and kind = 'invoice' and number is not null order by 1`);
    expect(numbers.map(Number)).toEqual(Array.from({ length: 9 }, (_, i) => i + 1));
    const journal = await behindTheCurtain(`select count(*) = max(number) from journal_entries where shop_id = '${a.shop.id}'`);
    expect(journal).toEqual(["t"]);
  }, 60_000);
});

describe("what may be billed", () => {
  it("refuses more than was approved, and bills one agreed line once", async () => {
    const order = await agreed(a, heroLines(ids, [["PIN", "1"], ["CLN", "1"]], []));
    const d = await drafted(a, order);
    const lines = await linesOf(a, d.invoiceId);
    const raised = { invoiceId: d.invoiceId, version: d.version, lines: lines.map((l) => ({ lineId: l.id, description: l.description, amount: l.kind === "labor" ? "600.00" : "42.00" })) };
    expect(await saveDraft(a.as("mgr", at), { ...raised, version: 7 })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    const { version } = must(await saveDraft(a.as("mgr", at), raised));
    const again = await drafted(a, order);
    expect(await issueInvoice(a.as("mgr", at), { invoiceId: d.invoiceId, version, totalMinor: again.totalMinor })).toMatchObject({ ok: false, refusal: { code: "OVER_APPROVED" } });
    must(await dropDraft(a.as("mgr", at), { invoiceId: d.invoiceId, version }));
    await issued(a, order);
    expect(await draftInvoice(a.as("mgr", at), { workOrderId: order.orderId })).toMatchObject({ ok: false, refusal: { code: "NOTHING_TO_BILL" } });
  });

  it("charges tax from the day after a certificate ran out: 1,800.00 in parts, 132.30", async () => {
    const order = await agreed(a, [freeText("part", "Parts", "1800.00")], "2026-06-20T17:00:00Z");
    await withShop(a.shop.id, (tx) => tx.insert(taxCertificates).values({ shopId: a.shop.id, id: randomUUID(), customerId: order.customerId, kind: "resale", number: "R-1", jurisdiction: "Pell", validFrom: "2025-07-01", validTo: "2026-06-30" }));
    const lastDay = await drafted(a, order, "2026-06-30T18:00:00Z");
    expect(lastDay.sheet.snapshot.totals.taxMinor).toBe(0);
    expect(lastDay.sheet.snapshot.rules.exemptBy).toBe("R-1");
    const next = await drafted(a, order, "2026-07-01T18:00:00Z");
    expect(next.sheet.snapshot.totals.taxMinor).toBe(13230);
    // The total that was on yesterday's screen is not issued silently with today's tax.
    expect(await issueInvoice(a.as("mgr", "2026-07-01T18:00:00Z"), { invoiceId: lastDay.invoiceId, version: lastDay.version, totalMinor: lastDay.totalMinor })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
  });

  it("carries value added tax on every line: 480.00 + 212.35 + 18.50, tax 149.28, in all 860.13", async () => {
    await heroMenu(b);
    const mine = ids;
    ids = await heroParts(b);
    const n0 = await openHero(b, ids, "VAT-1");
    const { startEstimate, saveEstimate } = await import("@/modules/work-orders/commands/estimate-draft");
    const { sendEstimate } = await import("@/modules/work-orders/commands/send-estimate");
    const draft = must(await startEstimate(b.as("counter", at), { workOrderId: n0.orderId }));
    const saved = must(await saveEstimate(b.as("counter", at), {
      estimateId: draft.estimateId, version: draft.version, laborDiscountPercent: "0", freight: "18.50", depositPercent: "0", exclusions: "", message: "", readyOn: "2026-03-20",
      lines: [freeText("labor", "Porting", "480.00"), freeText("part", "Valves", "212.35")],
    }));
    const sent = must(await sendEstimate(b.as("counter", at), { estimateId: draft.estimateId, version: saved.version, to: "odalys@brennan.example" }));
    must(await answerByLink(await asCustomer(b, n0, sent.estimateId, at), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(b, sent.estimateId) }));
    await behindTheCurtain(`update shop_settings set supplies_basis_points = 0 where shop_id = '${b.shop.id}'; update pieces set tag = 'B-1', booked_in_at = now(), released_at = now() where id = '${n0.pieceId}'`);
    const d = await drafted(b, n0);
    ids = mine;
    // Supplies were switched off after the estimate: the sum is the three lines alone.
    expect(d.sheet.snapshot.totals).toMatchObject({ netMinor: 71085, taxMinor: 14928, totalMinor: 86013, groups: [{ percent: "21", baseMinor: 71085, taxMinor: 14928 }] });
  });

  it("issues an invoice of 0.00 with a number and no entry", async () => {
    const order = await agreed(a, heroLines(ids, [["CLN", "1"]], []));
    await behindTheCurtain(`update shop_settings set supplies_basis_points = 0 where shop_id = '${a.shop.id}'`);
    const first = await drafted(a, order);
    const lines = await linesOf(a, first.invoiceId);
    must(await saveDraft(a.as("mgr", at), { invoiceId: first.invoiceId, version: first.version, lines: lines.map((l) => ({ lineId: l.id, description: `${l.description}, under warranty`, amount: "0.00" })), note: "Value of this work: 45.00" }));
    const d = await drafted(a, order);
    await behindTheCurtain(`update shop_settings set supplies_basis_points = 400 where shop_id = '${a.shop.id}'`);
    expect(d.totalMinor).toBe(0);
    const done = must(await issueInvoice(a.as("mgr", at), { invoiceId: d.invoiceId, version: d.version, totalMinor: 0 }));
    const snapshot = (await invoiceOf(a, d.invoiceId))?.snapshot as InvoiceSnapshot;
    expect((await renderPdf(invoicePaper(snapshot, null), { creationDate: new Date(at) })).subarray(0, 5).toString()).toBe("%PDF-");
    expect(done.number).toMatch(/^INV-2026-\d{5}$/);
    expect(await behindTheCurtain(`select count(*) from journal_entries where source_id = '${d.invoiceId}'`)).toEqual(["0"]);
  });
});

describe("taking back", () => {
  it("mirrors an invoice whole, once, and turns what was paid into the customer's credit for the next one", async () => {
    const order = await agreed(a, heroLines(ids, [["PIN", "1"]], [["SEL-55", "4"]]));
    const inv = await issued(a, order);
    must(await takePayment(a.as("book", at), { invoiceId: inv.invoiceId, method: "transfer", amount: "100.00" }));
    const credit = must(await creditInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "wrong head", lines: null }));
    expect(credit).toMatchObject({ totalMinor: -inv.totalMinor, creditMinor: 10000 });
    expect(credit.number).toMatch(/^CN-2026-\d{5}$/);
    const entries = await behindTheCurtain(`select coalesce(sum(l.amount_minor), 0) from journal_lines l join journal_entries e on e.shop_id = l.shop_id and e.id = l.entry_id where e.work_order_id = '${order.orderId}' and l.account_code in ('4000', '4100', '4150', '4200', '4900', '2200', '1100')`);
    expect(entries).toEqual(["0"]);
    expect(await creditOf(a.as("book"), order.customerId)).toBe(10000);
    expect(await creditInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "again", lines: null })).toMatchObject({ ok: false, refusal: { code: "PARTLY_CREDITED" } });
    const second = await issued(a, order);
    expect(second.number).not.toBe(inv.number);
    expect(must(await applyCredit(a.as("book", at), { invoiceId: second.invoiceId })).amountMinor).toBe(10000);
    const row = await invoiceOf(a, second.invoiceId);
    expect(row && openOf(row)).toBe(second.totalMinor - 10000);
    expect(await applyCredit(a.as("book", at), { invoiceId: second.invoiceId })).toMatchObject({ ok: false, refusal: { code: "NO_CREDIT" } });
  });

  it("credits some lines with their share of discount and tax, never more than is left", async () => {
    const order = await agreed(a, heroLines(ids, [["PIN", "1"]], [["SEL-55", "4"]]));
    const inv = await issued(a, order);
    const snapshot = (await invoiceOf(a, inv.invoiceId))?.snapshot as InvoiceSnapshot;
    const seal = snapshot.lines.find((l) => l.kind === "part");
    const labor = snapshot.lines.find((l) => l.kind === "labor");
    // 26.00 in parts and 7.35 % of it: 1.911, half-up 1.91.
    const part = must(await creditInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "seals came back", lines: [{ lineId: seal?.id ?? "", amount: "26.00" }] }));
    expect(part.totalMinor).toBe(-2791);
    // 100.00 of labor less its 5 %.
    expect(must(await creditInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "goodwill", lines: [{ lineId: labor?.id ?? "", amount: "100.00" }] })).totalMinor).toBe(-9500);
    expect(await creditInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "too much", lines: [{ lineId: labor?.id ?? "", amount: "999.00" }] })).toMatchObject({ ok: false, refusal: { code: "CREDIT_EXCEEDS_LINE" } });
    const all = [seal, labor].flatMap((l) => (l ? [{ lineId: l.id, amount: (l.amountMinor / 100).toFixed(2) }] : []));
    expect(await creditInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "more than left", lines: all })).toMatchObject({ ok: false, refusal: { code: "CREDIT_EXCEEDS_INVOICE" } });
    const row = await invoiceOf(a, inv.invoiceId);
    expect(row && openOf(row)).toBe(inv.totalMinor - 2791 - 9500);
  });

  it("lets the bookkeeper write off a cent's difference and the owner more", async () => {
    const order = await agreed(a, heroLines(ids, [["CLN", "1"]], []));
    const inv = await issued(a, order);
    expect(await writeOffInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "gone" })).toMatchObject({ ok: false, refusal: { code: "ABOVE_LIMIT" } });
    must(await takePayment(a.as("book", at), { invoiceId: inv.invoiceId, method: "cash", amount: ((inv.openMinor - 50) / 100).toFixed(2) }));
    expect(must(await writeOffInvoice(a.as("book", at), { invoiceId: inv.invoiceId, reason: "bank kept a fee" })).amountMinor).toBe(50);
    await expect(writeOffInvoice(a.as("mgr", at), { invoiceId: inv.invoiceId, reason: "no" })).rejects.toThrow(NotFound);
  });

  it("does not exist for the other shop", async () => {
    const order = await agreed(a, heroLines(ids, [["CLN", "1"]], []));
    const inv = await issued(a, order);
    expect(await creditInvoice(b.as("owner", at), { invoiceId: inv.invoiceId, reason: "mine now", lines: null })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await draftInvoice(b.as("owner", at), { workOrderId: order.orderId })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(creditInvoice(a.as("counter", at), { invoiceId: inv.invoiceId, reason: "no", lines: null })).rejects.toThrow(NotFound);
    expect((await invoiceOf(a, inv.invoiceId))?.creditedMinor).toBe(0);
  });
});
