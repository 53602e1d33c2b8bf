import { and, eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { invoices, paymentRequests, payments, refunds } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { creditOf, depositHeld } from "@/modules/books/balances";
import { openOf } from "@/modules/books/domain/open-sum";
import { draftInvoice } from "@/modules/invoices/draft";
import { issueInvoice } from "@/modules/invoices/issue";
import { agingView } from "@/modules/invoices/queries";
import { draftSheet } from "@/modules/invoices/sheet";
import { answerByLink } from "@/modules/work-orders/commands/answer-estimate";
import { depositOf } from "@/modules/work-orders/queries/deposit";
import { moneyOfOrder } from "@/modules/work-orders/queries/order-money";
import { behindTheCurtain } from "@/tests/support/database";
import { asCustomer, hashOf, heroLines, heroMenu, heroParts, openHero, sendVersion, type HeroOrder } from "@/tests/support/hero-order";
import { openProviderScene, type ProviderScene } from "@/tests/support/provider-scene";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { answerRefund, askInvoicePayment, askRefund, startPayment, takePayment } from "./commands";
import { openPaymentPage } from "./payment-page";
import { findDisputes, findSetAside, paymentsFor } from "./queries";

/*
 * What the provider's `charge.refunded`, `refund.*` and `charge.dispute.*` do to the books, against the stand-in of it. The
 * rules of booking are double entry's: money that leaves opens what it had paid; nothing is booked twice.
 */
const AT = "2026-03-20T17:00:00Z";
let scene: ProviderScene;
let a: TestShop;
let b: TestShop;
let parts: Record<string, string>;
let n = 0;
const book = () => a.as("book", AT);
const row = <T>(fn: Parameters<typeof withShop<T>>[1]) => withShop(a.shop.id, fn);

interface Paid extends HeroOrder { invoiceId: string; openMinor: number; intent: string; charge: string; paymentId: string }

/** An order whose deposit was paid by card; `intent` and `charge` are the provider's names of that payment. */
async function depositPaid(): Promise<Omit<Paid, "invoiceId" | "openMinor">> {
  n += 1;
  const order = await openHero(a, parts, `R-${n}`);
  const v = await sendVersion(a, order, heroLines(parts, [["PIN", "1"]], []), AT);
  const customer = await asCustomer(a, order, v.estimateId, AT);
  must(await answerByLink(customer, { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
  const asked = must(await startPayment(customer, {}));
  await openPaymentPage(customer, asked.requestId);
  return { ...order, ...(await payFor(asked.requestId)) };
}

async function payFor(requestId: string): Promise<{ intent: string; charge: string; paymentId: string }> {
  const [request] = await row((tx) => tx.select().from(paymentRequests).where(eq(paymentRequests.id, requestId)));
  await scene.told(3, () => scene.payPage(request?.providerSessionId ?? ""));
  const [p] = await row((tx) => tx.select().from(payments).where(and(eq(payments.shopId, a.shop.id), eq(payments.paymentRequestId, requestId))));
  const intent = p?.providerPaymentId ?? "";
  return { intent, charge: scene.fake.provider.state.charges.find((c) => c.payment_intent === intent)?.id ?? "", paymentId: p?.id ?? "" };
}

async function billed(order: HeroOrder): Promise<string> {
  await behindTheCurtain(`update pieces set booked_in_at = now(), tag = 'R-${n}', released_at = now() where id = '${order.pieceId}'`);
  const { invoiceId } = must(await draftInvoice(a.as("mgr", AT), { workOrderId: order.orderId }));
  const totalMinor = await row(async (tx) => { const [i] = await tx.select().from(invoices).where(eq(invoices.id, invoiceId)); if (!i) throw new Error("no draft"); return must(await draftSheet({ ...a.as("mgr", AT), tx }, i)).snapshot.totals.totalMinor; });
  must(await issueInvoice(a.as("mgr", AT), { invoiceId, version: 1, totalMinor }));
  return invoiceId;
}

/** An invoice of 330.00 or so, paid to the cent by card at the provider's page, without a deposit. */
async function invoicePaid(): Promise<Paid> {
  n += 1;
  const order = await openHero(a, parts, `R-${n}`);
  const v = await sendVersion(a, order, heroLines(parts, [["PIN", "1"]], []), AT);
  must(await answerByLink(await asCustomer(a, order, v.estimateId, AT), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
  const invoiceId = await billed(order);
  const openMinor = await open(invoiceId);
  const asked = must(await askInvoicePayment(a.as("counter", AT), { invoiceId }));
  await scene.work();
  return { ...order, invoiceId, openMinor, ...(await payFor(asked.requestId)) };
}

const open = async (invoiceId: string): Promise<number> => { const [i] = await row((tx) => tx.select().from(invoices).where(eq(invoices.id, invoiceId))); if (!i) throw new Error("no invoice"); return openOf(i); };
const paymentOf = async (id: string) => (await row((tx) => tx.select().from(payments).where(eq(payments.id, id))))[0];
async function balances(orderId: string): Promise<Record<string, number>> {
  const lines = await behindTheCurtain(`select l.account_code || '=' || sum(l.amount_minor) from journal_lines l join journal_entries e on e.shop_id = l.shop_id and e.id = l.entry_id where e.work_order_id = '${orderId}' and l.account_code in ('1010', '1020', '1100', '2100', '2110', '6100', '6150') group by l.account_code having sum(l.amount_minor) <> 0 order by 1`);
  return Object.fromEntries(lines.map((l) => { const [code = "", sum] = l.split("="); return [code, Number(sum)]; }));
}
const eventOf = async (type: string, intent: string): Promise<string> => (await behindTheCurtain(`select id from provider_events where type = '${type}' and body #>> '{event,fact,paymentIntent}' = '${intent}' order by received_at desc limit 1`))[0] ?? "";
/** The provider sends an event three more times; nothing may change by it. */
const thrice = async (type: string, intent: string) => scene.told(3, async () => scene.control("webhooks/resend", { event: await eventOf(type, intent), times: 3 }));
const dispute = async (charge: string): Promise<string> => {
  await scene.told(1, () => scene.control("dispute", { charge }));
  return scene.fake.provider.state.disputes.find((d) => d.charge === charge)?.id ?? "";
};
const close = (id: string, won: boolean) => scene.told(1, () => scene.control("dispute/close", { dispute: id, won }));

beforeAll(async () => {
  scene = await openProviderScene();
  scene.setClock(AT);
  a = await testShop("first");
  b = await testShop("second");
  await heroMenu(a);
  parts = await heroParts(a);
});
afterAll(() => scene.close());

describe("a refund made at the provider's own pages", () => {
  it("is booked once however often it is told, opens the invoice again, tells the customer and stands beside the payment", async () => {
    const paid = await invoicePaid();
    expect(await open(paid.invoiceId)).toBe(0);
    await scene.told(2, () => scene.control("refund", { charge: paid.charge, amountMinor: 8500 }));
    await thrice("charge.refunded", paid.intent);
    expect(await open(paid.invoiceId)).toBe(8500);
    expect(await balances(paid.orderId)).toEqual({ 1020: paid.openMinor - 8500, 1100: 8500 });
    expect(await paymentOf(paid.paymentId)).toMatchObject({ refundedMinor: 8500 });
    expect(await behindTheCurtain(`select count(*) from mail_messages where kind = 'refund' and work_order_id = '${paid.orderId}'`)).toEqual(["1"]);
    const [seen] = await paymentsFor(book(), { invoiceId: paid.invoiceId, workOrderId: paid.orderId });
    expect(seen).toMatchObject({ refundedMinor: 8500, refunds: [{ amountMinor: 8500, state: "done", reason: "Made at the payment provider" }] });
    expect((await agingView(book())).rows.find((r) => r.customerId === paid.customerId)?.totalMinor).toBe(8500);
    expect(await moneyOfOrder(book(), paid.orderId)).toMatchObject({ openMinor: 8500 });
    // A second one adds only itself: the provider tells the sum so far.
    await scene.told(2, () => scene.control("refund", { charge: paid.charge, amountMinor: 1500 }));
    expect(await open(paid.invoiceId)).toBe(10_000);
  });

  it("counts our own refund once, whichever of the two messages comes first", async () => {
    const paid = await invoicePaid();
    const refund = must(await askRefund(book(), { paymentId: paid.paymentId, amount: "85.00", reason: "one port not done" }));
    must(await answerRefund(a.as("owner", AT), { refundId: refund.id, accept: true }));
    await scene.control("webhooks", { mode: "hold" });
    await scene.work();
    await scene.told(2, () => scene.control("webhooks/release", { order: "reversed" }));
    await scene.control("webhooks", { mode: "normal" });
    await thrice("charge.refunded", paid.intent);
    expect(await balances(paid.orderId)).toEqual({ 1020: paid.openMinor - 8500, 1100: 8500 });
    expect(await row((tx) => tx.select({ state: refunds.state, amountMinor: refunds.amountMinor }).from(refunds).where(eq(refunds.paymentId, paid.paymentId)))).toEqual([{ state: "done", amountMinor: 8500 }]);
  });

  it("gives an unused deposit back: it is due again, and nothing is held", async () => {
    const paid = await depositPaid();
    const due = await depositHeld(book(), paid.orderId);
    await scene.told(2, () => scene.control("refund", { charge: paid.charge }));
    await thrice("charge.refunded", paid.intent);
    expect(await balances(paid.orderId)).toEqual({});
    expect(await depositOf(book(), paid.orderId)).toMatchObject({ paidMinor: 0, openMinor: due });
    expect(await moneyOfOrder(book(), paid.orderId)).toMatchObject({ depositHeldMinor: 0 });
  });

  it("of a payment nobody knows is set aside with its reason and books nothing", async () => {
    const entries = () => behindTheCurtain("select count(*) from journal_entries");
    const before = await entries();
    const sale = (await scene.control("sale", { amountMinor: 5000, currency: "usd" })) as { id: string; payment_intent: string };
    await scene.told(2, () => scene.control("refund", { charge: sale.id }));
    expect(await behindTheCurtain(`select parked_reason from provider_events where type = 'charge.refunded' and body #>> '{event,fact,paymentIntent}' = '${sale.payment_intent}'`)).toEqual(["The payment this is about is not in the books yet."]);
    expect(await entries()).toEqual(before);
  });
});

describe("a disputed charge", () => {
  it("opens the invoice once, is seen by the bookkeeper, and cannot be refunded as well", async () => {
    const paid = await invoicePaid();
    const id = await dispute(paid.charge);
    await thrice("charge.dispute.created", paid.intent);
    expect(await open(paid.invoiceId)).toBe(paid.openMinor);
    expect(await balances(paid.orderId)).toEqual({ 1100: paid.openMinor });
    expect((await agingView(book())).rows.some((r) => r.customerId === paid.customerId && r.totalMinor === paid.openMinor)).toBe(true);
    const seen = (await findDisputes(book())).find((d) => d.id === id);
    // The provider gives a week to answer.
    expect(seen).toMatchObject({ paymentId: paid.paymentId, amountMinor: paid.openMinor, phase: "taken", evidenceBy: "2026-03-27T17:00:00.000Z", invoice: { id: paid.invoiceId } });
    expect((await paymentsFor(book(), { invoiceId: paid.invoiceId, workOrderId: paid.orderId }))[0]?.disputes).toMatchObject([{ id, phase: "taken" }]);
    const refused = await askRefund(book(), { paymentId: paid.paymentId, amount: "10.00", reason: "wants it back" });
    expect(refused).toMatchObject({ ok: false, refusal: { code: "DISPUTED", field: "amount" } });
    await expect(findDisputes(a.as("tech", AT))).rejects.toThrow(NotFound);
    expect(await findDisputes(b.as("book", AT))).toEqual([]);
  });

  it("won brings the money back once and closes the invoice", async () => {
    const paid = await invoicePaid();
    const id = await dispute(paid.charge);
    await close(id, true);
    await thrice("charge.dispute.closed", paid.intent);
    await thrice("charge.dispute.created", paid.intent);
    expect(await open(paid.invoiceId)).toBe(0);
    expect(await balances(paid.orderId)).toEqual({ 1020: paid.openMinor });
    expect(await paymentOf(paid.paymentId)).toMatchObject({ refundedMinor: 0 });
    expect((await findDisputes(book())).find((d) => d.id === id)).toMatchObject({ phase: "won", evidenceBy: null });
  });

  it("lost leaves the invoice open for the customer to pay, and says so", async () => {
    const paid = await invoicePaid();
    const id = await dispute(paid.charge);
    await close(id, false);
    await thrice("charge.dispute.closed", paid.intent);
    expect(await open(paid.invoiceId)).toBe(paid.openMinor);
    expect(await balances(paid.orderId)).toEqual({ 1100: paid.openMinor });
    expect((await findDisputes(book())).find((d) => d.id === id)).toMatchObject({ phase: "lost" });
    must(await takePayment(a.as("counter", AT), { invoiceId: paid.invoiceId, method: "cash", amount: (paid.openMinor / 100).toFixed(2) }));
    expect(await open(paid.invoiceId)).toBe(0);
  });

  it("told in the wrong order, closed before created, comes to the same", async () => {
    for (const won of [true, false]) {
      const paid = await invoicePaid();
      await scene.control("webhooks", { mode: "hold" });
      await scene.control("dispute", { charge: paid.charge });
      const id = scene.fake.provider.state.disputes.find((d) => d.charge === paid.charge)?.id ?? "";
      await scene.control("dispute/close", { dispute: id, won });
      await scene.told(2, () => scene.control("webhooks/release", { order: "reversed" }));
      await scene.control("webhooks", { mode: "normal" });
      expect(await open(paid.invoiceId)).toBe(won ? 0 : paid.openMinor);
      expect(await balances(paid.orderId)).toEqual(won ? { 1020: paid.openMinor } : { 1100: paid.openMinor });
      expect((await findDisputes(book())).find((d) => d.id === id)?.phase).toBe(won ? "won" : "lost");
    }
  });

  it("won after the customer paid another way becomes the customer's credit, which can be given back", async () => {
    const paid = await invoicePaid();
    const before = await creditOf(book(), paid.customerId);
    const id = await dispute(paid.charge);
    must(await takePayment(a.as("counter", AT), { invoiceId: paid.invoiceId, method: "transfer", amount: (paid.openMinor / 100).toFixed(2) }));
    await close(id, true);
    expect(await open(paid.invoiceId)).toBe(0);
    expect(await creditOf(book(), paid.customerId)).toBe(before + paid.openMinor);
    // The provider lets a charge be refunded again once its dispute was won.
    const charge = scene.fake.provider.state.charges.find((c) => c.id === paid.charge);
    if (charge) charge.disputed = false;
    const refund = must(await askRefund(book(), { paymentId: paid.paymentId, amount: (paid.openMinor / 100).toFixed(2), reason: "paid twice" }));
    must(await answerRefund(a.as("owner", AT), { refundId: refund.id, accept: true }));
    await scene.told(2, () => scene.work());
    expect(await creditOf(book(), paid.customerId)).toBe(before);
    expect(await open(paid.invoiceId)).toBe(0);
  });

  it("of a deposit takes the deposit away; won, it is held again", async () => {
    const paid = await depositPaid();
    const held = await depositHeld(book(), paid.orderId);
    const id = await dispute(paid.charge);
    await thrice("charge.dispute.created", paid.intent);
    expect(await balances(paid.orderId)).toEqual({});
    expect(await depositOf(book(), paid.orderId)).toMatchObject({ paidMinor: 0, openMinor: held });
    await close(id, true);
    expect(await balances(paid.orderId)).toEqual({ 1020: held, 2100: -held });
    expect(await depositOf(book(), paid.orderId)).toMatchObject({ paidMinor: held, openMinor: 0 });
  });

  it("of a deposit that was used opens the invoice that used it", async () => {
    const paid = await depositPaid();
    const held = await depositHeld(book(), paid.orderId);
    const invoiceId = await billed(paid);
    const before = await open(invoiceId);
    await dispute(paid.charge);
    await thrice("charge.dispute.created", paid.intent);
    expect(await open(invoiceId)).toBe(before + held);
    expect(await balances(paid.orderId)).toEqual({ 1100: before + held });
  });

  it("after a part was refunded waits for a person when the bank takes more than is left", async () => {
    const paid = await invoicePaid();
    await scene.told(2, () => scene.control("refund", { charge: paid.charge, amountMinor: 8500 }));
    await dispute(paid.charge);
    expect(await open(paid.invoiceId)).toBe(8500);
    const reasons = await behindTheCurtain(`select parked_reason from provider_events where type = 'charge.dispute.created' and body #>> '{event,fact,paymentIntent}' = '${paid.intent}'`);
    expect(reasons[0]).toContain("Nothing was booked");
    expect((await findSetAside(book())).some((r) => r.reason === reasons[0])).toBe(true);
  });

  it("that is only a question of the bank moves no money", async () => {
    const paid = await invoicePaid();
    await scene.told(1, async () => {
      await scene.control("webhooks", { mode: "hold" });
      await scene.control("dispute", { charge: paid.charge });
      const made = scene.fake.provider.state.disputes.find((d) => d.charge === paid.charge);
      const told = scene.fake.provider.state.events.find((e) => e.type === "charge.dispute.created" && (e.data.object as { id?: string }).id === made?.id);
      if (!told) throw new Error("no event");
      (told.data.object as { status: string }).status = "warning_needs_response";
      await scene.control("webhooks/release", { order: "kept" });
      await scene.control("webhooks", { mode: "normal" });
    });
    expect(await open(paid.invoiceId)).toBe(0);
    expect((await findDisputes(book())).find((d) => d.paymentId === paid.paymentId)?.phase).toBe("inquiry");
  });

  it("leaves nothing in clearing once the payout with its fee has come, and the fee is an expense", async () => {
    await scene.control("clear");
    const sum = async (account: string) => Number((await behindTheCurtain(`select coalesce(sum(amount_minor), 0) from journal_lines where shop_id = '${a.shop.id}' and account_code = '${account}'`))[0]);
    const before = { clearing: await sum("1020"), fees: await sum("6150"), bank: await sum("1010") };
    const [kept, taken] = [await invoicePaid(), await invoicePaid()];
    await dispute(taken.charge);
    await scene.told(2, () => scene.control("payout", { arrivalDate: "2026-03-24" }));
    const [payout] = scene.fake.provider.state.payouts;
    expect(await behindTheCurtain(`select state from payouts where provider_payout_id = '${payout?.id ?? ""}'`)).toEqual(["booked"]);
    // The stand-in's fee of a dispute is 15.00, that of the demo.
    expect({ clearing: await sum("1020"), fees: await sum("6150"), bank: await sum("1010") }).toEqual({ clearing: before.clearing, fees: before.fees + 1500, bank: before.bank + (payout?.amount ?? 0) });
    expect(payout?.amount).toBeLessThan(kept.openMinor);
  });
});
