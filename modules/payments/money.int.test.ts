import { and, eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { invoices, paymentRequests, payments, payouts, shopSettings } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { creditOf, depositHeld } from "@/modules/books/balances";
import { carrierBill, partsIssued } from "@/modules/books/domain/posting-stock";
import { postEntry } from "@/modules/books/post";
import { draftInvoice } from "@/modules/invoices/draft";
import type { InvoiceSnapshot } from "@/modules/invoices/domain/invoice-snapshot";
import { issueInvoice } from "@/modules/invoices/issue";
import { draftSheet } from "@/modules/invoices/sheet";
import { minor } from "@/modules/kernel/money";
import { jobProfitOf } from "@/modules/reports/queries";
import { answerByLink } from "@/modules/work-orders/commands/answer-estimate";
import { behindTheCurtain } from "@/tests/support/database";
import { asCustomer, HERO_FOUND, HERO_LABOR, HERO_SHELF, hashOf, heroLines, heroMenu, heroParts, openHero, sendVersion, type HeroOrder } from "@/tests/support/hero-order";
import { openProviderScene, type ProviderScene } from "@/tests/support/provider-scene";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { askInvoicePayment, askRefund, answerRefund, explainPayoutItem, startPayment, takePayment } from "./commands";
import { openPaymentPage } from "./payment-page";
import { reconcile } from "./reconcile";

/* Figures of docs/hero-job.md throughout. */
let scene: ProviderScene;
let a: TestShop;
let b: TestShop;
let hero: HeroOrder;
let invoiceId = "";

const setClock = (at: string) => scene.setClock(at);
const control = (what: string, input?: unknown) => scene.control(what, input);
const payPage = (session: string) => scene.payPage(session);
const until = (fits: () => boolean | Promise<boolean>, what: string) => scene.until(fits, what);
const work = () => scene.work();
const events = () => scene.events();
const row = async <T>(fn: Parameters<typeof withShop<T>>[1], shop = a) => withShop(shop.shop.id, fn);
const request = (id: string) => row(async (tx) => (await tx.select().from(paymentRequests).where(eq(paymentRequests.id, id)))[0]);
const sessionOf = async (id: string) => (await request(id))?.providerSessionId ?? "";
const invoiceRow = (id: string) => row(async (tx) => (await tx.select().from(invoices).where(eq(invoices.id, id)))[0]);

/** Balances by account of one order's entries, as text with two decimals; zero ones left out. */
async function balances(orderId: string): Promise<Record<string, number>> {
  const lines = await behindTheCurtain(`select l.account_code || '=' || sum(l.amount_minor) from journal_lines l join journal_entries e on e.shop_id = l.shop_id and e.id = l.entry_id where e.work_order_id = '${orderId}' group by l.account_code having sum(l.amount_minor) <> 0 order by 1`);
  return Object.fromEntries(lines.map((l) => { const [code = "", sum] = l.split("="); return [code, Number(sum)]; }));
}

beforeAll(async () => {
  scene = await openProviderScene();
  setClock("2026-02-19T17:42:00Z");
  a = await testShop("first", { numbersFrom: { "INV-2026": 318 } });
  b = await testShop("second");
  await row((tx) => tx.update(shopSettings).set({ referencePrefix: "NB" }).where(eq(shopSettings.shopId, a.shop.id)));
  await heroMenu(a);
  hero = await openHero(a, await heroParts(a));
});
afterAll(() => scene.close());

describe("the hero job's money", () => {
  it("asks for the deposit when the estimate is approved, opens one page for it, and books it once when it is paid", async () => {
    const v1 = await sendVersion(a, hero, heroLines(hero.parts, HERO_LABOR, HERO_SHELF), "2026-02-18T17:00:00Z");
    const customer = await asCustomer(a, hero, v1.estimateId, "2026-02-19T17:42:00Z");
    must(await answerByLink(customer, { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v1.estimateId) }));
    const asked = must(await startPayment(customer, {}));
    expect(asked).toMatchObject({ amountMinor: 72310, url: null });
    // The press and the worker make the same page.
    const [one, two] = await Promise.all([openPaymentPage(customer, asked.requestId, "short"), openPaymentPage(customer, asked.requestId)]);
    expect(one).toBe(two);
    await work();
    expect(scene.fake.provider.state.sessions).toHaveLength(1);
    expect(must(await startPayment(customer, {}))).toMatchObject({ requestId: asked.requestId, url: one });

    await payPage(await sessionOf(asked.requestId));
    await until(() => events() >= 3, "the events of a paid page");
    await work();
    expect(await depositHeld(a.as("book"), hero.orderId)).toBe(72310);
    expect(await balances(hero.orderId)).toEqual({ 1020: 72310, 2100: -72310 });
    const receipts = await behindTheCurtain(`select subject from mail_messages where kind = 'deposit-receipt' and shop_id = '${a.shop.id}'`);
    expect(receipts).toHaveLength(1);
    expect(receipts[0]).toContain("RC-2026-00001");
    expect(await startPayment(customer, {})).toMatchObject({ ok: false, refusal: { code: "NOTHING_DUE" } });
  });

  it("takes the same event twice, late and in any order as once, and a forged one as nothing", async () => {
    const [completed] = (await behindTheCurtain(`select id from provider_events where type = 'checkout.session.completed'`));
    await control("webhooks/resend", { event: completed, times: 3 });
    await work();
    for (const how of ["secret", "body", "old", "none"]) expect(await control("webhooks/forge", { event: completed, how })).toMatchObject({ status: 400 });
    await work();
    expect(await behindTheCurtain(`select times_seen from provider_events where id = '${completed}'`)).toEqual(["4"]);
    expect(await balances(hero.orderId)).toEqual({ 1020: 72310, 2100: -72310 });
    expect(await behindTheCurtain(`select count(*) from payments where shop_id = '${a.shop.id}'`)).toEqual(["1"]);
  });

  it("books the payout of the deposit: 703.33 to the bank, 19.77 kept", async () => {
    setClock("2026-02-20T12:00:00Z");
    await control("payout", { currency: "usd", arrivalDate: "2026-02-20" });
    await until(async () => (await behindTheCurtain("select count(*) from provider_events where type = 'payout.paid'"))[0] === "1", "the payout's event");
    await work();
    expect(await balances(hero.orderId)).toEqual({ 1010: 70333, 6100: 1977, 2100: -72310 });
    expect(await row((tx) => tx.select({ amount: payouts.amountMinor, state: payouts.state, on: payouts.arrivesOn }).from(payouts))).toEqual([{ amount: 70333, state: "booked", on: "2026-02-20" }]);
  });

  it("bills what was agreed with the deposit taken off, frozen, under a reference of the standard", async () => {
    const v2 = await sendVersion(a, hero, heroLines(hero.parts, [...HERO_LABOR, ...HERO_FOUND.labor], [...HERO_SHELF, ...HERO_FOUND.shelf]), "2026-02-26T22:30:00Z");
    must(await answerByLink(await asCustomer(a, hero, v2.estimateId, "2026-02-27T15:05:00Z"), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v2.estimateId) }));
    // Parts issued to the job, 260.52 at cost, and the carrier's bill: other rooms post these.
    await row(async (tx) => {
      must(await postEntry({ ...a.system("2026-03-12T17:00:00Z"), tx }, { date: "2026-03-12", text: "Parts issued", rule: "partsIssued", sourceKind: "test", sourceId: "1", workOrderId: hero.orderId, lines: partsIssued({ costMinor: minor(26052) }) }));
    });
    await behindTheCurtain(`update pieces set booked_in_at = now(), tag = '260224-07' where id = '${hero.pieceId}'`);
    const at = "2026-03-13T18:00:00Z";
    const draft = must(await draftInvoice(a.as("book", at), { workOrderId: hero.orderId }));
    expect(must(await draftInvoice(a.as("mgr", at), { workOrderId: hero.orderId }))).toEqual({ invoiceId: draft.invoiceId, made: false });
    invoiceId = draft.invoiceId;
    const drawn = await row(async (tx) => must(await draftSheet({ ...a.as("book", at), tx }, (await tx.select().from(invoices).where(eq(invoices.id, invoiceId)))[0] as typeof invoices.$inferSelect)));
    expect(drawn.snapshot.totals).toMatchObject({ laborMinor: 203400, laborDiscountMinor: 10170, partsMinor: 55400, suppliesMinor: 6000, freightMinor: 4200, taxableMinor: 61400, taxMinor: 4513, totalMinor: 263343 });
    const input = { invoiceId, version: 1, totalMinor: 263343 };
    expect(await issueInvoice(a.as("book", at), input)).toMatchObject({ ok: false, refusal: { code: "NOT_RELEASED" } });
    await behindTheCurtain(`update pieces set released_at = '2026-03-13T17:30:00Z' where id = '${hero.pieceId}'`);
    expect(await issueInvoice(a.as("book", at), { ...input, totalMinor: 263344 })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect(await issueInvoice(a.as("book", at), { ...input, version: 9 })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    await expect(issueInvoice(a.as("tech", at), input)).rejects.toThrow(NotFound);
    expect(await issueInvoice(b.as("owner", at), input)).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(must(await issueInvoice(a.as("book", at), input))).toEqual({ invoiceId, number: "INV-2026-00318", reference: "RF95NB202600318", totalMinor: 263343, openMinor: 191033 });
    expect(await issueInvoice(a.as("book", at), { ...input, version: 2 })).toMatchObject({ ok: false, refusal: { code: "ALREADY_ISSUED" } });
    const snapshot = (await invoiceRow(invoiceId))?.snapshot as InvoiceSnapshot;
    expect(snapshot).toMatchObject({ number: "INV-2026-00318", ruleSet: "2026-1", balanceMinor: 191033, deposit: { appliedMinor: 72310, on: "2026-02-19" }, pieces: [{ gain: { comparable: false } }] });
    expect(snapshot.approvals.map((x) => [x.version, x.totalMinor])).toEqual([[1, 241032], [2, 263343]]);
  });

  it("makes its paper once, keeps it, and mails it with a link", async () => {
    await work();
    const file = (await invoiceRow(invoiceId))?.pdfFileId;
    expect(file).toBeTruthy();
    expect(await behindTheCurtain(`select count(*) from mail_messages where kind = 'invoice' and subject like '%1,910.33%' and attachment_file_ids = array['${file ?? ""}']::uuid[]`)).toEqual(["1"]);
    await behindTheCurtain(`update jobs set done_at = null where task = 'invoices.paper'`);
    await work();
    expect((await invoiceRow(invoiceId))?.pdfFileId).toBe(file);
    expect(await behindTheCurtain("select count(*) from mail_messages where kind = 'invoice'")).toEqual(["1"]);
    await expect(row((tx) => tx.update(invoices).set({ totalMinor: 1 }).where(eq(invoices.id, invoiceId)))).rejects.toThrow();
  });

  it("is paid at the provider's page, and a second phone's payment becomes the customer's credit", async () => {
    setClock("2026-03-14T16:20:00Z");
    const counter = a.as("counter", "2026-03-14T16:20:00Z");
    const asked = must(await askInvoicePayment(counter, { invoiceId }));
    await work();
    const before = events();
    await payPage(await sessionOf(asked.requestId));
    await until(() => events() >= before + 3, "the events of a paid page");
    await work();
    expect(await invoiceRow(invoiceId)).toMatchObject({ paidMinor: 191033 });
    expect(await askInvoicePayment(counter, { invoiceId })).toMatchObject({ ok: false, refusal: { code: "NOTHING_DUE" } });
    const again = must(await takePayment(a.as("book", "2026-03-14T16:20:00Z"), { invoiceId, method: "cash", amount: "12.00", confirmed: true }));
    expect(again).toMatchObject({ receivableMinor: 0, creditMinor: 1200 });
    expect(await creditOf(a.as("book"), hero.customerId)).toBe(1200);
    // Given back, so that the job's own balances stand as in the worked example.
    const refund = must(await askRefund(a.as("book"), { paymentId: again.id, amount: "12.00", reason: "paid twice" }));
    expect(await answerRefund(a.as("book"), { refundId: refund.id, accept: true })).toMatchObject({ ok: false, refusal: { code: "SECOND_PERSON" } });
    expect(must(await answerRefund(a.as("owner"), { refundId: refund.id, accept: true }))).toMatchObject({ state: "done", alone: false });
    expect(await creditOf(a.as("book"), hero.customerId)).toBe(0);
  });

  it("explains the payout of 2,174.61 to the cent, and refuses it while a charge in it is unknown", async () => {
    setClock("2026-03-16T12:00:00Z");
    const sale = (await control("sale", { amountMinor: 41250, currency: "USD", description: "terminal" })) as { id: string };
    await control("refund", { charge: sale.id, amountMinor: 8500 });
    setClock("2026-03-17T12:00:00Z");
    await control("payout", { currency: "usd", arrivalDate: "2026-03-17" });
    await until(async () => (await behindTheCurtain("select count(*) from provider_events where type = 'payout.paid'"))[0] === "2", "the payout's event");
    await work();
    const [second] = await row((tx) => tx.select().from(payouts).where(eq(payouts.arrivesOn, "2026-03-17")));
    expect(second).toMatchObject({ amountMinor: 217461, state: "open" });
    // A person says what the terminal's charge paid: here another order's invoice, so another customer's.
    const other = await openHero(a, hero.parts, "A1194");
    const v = await sendVersion(a, other, heroLines(hero.parts, [["PIN", "1"]], []), "2026-03-10T17:00:00Z");
    must(await answerByLink(await asCustomer(a, other, v.estimateId, "2026-03-10T18:00:00Z"), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
    const d = must(await draftInvoice(a.as("mgr", "2026-03-16T17:00:00Z"), { workOrderId: other.orderId }));
    const sheet = await row(async (tx) => must(await draftSheet({ ...a.as("mgr", "2026-03-16T17:00:00Z"), tx }, (await tx.select().from(invoices).where(eq(invoices.id, d.invoiceId)))[0] as typeof invoices.$inferSelect)));
    const otherInvoice = must(await issueInvoice(a.as("mgr", "2026-03-16T17:00:00Z"), { invoiceId: d.invoiceId, version: 1, totalMinor: sheet.snapshot.totals.totalMinor }));
    const [item] = await behindTheCurtain(`select id from payout_items where payment_id is null and kind = 'charge'`);
    expect(must(await explainPayoutItem(a.as("book", "2026-03-17T17:00:00Z"), { itemId: item ?? "", invoiceId: otherInvoice.invoiceId }))).toMatchObject({ booked: false });
    // The refund of that charge, told before the charge was known here, finds its payment by the job left with the answer.
    setClock("2026-03-17T18:00:00Z");
    await work();
    expect(await row((tx) => tx.select({ state: payouts.state }).from(payouts).where(eq(payouts.arrivesOn, "2026-03-17")))).toEqual([{ state: "booked" }]);
    const bank = await behindTheCurtain(`select sum(l.amount_minor) from journal_lines l join journal_entries e on e.shop_id = l.shop_id and e.id = l.entry_id where e.date = '2026-03-17' and l.account_code = '1010' and e.rule = 'payoutSettled'`);
    expect(bank).toEqual(["217461"]);
  });

  it("ends with the balances of the worked example, summing to zero", async () => {
    await row(async (tx) => {
      must(await postEntry({ ...a.system("2026-03-16T17:00:00Z"), tx }, { date: "2026-03-16", text: "Carrier", rule: "carrierBill", sourceKind: "test", sourceId: "1", workOrderId: hero.orderId, lines: carrierBill({ amountMinor: minor(3640) }) }));
      must(await postEntry({ ...a.system("2026-03-03T17:00:00Z"), tx }, { date: "2026-03-03", text: "Goods", rule: "goodsReceived", sourceKind: "test", sourceId: "1", workOrderId: hero.orderId, lines: [{ account: "1200", amountMinor: 22500 }, { account: "2050", amountMinor: -22500 }] }));
    });
    const left = await balances(hero.orderId);
    expect(left).toEqual({
      1010: 256183, 1200: -3552, 2000: -3640, 2050: -22500, 2200: -4513, 4000: -203400, 4100: -55400, 4150: -6000, 4200: -4200, 4900: 10170, 5000: 26052, 5200: 3640, 6100: 7160,
    });
    expect(Object.values(left).reduce((x, y) => x + y, 0)).toBe(0);
    expect(await behindTheCurtain("select coalesce(sum(amount_minor), 0) from journal_lines")).toEqual(["0"]);
  });

  it("earned 1,506.42, 58.20 % of net sales, from facts that open to their rows", async () => {
    // Minutes and rates of the six people of the worked example, put on six people of this shop.
    const worked = [["rcv", 1900, 66], ["owner", 2950, 253], ["insp", 3000, 140], ["tech", 3800, 345], ["lead", 3100, 195], ["book", 2800, 150]] as const;
    for (const [who, rate, minutes] of worked) {
      await behindTheCurtain(`update pay_rates set rate_minor = ${rate} where person_id = '${a.people[who] ?? ""}'`);
      await behindTheCurtain(`insert into time_entries (shop_id, id, person_id, clock, work_order_id, started_at, ended_at, source) values ('${a.shop.id}', gen_random_uuid(), '${a.people[who] ?? ""}', 'bench', '${hero.orderId}', '2026-03-05T15:00:00Z', '2026-03-05T15:00:00Z'::timestamptz + interval '${minutes} minutes', 'test')`);
    }
    const view = await jobProfitOf(a.as("owner", "2026-03-20T17:00:00Z"), hero.orderId);
    expect(view).toMatchObject({ netSalesMinor: 258830, partsMinor: 26052, loadedLaborMinor: 71336, freightOutMinor: 3640, paymentFeesMinor: 7160, profitMinor: 150642, marginBp: 5820, minutes: 1149 });
    expect(view.rows.fees.map((r) => r.amountMinor)).toEqual([1977, 5183]);
    expect((await jobProfitOf(a.as("mgr", "2026-03-20T17:00:00Z"), hero.orderId)).rows.labor.every((l) => l.costMinor === null)).toBe(true);
    await expect(jobProfitOf(a.as("tech"), hero.orderId)).rejects.toThrow(NotFound);
    await expect(jobProfitOf(b.as("owner"), hero.orderId)).rejects.toThrow(NotFound);
  });
});

describe("what must not be booked", () => {
  it("sets a payment of another amount aside with the two sums in words", async () => {
    const at = "2026-03-20T17:00:00Z";
    setClock(at);
    const other = await openHero(a, hero.parts, "A1195");
    const v = await sendVersion(a, other, heroLines(hero.parts, [["PIN", "1"]], []), at);
    const customer = await asCustomer(a, other, v.estimateId, at);
    must(await answerByLink(customer, { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
    const asked = must(await startPayment(customer, {}));
    await openPaymentPage(customer, asked.requestId);
    await behindTheCurtain(`update payment_requests set amount_minor = amount_minor - 100 where id = '${asked.requestId}'`);
    const before = events();
    await payPage(await sessionOf(asked.requestId));
    await until(() => events() >= before + 3, "events");
    await work();
    const [reason] = await behindTheCurtain(`select parked_reason from provider_events where parked_reason like 'The provider says%'`);
    expect(reason).toContain("Nothing was booked");
    expect(await depositHeld(a.as("book"), other.orderId)).toBe(0);
  });

  it("finds a payment whose webhook was lost, at the next sweep", async () => {
    const at = "2026-03-21T17:00:00Z";
    setClock(at);
    const other = await openHero(a, hero.parts, "A1196");
    const v = await sendVersion(a, other, heroLines(hero.parts, [["PIN", "1"]], []), at);
    const customer = await asCustomer(a, other, v.estimateId, at);
    must(await answerByLink(customer, { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
    const asked = must(await startPayment(customer, {}));
    await openPaymentPage(customer, asked.requestId);
    await control("webhooks", { mode: "drop" });
    await payPage(await sessionOf(asked.requestId));
    await control("webhooks", { mode: "normal" });
    await work();
    expect(await depositHeld(a.as("book"), other.orderId)).toBe(0);
    const swept = await reconcile();
    await work();
    expect(swept.found).toBeGreaterThan(0);
    expect(await depositHeld(a.as("book"), other.orderId)).toBe(asked.amountMinor);
  });

  it("shows no other shop's payment, request or refund", async () => {
    const [p] = await row((tx) => tx.select().from(payments).where(and(eq(payments.shopId, a.shop.id), eq(payments.method, "card"))).limit(1));
    expect(await askRefund(b.as("owner"), { paymentId: p?.id ?? "", amount: "1.00", reason: "not mine" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await askInvoicePayment(b.as("owner"), { invoiceId })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await takePayment(b.as("owner"), { invoiceId, method: "cash", amount: "1.00" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await row((tx) => tx.select({ id: payments.id }).from(payments), b)).toEqual([]);
    await expect(takePayment(a.as("tech"), { invoiceId, method: "cash", amount: "1.00" })).rejects.toThrow(NotFound);
    await expect(askRefund(a.as("counter"), { paymentId: p?.id ?? "", amount: "1.00", reason: "no" })).rejects.toThrow(NotFound);
  });

  it("refuses a card number in a note, a third decimal, and asks about ten times the open sum", async () => {
    const order = await openHero(a, hero.parts, "A1197");
    const v = await sendVersion(a, order, heroLines(hero.parts, [["PIN", "1"]], []), "2026-03-22T17:00:00Z");
    must(await answerByLink(await asCustomer(a, order, v.estimateId, "2026-03-22T18:00:00Z"), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
    const take = (amount: string, note = "", confirmed = false) => takePayment(a.as("counter", "2026-03-22T19:00:00Z"), { workOrderId: order.orderId, method: "cheque", amount, note, confirmed });
    expect(await take("100.00", "4242 4242 4242 4242")).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "note" }] } });
    expect(await take("100.005")).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "amount" }] } });
    expect(await take("20000.00")).toMatchObject({ ok: false, refusal: { code: "ASK_LARGE", field: "amount" } });
    must(await take("50.00", "4711"));
    expect(await take("50.00", "4711")).toMatchObject({ ok: false, refusal: { code: "ASK_CHEQUE", field: "note" } });
    must(await take("50.00", "4711", true));
  });
});

