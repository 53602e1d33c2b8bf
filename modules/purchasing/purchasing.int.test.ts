import { beforeAll, describe, expect, it } from "vitest";
import { and, eq } from "drizzle-orm";
import { workOrders } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { needPart } from "@/modules/work-orders/commands/parts";
import { partsOf } from "@/modules/work-orders/queries/parts";
import { getPart } from "@/modules/stock/queries/get-part";
import { benchJob, type BenchJob } from "@/tests/support/bench-job";
import { behindTheCurtain } from "@/tests/support/database";
import { heroParts } from "@/tests/support/hero-parts";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { cancelPurchaseOrder, changePurchaseOrder, draftPurchaseOrder, expectPurchaseOrder, sendPurchaseOrder } from "./commands/orders";
import { receiveGoods } from "./commands/receive";
import { reverseReceipt } from "./commands/reverse-receipt";
import { addSupplier, changeSupplier } from "./commands/suppliers";
import { findOrdersInput } from "./input";
import { makeOrderPaper, orderPdf } from "./paper-job";
import { findOrders, getOrder } from "./queries/orders";
import { suggestionsFor } from "./queries/suggestions";
import { getSupplier } from "./queries/suppliers";

let a: TestShop, b: TestShop, id: (sku: string) => string, supplierId: string, job: BenchJob, later: BenchJob;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  id = await heroParts(a);
  supplierId = must(await addSupplier(a.as("book"), { name: "Greywater Valve", email: "orders@greywater.example", address: "9 Sluice Row\nPell", leadDays: "4" })).id;
  job = await benchJob(a, ["GDE"]);
  later = await benchJob(a, ["GDE"]);
  await withShop(a.shop.id, async (tx) => {
    for (const [j, promisedOn] of [[job, "2026-03-20"], [later, "2026-03-27"]] as const) await tx.update(workOrders).set({ promisedOn }).where(and(eq(workOrders.shopId, a.shop.id), eq(workOrders.id, j.workOrderId)));
  });
  must(await needPart(a.as("lead"), { workOrderId: job.workOrderId, partId: id("EV-S250"), qty: "2", pieceId: job.pieceId }));
  must(await needPart(a.as("lead"), { workOrderId: later.workOrderId, partId: id("EV-S250"), qty: "6" }));
});

const account = async (code: string) => Number((await behindTheCurtain(`select coalesce(sum(amount_minor), 0) from journal_lines where shop_id = '${a.shop.id}' and account_code = '${code}'`))[0]);
const at = "2026-03-03T17:00:00Z";
const heroLines = () => [
  { partId: id("EV-S250"), supplierNumber: "GW-EX-22", qty: "6", price: "22.00", workOrderId: job.workOrderId },
  { partId: id("GV-S250"), supplierNumber: "GW-G-5", qty: "10", price: "7.80" },
];
const asks = (q: string) => findOrdersInput.parse({ q, view: "all" });

describe("the purchase order of the hero job", () => {
  let poId = "", number = "";

  it("is suggested from what is short, once for each order, until it is on its way", async () => {
    const rows = (await suggestionsFor(a.as("lead"))).flatMap((g) => g.rows);
    expect(rows.map((r) => [r.sku, r.qtyMilli, r.why, r.workOrderId])).toEqual([["EV-S250", 2000, "short", job.workOrderId], ["EV-S250", 6000, "short", later.workOrderId]]);
    poId = must(await draftPurchaseOrder(a.as("counter", "2026-02-27T16:00:00Z"), { supplierId, lines: heroLines() })).id;
    const left = (await suggestionsFor(a.as("lead"))).flatMap((g) => g.rows);
    expect(left.map((r) => [r.sku, r.qtyMilli, r.workOrderId])).toEqual([["EV-S250", 6000, later.workOrderId]]);
  });

  it("takes its number when it is sent, mails itself once with its paper, and is expected by lead time", async () => {
    const sent = must(await sendPurchaseOrder(a.as("counter", "2026-02-27T16:05:00Z"), { id: poId, version: 1 }));
    number = sent.number;
    expect(number).toBe("PO-2026-0001");
    expect(await sendPurchaseOrder(a.as("counter"), { id: poId, version: sent.version })).toMatchObject({ ok: false, refusal: { code: "ALREADY_SENT" } });
    const paper = { purchaseOrderId: poId, revision: 1, mail: true };
    await makeOrderPaper(a.system(), paper);
    await makeOrderPaper(a.system(), paper);
    const order = await getOrder(a.as("book"), number);
    expect(order).toMatchObject({ state: "sent", expectedOn: "2026-03-03", revision: 1, partsMinor: 21_000 });
    expect(order.mail.map((m) => [m.to, m.state])).toEqual([["orders@greywater.example", "queued"]]);
    expect(await behindTheCurtain(`select cardinality(attachment_file_ids) from mail_messages where subject_id = '${poId}'`)).toEqual(["1"]);
    expect(Buffer.from((await orderPdf(a.as("book"), poId)).bytes.slice(0, 5)).toString()).toBe("%PDF-");
  });

  it("goes out again as revision 2 when it changes, and not from a stale page", async () => {
    const order = await getOrder(a.as("counter"), number);
    const lines = order.lines.map((l, i) => ({ id: l.id, ...heroLines()[i], partId: l.partId, qty: heroLines()[i]?.qty ?? "", price: heroLines()[i]?.price ?? "" }));
    const changed = must(await changePurchaseOrder(a.as("counter"), { id: poId, version: order.version, notes: "Please pack the valves singly", lines }));
    expect(changed.revision).toBe(2);
    expect(await changePurchaseOrder(a.as("mgr"), { id: poId, version: order.version, notes: "", lines })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    await makeOrderPaper(a.system(), { purchaseOrderId: poId, revision: 1, mail: true });
    await makeOrderPaper(a.system(), { purchaseOrderId: poId, revision: 2, mail: true });
    expect((await getOrder(a.as("counter"), number)).mail).toHaveLength(2);
    must(await expectPurchaseOrder(a.as("counter"), { id: poId, version: changed.version, expectedOn: "2026-03-03" }));
  });

  it("keeps the prices that stand when somebody who does not see them changes the lines", async () => {
    const order = await getOrder(a.as("counter"), number);
    const lines = order.lines.map((l) => ({ id: l.id, partId: l.partId, supplierNumber: l.supplierNumber, qty: String(l.qtyMilli / 1000), price: "", workOrderId: l.workOrderId ?? "" }));
    expect(await changePurchaseOrder(a.as("book"), { id: poId, version: order.version, lines })).toMatchObject({ ok: false, refusal: { code: "PRICE_MISSING", field: "lines.0.price" } });
    must(await changePurchaseOrder(a.as("counter"), { id: poId, version: order.version, notes: order.notes, lines }));
    expect((await getOrder(a.as("book"), number)).lines.map((l) => l.unitPriceMinor)).toEqual([2200, 780]);
  });

  it("comes in with its freight shared by value: 9.43 and 5.57, valves 141.43, guides 128.57 for sixteen", async () => {
    const order = await getOrder(a.as("rcv"), number);
    const [valves, guides] = order.lines;
    const key = requestId();
    const input = { purchaseOrderId: poId, freight: "15.00", deliveryNote: "GW 5521", lines: [{ lineId: valves?.id ?? "", came: "6" }, { lineId: guides?.id ?? "", came: "10" }] };
    const taps = await Promise.all(Array.from({ length: 5 }, () => receiveGoods(a.as("rcv", at), input, { requestId: key })));
    expect(new Set(taps.map((t) => must(t).number))).toEqual(new Set(["REC-2026-0001"]));
    expect(await behindTheCurtain(`select freight_share_minor from receipt_lines where shop_id = '${a.shop.id}' order by 1`)).toEqual(["557", "943"]);
    expect(await getPart(a.as("book", at), "EV-S250")).toMatchObject({ onHandMilli: 6000, valueMinor: 14_143, unitCost: "23.571667", lastPriceMinor: 2200 });
    expect(await getPart(a.as("book", at), "GV-S250")).toMatchObject({ onHandMilli: 16_000, valueMinor: 12_857, unitCost: "8.035625" });
    expect(await behindTheCurtain(`select e.date || ' ' || string_agg(l.account_code || ' ' || l.amount_minor, ', ' order by l.line_no) from journal_entries e join journal_lines l on l.shop_id = e.shop_id and l.entry_id = e.id where e.rule = 'goodsReceived' group by e.id, e.date`)).toEqual(["2026-03-03 1200 22500, 2050 -22500"]);
    expect((await getOrder(a.as("rcv"), number)).state).toBe("in");
  });

  it("reserves at once for the order it was bought for, then for the earlier promise", async () => {
    expect((await partsOf(a.as("tech", at), job.workOrderId))[0]).toMatchObject({ sku: "EV-S250", reservedMilli: 2000, state: "ready", costMinor: null });
    expect((await partsOf(a.as("tech", at), later.workOrderId))[0]).toMatchObject({ reservedMilli: 4000, shortMilli: 2000, state: "partly" });
  });

  it("hides its prices from who may not see cost, and itself from the technician and the other shop", async () => {
    const figures = async (who: string) => {
      const o = await getOrder(a.as(who), number);
      const [row] = (await findOrders(a.as(who), asks(number))).rows;
      return [o.partsMinor, o.freightMinor, o.lines[0]?.unitPriceMinor, o.lines[0]?.valueMinor, o.receipts[0]?.freightMinor, o.receipts[0]?.lines[0]?.landedMinor, o.pdfFileId, row?.totalMinor];
    };
    for (const who of ["rcv", "counter", "lead"]) {
      expect(await figures(who)).toEqual([null, null, null, null, null, null, null, null]);
      await expect(orderPdf(a.as(who), poId)).rejects.toThrow(NotFound);
      expect((await suggestionsFor(a.as(who))).flatMap((g) => g.rows).every((r) => r.lastPriceMinor === null)).toBe(true);
    }
    for (const who of ["book", "mgr", "owner"]) expect((await figures(who)).every((f) => f !== null)).toBe(true);
    const seen = await getOrder(a.as("rcv"), number);
    await expect(getOrder(a.as("tech"), number)).rejects.toThrow(NotFound);
    await expect(getOrder(b.as("owner"), number)).rejects.toThrow(NotFound);
    await expect(getOrder(b.as("owner"), poId)).rejects.toThrow(NotFound);
    await expect(getSupplier(b.as("owner"), supplierId)).rejects.toThrow(NotFound);
    expect((await findOrders(b.as("owner"), asks(""))).rows).toEqual([]);
    expect(await suggestionsFor(b.as("owner"))).toEqual([]);
    await expect(receiveGoods(a.as("book"), { purchaseOrderId: poId, lines: [{ lineId: seen.lines[0]?.id ?? "", came: "1" }] })).rejects.toThrow(NotFound);
    for (const refused of [
      await receiveGoods(b.as("owner"), { purchaseOrderId: poId, lines: [{ lineId: seen.lines[0]?.id ?? "", came: "1" }] }), await sendPurchaseOrder(b.as("owner"), { id: poId, version: 1 }),
      await changePurchaseOrder(b.as("owner"), { id: poId, version: 1, lines: [] }), await cancelPurchaseOrder(b.as("owner"), { id: poId, version: 1, reason: "mine" }), await expectPurchaseOrder(b.as("owner"), { id: poId, version: 1, expectedOn: "2026-03-03" }),
      await reverseReceipt(b.as("owner"), { receiptId: seen.receipts[0]?.id ?? "", reason: "mine" }), await changeSupplier(b.as("owner"), { id: supplierId, version: 1, name: "Mine" }),
      await draftPurchaseOrder(b.as("owner"), { supplierId, lines: [] }),
    ]) expect(refused).toMatchObject({ ok: false });
    expect((await getOrder(a.as("rcv"), number)).version).toBe(seen.version);
    expect((await findOrders(a.as("rcv"), asks("ev-s250"))).rows).toMatchObject([{ number, totalMinor: null, state: "in", forOrders: [expect.stringContaining("WO-TEST")] }]);
  });

  it("goes back as far as it is still on the shelf, once, and the books follow", async () => {
    const [receipt] = (await getOrder(a.as("rcv"), number)).receipts;
    must(await reverseReceipt(a.as("rcv", at), { receiptId: receipt?.id ?? "", reason: "booked on the wrong order" }));
    expect(await getPart(a.as("book", at), "EV-S250")).toMatchObject({ onHandMilli: 0, valueMinor: 0 });
    // Ten guides leave at what they came in for, 83.57: the six of 45.00 are as they were.
    expect(await getPart(a.as("book", at), "GV-S250")).toMatchObject({ onHandMilli: 6000, valueMinor: 4500 });
    expect(await account("2050")).toBe(0);
    expect(await account("1200")).toBe(Number((await behindTheCurtain(`select sum(value_minor) from stock_balances where shop_id = '${a.shop.id}'`))[0]));
    expect(await reverseReceipt(a.as("rcv", at), { receiptId: receipt?.id ?? "", reason: "again" })).toMatchObject({ ok: false, refusal: { code: "NOTHING_LEFT" } });
    expect((await getOrder(a.as("rcv"), number)).state).toBe("sent");
    expect((await partsOf(a.as("tech", at), job.workOrderId))[0]).toMatchObject({ reservedMilli: 0, state: "short", arriving: { number, expectedOn: "2026-03-03" } });
  });
});

describe("taking in", () => {
  async function sent(lines: { partId: string; qty: string; price: string }[]) {
    const { id: po } = must(await draftPurchaseOrder(a.as("mgr"), { supplierId, lines }));
    const { version } = must(await sendPurchaseOrder(a.as("mgr"), { id: po, version: 1, by: "hand" }));
    return { po, version, lineIds: (await getOrder(a.as("mgr"), po)).lines.map((l) => l.id) };
  }

  it("asks what becomes of twelve for ten, and takes in ten when two go back", async () => {
    const { po, lineIds } = await sent([{ partId: id("SL-S250"), qty: "10", price: "2.45" }]);
    const line = { lineId: lineIds[0] ?? "", came: "12" };
    expect(await receiveGoods(a.as("rcv", at), { purchaseOrderId: po, lines: [line] })).toMatchObject({ ok: false, refusal: { code: "OVER_DELIVERY", field: "lines.0.over", data: { openMilli: 10_000, overMilli: 2000 } } });
    must(await receiveGoods(a.as("rcv", at), { purchaseOrderId: po, lines: [{ ...line, over: "return" }] }));
    const order = await getOrder(a.as("mgr"), po);
    expect(order).toMatchObject({ state: "in", receipts: [{ deliveryNote: "2 SL-S250 over, returned" }] });
    expect(order.lines[0]?.receivedMilli).toBe(10_000);
  });

  it("keeps the rest open when part of it came, and lets no line fall below what came", async () => {
    const { po, lineIds } = await sent([{ partId: id("SH-S250"), qty: "8", price: "2.60" }, { partId: id("HG-S250"), qty: "2", price: "16.90" }]);
    must(await receiveGoods(a.as("rcv", at), { purchaseOrderId: po, lines: [{ lineId: lineIds[0] ?? "", came: "3" }, { lineId: lineIds[1] ?? "", came: "" }] }));
    const order = await getOrder(a.as("mgr"), po);
    expect([order.state, order.lines.map((l) => l.openMilli)]).toEqual(["partly in", [5000, 2000]]);
    const lines = order.lines.map((l) => ({ id: l.id, partId: l.partId, qty: "2", price: "2.60" }));
    expect(await changePurchaseOrder(a.as("mgr"), { id: po, version: order.version, lines })).toMatchObject({ ok: false, refusal: { code: "LINE_RECEIVED", field: "lines.0.qty" } });
    must(await cancelPurchaseOrder(a.as("mgr"), { id: po, version: order.version, reason: "bought elsewhere" }));
    expect(await getOrder(a.as("mgr"), po)).toMatchObject({ state: "in", lines: [{ qtyMilli: 3000, receivedMilli: 3000 }] });
  });

  it("asks for lot and expiry of what is kept by lot, and refuses a lot past its date", async () => {
    const { po, lineIds } = await sent([{ partId: id("EP-04"), qty: "1000", price: "0.12" }]);
    const take = (more: object) => receiveGoods(a.as("rcv", at), { purchaseOrderId: po, lines: [{ lineId: lineIds[0] ?? "", came: "1000", ...more }] });
    expect(await take({})).toMatchObject({ ok: false, refusal: { code: "LOT_MISSING", field: "lines.0.lotCode" } });
    expect(await take({ lotCode: "E-2611" })).toMatchObject({ ok: false, refusal: { code: "EXPIRY_MISSING", field: "lines.0.expiresOn" } });
    expect(await take({ lotCode: "E-2611", expiresOn: "2026-03-01" })).toMatchObject({ ok: false, refusal: { code: "LOT_EXPIRED", field: "lines.0.expiresOn" } });
    expect(await take({ lotCode: "E-2611", expiresOn: "2026-02-30" })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "lines.0.expiresOn" }] } });
    must(await take({ lotCode: "E-2611", expiresOn: "2027-01-31" }));
    expect((await getPart(a.as("tech", at), "EP-04")).lots.find((l) => l.code === "E-2611")).toMatchObject({ onHandMilli: 1_000_000, state: "good" });
  });

  it("refuses nothing, a draft, a negative quantity and half a valve", async () => {
    const { id: draft } = must(await draftPurchaseOrder(a.as("mgr"), { supplierId, lines: [{ partId: id("IV-S250"), qty: "2", price: "31.40" }] }));
    const lineId = (await getOrder(a.as("mgr"), draft)).lines[0]?.id ?? "";
    expect(await receiveGoods(a.as("rcv", at), { purchaseOrderId: draft, lines: [{ lineId, came: "2" }] })).toMatchObject({ ok: false, refusal: { code: "NOT_SENT" } });
    must(await sendPurchaseOrder(a.as("mgr"), { id: draft, version: 1, by: "hand" }));
    expect(await receiveGoods(a.as("rcv", at), { purchaseOrderId: draft, lines: [{ lineId, came: "0" }] })).toMatchObject({ ok: false, refusal: { code: "NOTHING_CAME" } });
    expect(await receiveGoods(a.as("rcv", at), { purchaseOrderId: draft, lines: [{ lineId, came: "-2" }] })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
    expect(await receiveGoods(a.as("rcv", at), { purchaseOrderId: draft, lines: [{ lineId, came: "0.5" }] })).toMatchObject({ ok: false, refusal: { code: "NOT_WHOLE_PIECES", field: "lines.0.came" } });
  });

  it("is not sent without lines, without a price, or by mail to nobody", async () => {
    const { id: empty } = must(await draftPurchaseOrder(a.as("mgr"), { supplierId, lines: [] }));
    expect(await sendPurchaseOrder(a.as("mgr"), { id: empty, version: 1 })).toMatchObject({ ok: false, refusal: { code: "ORDER_EMPTY" } });
    const { id: unpriced } = must(await draftPurchaseOrder(a.as("mgr"), { supplierId, lines: [{ partId: id("SS-S250"), qty: "4" }] }));
    expect(await sendPurchaseOrder(a.as("mgr"), { id: unpriced, version: 1 })).toMatchObject({ ok: false, refusal: { code: "PRICE_MISSING" } });
    const mute = must(await addSupplier(a.as("mgr"), { name: "By Telephone Only", phone: "5550100" })).id;
    const { id: quiet } = must(await draftPurchaseOrder(a.as("mgr"), { supplierId: mute, lines: [{ partId: id("IV-S250"), qty: "1", price: "31.40" }] }));
    expect(await sendPurchaseOrder(a.as("mgr"), { id: quiet, version: 1 })).toMatchObject({ ok: false, refusal: { code: "NO_MAIL_ADDRESS", field: "by" } });
    expect(await addSupplier(a.as("mgr"), { name: "By Telephone Only" })).toMatchObject({ ok: false, refusal: { code: "NAME_TAKEN", field: "name" } });
    await expect(addSupplier(a.as("rcv"), { name: "Mine" })).rejects.toThrow(NotFound);
  });
});
