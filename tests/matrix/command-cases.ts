import type { At, World } from "./world";

export interface Case {
  /** An input with another shop's ids at every place an id can stand. */
  input(at: At, world: World): unknown;
  /** Who of A asks; the owner when left out. `customer`: by a link that names B's matter. `tablet`: A's tablet. */
  as?: "customer" | "tablet";
  /** Places that take an id which the asker makes up itself. */
  ownMade?: readonly string[];
}

const part = { description: "Valve", partClass: "valve", salePrice: "1.00" };
const menu = { code: "ZZZ", name: "Name", station: "Porting", skill: "porting", sequence: 10, bookHours: "1", price: "1.00" };
const estimateLine = { description: "Line", qty: "1", unitPrice: "1.00" };
const proof = (at: At) => ({ kind: "pass", personId: at("people").id, pass: "x".repeat(60) });
const stamp = { ownMade: ["actId"] } as const;
const actId = "0b5a9c5e-7f4e-4a35-9f58-5a0d3f1f6a10";
const edit = (at: At, table: string) => { const { id, version } = at(table); return { id, version }; };
/** The same under the name that a command gives the id. */
const named = (at: At, table: string, name: string) => { const { id, version } = at(table); return { [name]: id, version }; };

/** One case a command that takes an id. A command without one fails the matrix. */
export const COMMAND_CASES: Record<string, Case> = {
  "customers.change": { input: (at) => ({ ...edit(at, "customers"), name: "Taken", phone: "5550000" }) },

  "orders.open": { input: (at) => ({ customerId: at("customers").id, pieces: [{ family: "S250-4V" }], use: "road" }) },
  "orders.change": { input: (at) => ({ ...edit(at, "work_orders"), wants: "x", use: "road", customerReference: "", notes: "" }) },
  "orders.promise": { input: (at) => ({ ...named(at, "work_orders", "workOrderId"), promisedOn: "2026-04-20", reason: "because" }) },
  "orders.cancel": { input: (at) => ({ ...named(at, "work_orders", "workOrderId"), reason: "because" }) },
  "pieces.add": { input: (at) => ({ workOrderId: at("work_orders").id, family: "S250-4V" }) },
  "pieces.receive": { input: (at) => ({ ...named(at, "pieces", "pieceId"), parcelCondition: "sound", fewPhotosOk: true }) },
  "pieces.print-tag": { input: (at) => ({ pieceId: at("pieces").id }) },
  "pieces.place": { input: (at) => ({ ...named(at, "pieces", "pieceId"), place: "shelf 1" }) },
  "pieces.release": { input: (at) => ({ ...named(at, "pieces", "pieceId"), checked: [] }) },
  "pieces.refuse-release": { input: (at) => ({ pieceId: at("pieces").id, reason: "because" }) },
  "pieces.reopen": { input: (at) => ({ ...named(at, "pieces", "pieceId"), reason: "because" }) },
  "pieces.hand-over": { input: (at) => ({ workOrderId: at("work_orders").id, pieceIds: [at("pieces").id], to: "Somebody", unpaidOk: true }) },
  "pieces.ship": { input: (at) => ({ workOrderId: at("work_orders").id, pieceIds: [at("pieces").id], carrier: "Carrier", insured: "", cost: "1.00", unpaidOk: true }) },
  "photos.add": { input: (at, w) => ({ subjectKind: "piece", subjectId: at("pieces").id, name: "x.jpg", storageKey: `${w.a.shop.id}/photo/x.jpg`, thumbKey: null, sizeBytes: 1, sha256: "a".repeat(64) }) },
  "holds.set": { input: (at) => ({ pieceId: at("pieces").id, reason: "parts" }) },
  "holds.end": { input: (at) => ({ holdId: at("holds").id }) },
  "findings.record": { input: (at) => ({ pieceId: at("pieces").id, words: "found it" }) },
  "findings.ask": { input: (at) => named(at, "findings", "findingId") },
  "findings.withdraw": { input: (at) => named(at, "findings", "findingId") },
  "operations.mark": { input: (at) => ({ ...named(at, "operations", "operationId"), to: "done" }) },
  "menu.change": { input: (at) => ({ ...edit(at, "menu_operations"), ...menu }) },
  "estimates.start": { input: (at) => ({ workOrderId: at("work_orders").id, findingIds: [at("findings").id] }) },
  "estimates.save": { input: (at) => ({
    ...named(at, "estimates", "estimateId"), laborDiscountPercent: "0", freight: "0", depositPercent: "0", exclusions: "", message: "", readyOn: "",
    lines: [{ kind: "part", pieceNo: 1, partId: at("parts").id, findingId: at("findings").id, ...estimateLine }],
  }) },
  "estimates.send": { input: (at) => ({ ...named(at, "estimates", "estimateId"), to: "" }) },
  "estimates.answer-spoken": { input: (at) => ({ estimateId: at("estimates").id, answer: "approved", via: "counter", name: "Somebody" }) },
  "workOrders.reopenOperation": { input: (at) => ({ operationId: at("operations").id, reason: "because" }) },
  "workOrders.epoxyFill": { input: (at, w) => ({
    pieceId: at("pieces").id, operationId: at("operations").id, partId: at("parts", w.a.partIds["EPX-PORT"]).id, lotId: at("lots").id, port: "intake", gramsInPort: "10", gramsWaste: "1", ratio: "100:20", surfacePrepared: true,
    mixedAt: "2026-03-20T09:00", cureHours: "24",
  }) },
  "workOrders.issuePart": { input: (at) => ({ workOrderPartId: at("work_order_parts").id, qty: "1", lotId: at("lots").id, moreThanNeeded: true }) },
  "workOrders.issueReady": { input: (at) => ({ workOrderId: at("work_orders").id }) },
  "workOrders.returnPart": { input: (at) => ({ workOrderPartId: at("work_order_parts").id, qty: "1" }) },
  "workOrders.needPart": { input: (at) => ({ workOrderId: at("work_orders").id, partId: at("parts").id, qty: "1", pieceId: at("pieces").id }) },
  "workOrders.dropPart": { input: (at) => named(at, "work_order_parts", "workOrderPartId") },

  "invoices.draft": { input: (at) => ({ workOrderId: at("work_orders").id }) },
  "invoices.save-draft": { input: (at) => ({ ...named(at, "invoices", "invoiceId"), lines: [{ lineId: at("invoice_lines").id, description: "Line", amount: "1.00" }] }) },
  "invoices.drop-draft": { input: (at) => named(at, "invoices", "invoiceId") },
  "invoices.issue": { input: (at) => ({ ...named(at, "invoices", "invoiceId"), totalMinor: 1 }) },
  "invoices.send": { input: (at) => ({ invoiceId: at("invoices").id }) },
  "invoices.credit": { input: (at) => ({ invoiceId: at("invoices").id, reason: "because", lines: [{ lineId: at("invoice_lines").id, amount: "1.00" }] }) },
  "invoices.apply-credit": { input: (at) => ({ invoiceId: at("invoices").id }) },
  "invoices.write-off": { input: (at) => ({ invoiceId: at("invoices").id, reason: "because" }) },
  "payments.take": { input: (at) => ({ invoiceId: at("invoices").id, method: "cash", amount: "1.00", confirmed: true }), ownMade: ["workOrderId"] },
  "payments.ask": { input: (at) => ({ invoiceId: at("invoices").id }) },
  "payments.start": { input: () => ({}), as: "customer" },
  "payments.retry-event": { input: () => ({ eventId: "evt_of_b" }) },
  "payments.close-event": { input: () => ({ eventId: "evt_of_b", reason: "because" }) },
  "payouts.explain": { input: (at) => ({ itemId: at("payout_items").id, invoiceId: at("invoices").id }) },
  "refunds.ask": { input: (at) => ({ paymentId: at("payments").id, amount: "1.00", reason: "because" }) },
  "refunds.answer": { input: (at) => ({ refundId: at("refunds").id, accept: true }) },

  "stock.addPart": { input: (at) => ({ sku: "ZZZ-1", ...part, preferredSupplierId: at("suppliers").id }) },
  "stock.changePart": { input: (at) => ({ ...edit(at, "parts"), ...part, stockUnit: "each", lotTracked: false, active: true, preferredSupplierId: at("suppliers").id }) },
  "stock.setKit": { input: (at) => ({ ...named(at, "parts", "kitPartId"), lines: [{ partId: at("parts").id, qty: "1" }] }) },
  "stock.opening": { input: (at) => ({ partId: at("parts").id, qty: "1", value: "1.00" }) },
  "stock.scrap": { input: (at, w) => ({ partId: at("parts", w.a.partIds["EPX-PORT"]).id, lotId: at("lots").id, qty: "1", reason: "because" }) },
  "stock.reverse": { input: (at) => ({ movementId: at("stock_movements").id, reason: "because" }) },
  "stock.count": { input: (at, w) => ({ cause: "routine count", lines: [{ partId: at("parts", w.a.partIds["EPX-PORT"]).id, lotId: at("lots").id, counted: "1" }] }) },

  "purchasing.changeSupplier": { input: (at) => ({ ...edit(at, "suppliers"), name: "Taken" }) },
  "purchasing.draft": { input: (at) => ({ supplierId: at("suppliers").id, lines: [{ id: at("purchase_order_lines").id, partId: at("parts").id, qty: "1", price: "1.00", workOrderId: at("work_orders").id }] }) },
  "purchasing.change": { input: (at) => ({ ...edit(at, "purchase_orders"), lines: [{ id: at("purchase_order_lines").id, partId: at("parts").id, qty: "1", price: "1.00", workOrderId: at("work_orders").id }] }) },
  "purchasing.send": { input: (at) => ({ ...edit(at, "purchase_orders"), by: "hand" }) },
  "purchasing.expect": { input: (at) => ({ ...edit(at, "purchase_orders"), expectedOn: "2026-04-01" }) },
  "purchasing.cancel": { input: (at) => ({ ...edit(at, "purchase_orders"), reason: "because" }) },
  "purchasing.receive": { input: (at) => ({ purchaseOrderId: at("purchase_orders").id, lines: [{ lineId: at("purchase_order_lines").id, came: "1" }] }) },
  "purchasing.reverseReceipt": { input: (at) => ({ receiptId: at("receipts").id, reason: "because" }) },

  "time.makeEnrolCode": { input: (at) => ({ id: at("devices").id, code: "ABCD-EFGH" }) },
  "time.revokeDevice": { input: (at) => ({ id: at("devices").id }) },
  "time.doorIn": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId }) },
  "time.doorOut": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId }) },
  "time.mealOut": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId }) },
  "time.mealIn": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId }) },
  "time.startIndirect": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId, work: "clean-up" }) },
  "time.stopClock": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId }) },
  "time.sayWhenLeft": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId, leftAt: "2026-03-19T17:00" }) },
  "workOrders.startOperation": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId, operationId: at("operations").id }) },
  "workOrders.switchTo": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId, operationId: at("operations").id }) },
  "workOrders.operationDone": { as: "tablet", ...stamp, input: (at) => ({ proof: proof(at), actId, operationId: at("operations").id }) },

  "estimates.answer": { as: "customer", input: () => ({ answer: "approved", name: "Somebody", documentHash: "a".repeat(64) }) },
};

/** Commands without an id in their input, so that nothing of another shop can be named. Each new one is listed on purpose. */
export const NAMES_NOTHING = [
  "customers.add", "menu.add", "purchasing.addSupplier", "time.addDevice", "time.enrolDevice",
];
