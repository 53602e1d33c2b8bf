import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { invoices } from "@/db/schema";
import { withShop } from "@/db/scope";
import { addPart, setKit } from "@/modules/stock/commands/parts";
import { openStock } from "@/modules/stock/commands/adjust";
import { addSupplier } from "@/modules/purchasing/commands/suppliers";
import { draftPurchaseOrder, sendPurchaseOrder } from "@/modules/purchasing/commands/orders";
import { receiveGoods } from "@/modules/purchasing/commands/receive";
import { draftInvoice } from "@/modules/invoices/draft";
import { addBench, addFixture, recordBenchCheck } from "@/modules/flow/commands/gear";
import { issueComparison } from "@/modules/flow/commands/issue-comparison";
import { postWholeTest } from "@/modules/flow/commands/post-test";
import { issueInvoice } from "@/modules/invoices/issue";
import { draftSheet } from "@/modules/invoices/sheet";
import { askInvoicePayment, askRefund, takePayment } from "@/modules/payments/commands";
import { doorIn, doorOut } from "@/modules/time/commands/door";
import { answerByLink } from "@/modules/work-orders/commands/answer-estimate";
import { operationDone, startOperation } from "@/modules/work-orders/commands/bench-clock";
import { recordFinding } from "@/modules/work-orders/commands/findings";
import { setHold } from "@/modules/work-orders/commands/holds";
import { issueToWorkOrder } from "@/modules/work-orders/commands/parts";
import { addPhoto } from "@/modules/work-orders/commands/photos";
import { receivePiece } from "@/modules/work-orders/commands/receive-piece";
import { HERO_EPOXY, HERO_KIT, HERO_PARTS } from "@/seed/facts/ninebark";
import { behindTheCurtain } from "./database";
import { asCustomer, HERO_LABOR, HERO_SHELF, hashOf, heroLines, heroMenu, openHero, pieceVersion, sendVersion, type HeroOrder } from "./hero-order";
import { HERO_CAM_UM, HERO_FLOWS, HERO_LIFTS_UM } from "./hero-flow";
import { must, type TestShop } from "./shop";
import { enrolledTablet, type Tablet } from "./tablet";

export interface FurnishedShop extends TestShop { hero: HeroOrder; estimateId: string; invoiceId: string; tablet: Tablet; partIds: Record<string, string> }

const one = async (sql: string): Promise<string> => (await behindTheCurtain(sql))[0] ?? "";

/** Parts and opening stock of the hero job, put on the shelf the way a person does, so that the books know of them. */
async function shelf(shop: TestShop): Promise<Record<string, string>> {
  const ids: Record<string, string> = {};
  const owner = shop.as("owner", "2026-01-02T16:00:00Z");
  for (const p of HERO_PARTS) {
    ids[p.sku] = must(await addPart(owner, { sku: p.sku, description: p.description, partClass: p.partClass, position: p.position, bin: p.bin, salePrice: p.sale })).id;
    if (p.opening > 0) must(await openStock(owner, { partId: ids[p.sku] ?? "", qty: String(p.opening), value: (p.opening * Number(p.unitCost)).toFixed(2) }));
  }
  ids[HERO_EPOXY.sku] = must(await addPart(owner, { sku: HERO_EPOXY.sku, description: HERO_EPOXY.description, partClass: "epoxy", stockUnit: "gram", lotTracked: true, salePrice: HERO_EPOXY.sale })).id;
  must(await openStock(owner, { partId: ids[HERO_EPOXY.sku] ?? "", qty: "900", value: "111.60", lotCode: "E-2604", expiresOn: "2026-10-31" }));
  ids[HERO_KIT.sku] = must(await addPart(owner, { sku: HERO_KIT.sku, description: HERO_KIT.description, partClass: "kit", isKit: true, salePrice: HERO_KIT.sale })).id;
  must(await setKit(owner, { kitPartId: ids[HERO_KIT.sku] ?? "", version: 1, lines: HERO_KIT.contents.map(([sku, qty]) => ({ partId: ids[sku] ?? "", qty: String(qty) })) }));
  return ids;
}

const inches = (um: number): string => (um / 25_400).toFixed(3);

/** Both sides before and after, on one bench, and the comparison handed out. */
async function flowed(shop: TestShop, headId: string): Promise<void> {
  const at = (iso: string) => shop.as("insp", iso);
  const benchId = must(await addBench(shop.as("owner", "2026-02-25T15:00:00Z"), { name: "Bench 1" })).id;
  const fixtureId = must(await addFixture(shop.as("owner", "2026-02-25T15:05:00Z"), { name: "77", boreMm: "77" })).id;
  for (const [purpose, when, day] of [["baseline", "before", "2026-02-26"], ["after", "after", "2026-03-12"]] as const) {
    must(await recordBenchCheck(at(`${day}T15:40:00Z`), { benchId, isFine: true, note: "looked over" }));
    for (const side of ["intake", "exhaust"] as const) {
      must(await postWholeTest(at(`${day}T17:00:00Z`), {
        headId, benchId, fixtureId, side, purpose, nominal: "28", camLift: inches(HERO_CAM_UM), entry: side === "intake" ? "radius" : "none", complete: true,
        readings: HERO_LIFTS_UM.map((um, i) => ({ lift: inches(um), value: (HERO_FLOWS[side][when][i] ?? 0).toFixed(1), acceptedReason: "as read" })),
      }));
    }
  }
  must(await issueComparison(at("2026-03-12T18:00:00Z"), { headId, customerWords: "as flowed" }));
}

/**
 * Tells a whole job in a test shop through the product's own commands: stock, purchase, order, approval, deposit, bench,
 * invoice, payment, refund asked. What it leaves holds every invariant.
 */
export async function furnish(shop: TestShop): Promise<FurnishedShop> {
  const owner = (at: string) => shop.as("owner", at);
  await heroMenu(shop);
  const partIds = await shelf(shop);
  const hero = await openHero(shop, partIds);
  const sent = await sendVersion(shop, hero, heroLines(partIds, HERO_LABOR, HERO_SHELF), "2026-02-18T17:00:00Z");
  must(await answerByLink(await asCustomer(shop, hero, sent.estimateId, "2026-02-19T17:42:00Z"), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(shop, sent.estimateId) }));
  must(await takePayment(owner("2026-02-19T18:00:00Z"), { workOrderId: hero.orderId, method: "cash", amount: "723.10" }));
  must(await addPhoto(owner("2026-02-24T16:00:00Z"), { subjectKind: "piece", subjectId: hero.pieceId, name: "face.jpg", storageKey: `${shop.shop.id}/photo/${randomUUID()}.jpg`, thumbKey: null, sizeBytes: 1000, sha256: "a".repeat(64) }));
  must(await receivePiece(owner("2026-02-24T17:00:00Z"), { pieceId: hero.pieceId, version: await pieceVersion(shop, hero.pieceId), parcelCondition: "sound", counts: { valves: "4" }, fewPhotosOk: true }));

  const supplier = must(await addSupplier(owner("2026-02-25T16:00:00Z"), { name: "Greywater Valve Supply", email: "orders@greywater.example" }));
  const order = must(await draftPurchaseOrder(owner("2026-02-25T16:10:00Z"), { supplierId: supplier.id, lines: [{ partId: partIds["VEX-S250-265"] ?? "", qty: "4", price: "22.00", workOrderId: hero.orderId }] }));
  must(await sendPurchaseOrder(owner("2026-02-25T16:20:00Z"), { id: order.id, version: 1 }));
  const lineId = await one(`select id from purchase_order_lines where purchase_order_id = '${order.id}'`);
  must(await receiveGoods(owner("2026-03-03T16:00:00Z"), { purchaseOrderId: order.id, freight: "9.60", lines: [{ lineId, came: "2" }] }));

  const need = await one(`select id from work_order_parts where shop_id = '${shop.shop.id}' and part_id = '${partIds["SEL-55"]}'`);
  must(await issueToWorkOrder(owner("2026-03-04T16:00:00Z"), { workOrderPartId: need, qty: "4" }));
  const clean = await one(`select id from operations where work_order_id = '${hero.orderId}' and code = 'CLN'`);
  must(await doorIn(shop.as("tech", "2026-03-05T15:00:00Z"), {}));
  must(await startOperation(shop.as("tech", "2026-03-05T15:10:00Z"), { operationId: clean }));
  must(await operationDone(shop.as("tech", "2026-03-05T15:38:00Z"), { operationId: clean }));
  must(await doorOut(shop.as("tech", "2026-03-05T23:00:00Z"), {}));
  must(await recordFinding(shop.as("tech", "2026-03-05T16:00:00Z"), { pieceId: hero.pieceId, words: "Exhaust guides out of limit", position: "exhaust" }));
  must(await setHold(owner("2026-03-05T16:05:00Z"), { pieceId: hero.pieceId, reason: "customer answer", words: "asked about the guides" }));

  await flowed(shop, await one(`select id from heads where piece_id = '${hero.pieceId}'`));

  const { invoiceId } = must(await draftInvoice(owner("2026-03-13T18:00:00Z"), { workOrderId: hero.orderId }));
  must(await issueInvoice(owner("2026-03-13T18:10:00Z"), { invoiceId, version: 1, totalMinor: await totalOnScreen(shop, invoiceId) }));
  must(await askInvoicePayment(owner("2026-03-13T18:20:00Z"), { invoiceId }));
  const paid = must(await takePayment(owner("2026-03-14T18:00:00Z"), { invoiceId, method: "cheque", amount: "500.00", note: "4711" }));
  must(await askRefund(owner("2026-03-14T19:00:00Z"), { paymentId: paid.id, amount: "20.00", reason: "goodwill on the gasket" }));
  return { ...shop, hero, estimateId: sent.estimateId, invoiceId, tablet: await enrolledTablet(shop), partIds };
}

/** The total of a draft as its page shows it. */
async function totalOnScreen(shop: TestShop, invoiceId: string): Promise<number> {
  return withShop(shop.shop.id, async (tx) => {
    const [row] = await tx.select().from(invoices).where(and(eq(invoices.shopId, shop.shop.id), eq(invoices.id, invoiceId)));
    if (!row) throw new Error("no draft");
    return must(await draftSheet({ ...shop.as("owner", "2026-03-13T18:10:00Z"), tx }, row)).snapshot.totals.totalMinor;
  });
}
