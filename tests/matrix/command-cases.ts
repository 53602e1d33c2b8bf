import type { At, World } from "./world";

export interface Case {
  /** An input with another shop's ids at every place an id can stand. */
  input: (at: At, world: World) => unknown;
  /** Other inputs, for places that one input cannot fill together. */
  also?: readonly ((at: At, world: World) => unknown)[];
  /** Who of A asks; the owner when left out. `customer`: by a link that names B's matter. `tablet`: A's tablet. */
  as?: "customer" | "tablet";
  /** Places that take an id which the asker makes up itself. */
  ownMade?: readonly string[];
}

const part = { description: "Valve", partClass: "valve", salePrice: "1.00" };
const menu = { code: "ZZZ", name: "Name", station: "Porting", skill: "porting", sequence: 10, bookHours: "1", price: "1.00" };
const bench = { name: "Bench", kind: "series_orifice", scale: "direct", waterUnit: "conventional", nominalPressures: "28", maxFlow: "600" };
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
  "photos.add": { input: (at, w) => ({ subjectKind: "piece", subjectId: at("pieces").id, name: "x.jpg", storageKey: `${w.a.shop.id}/photo/x.jpg`, thumbKey: null, sizeBytes: 1, sha256: "a".repeat(64) }),
    also: [(at, w) => ({ subjectKind: "finding", subjectId: at("findings").id, name: "x.jpg", storageKey: `${w.a.shop.id}/photo/y.jpg`, thumbKey: null, sizeBytes: 1, sha256: "a".repeat(64) })] },
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
  "payments.take": {
    input: (at) => ({ invoiceId: at("invoices").id, method: "cash", amount: "1.00", confirmed: true }),
    also: [(at) => ({ workOrderId: at("work_orders").id, method: "cash", amount: "1.00", confirmed: true })],
  },
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

  "bank.lock": { input: (at) => ({ ...named(at, "bank_lines", "lineId"), kind: "invoice", ids: [at("invoices").id] }),
    also: [(at) => ({ ...named(at, "bank_lines", "lineId"), kind: "payment", ids: [at("payments").id] }), (at) => ({ ...named(at, "bank_lines", "lineId"), kind: "payout", ids: [at("payouts").id] })] },
  "bank.unlock": { input: (at) => named(at, "bank_lines", "lineId") },

  "flow.cautions-seen": { input: (at) => ({ workOrderId: at("work_orders").id, hazards: ["noise"], step: "CLN" }), also: [(at) => ({ headId: at("heads").id, hazards: ["noise"], step: "CLN" })] },
  "flow.change-camshaft": { input: (at) => ({ ...edit(at, "camshafts"), label: "Cam", side: "intake", maxLift: "9.0", duration: "240" }) },
  "flow.change-family": { input: (at) => ({ ...edit(at, "engine_families"), name: "Taken" }) },
  "flow.change-head-work": { input: (at) => edit(at, "heads") },
  "flow.change-bench": { input: (at) => ({ ...edit(at, "benches"), ...bench }) },
  "flow.change-check-plate": { input: (at) => ({ ...edit(at, "check_plates"), serial: "P-1", referenceFlow: "100", atPressure: "28" }) },
  "flow.change-fixture": { input: (at) => ({ ...edit(at, "fixtures"), name: "77", bore: "77" }) },
  "flow.change-lift-device": { input: (at) => ({ ...edit(at, "lift_devices"), name: "Dial", resolution: "0.01" }) },
  "flow.save-measurements": { input: (at) => ({ headId: at("heads").id, stage: "before", rows: [{ cylinder: 1, side: "", kind: "deck flatness", value: "0.02", unit: "mm" }] }),
    also: [(at) => ({ headId: at("heads").id, by: at("people").id, stage: "before", rows: [{ cylinder: 1, side: "", kind: "deck flatness", value: "0.02", unit: "mm" }] })] },
  "flow.record-bench-check": { input: (at) => ({ benchId: at("benches").id, isFine: true }) },
  "flow.strike-bench-check": { input: (at) => ({ checkId: at("bench_checks").id, reason: "because" }) },
  "flow.start-test": { input: (at) => ({ headId: at("heads").id, benchId: at("benches").id, fixtureId: at("fixtures").id, liftDeviceId: at("lift_devices").id, camshaftId: at("camshafts").id, operatorId: at("people").id, side: "intake", purpose: "baseline", nominal: "28", lifts: ["0.1"] }) },
  "flow.start-sheet": { input: (at) => ({ headId: at("heads").id, benchId: at("benches").id, fixtureId: at("fixtures").id, liftDeviceId: at("lift_devices").id, operatorId: at("people").id, purpose: "baseline", nominal: "28", step: "0.05", camLiftForLadder: "0.34", intake: { camshaftId: at("camshafts").id }, exhaust: { camshaftId: at("camshafts").id } }) },
  "flow.post-test": { input: (at) => ({ headId: at("heads").id, benchId: at("benches").id, fixtureId: at("fixtures").id, liftDeviceId: at("lift_devices").id, camshaftId: at("camshafts").id, operatorId: at("people").id, side: "intake", purpose: "baseline", nominal: "28", readings: [{ lift: "0.1", value: "20" }] }) },
  "flow.change-conditions": { input: (at) => ({ ...named(at, "flow_tests", "testId"), fixtureId: at("fixtures").id, liftDeviceId: at("lift_devices").id, camshaftId: at("camshafts").id, nominal: "28" }) },
  "flow.change-sheet": { input: (at) => ({ fixtureId: at("fixtures").id, liftDeviceId: at("lift_devices").id, nominal: "28", intake: { ...named(at, "flow_tests", "testId"), camshaftId: at("camshafts").id }, exhaust: { ...named(at, "flow_tests", "testId"), camshaftId: at("camshafts").id } }) },
  "flow.add-lift": { input: (at) => ({ ...named(at, "flow_tests", "testId"), lift: "0.2", also: named(at, "flow_tests", "testId") }) },
  "flow.remove-lift": { input: (at) => ({ ...named(at, "flow_tests", "testId"), liftUm: 1270, also: named(at, "flow_tests", "testId") }) },
  "flow.record-reading": { input: (at) => ({ testId: at("flow_tests").id, lift: "0.1", value: "20" }) },
  "flow.complete-test": { input: (at) => named(at, "flow_tests", "testId") },
  "flow.void-test": { input: (at) => ({ ...named(at, "flow_tests", "testId"), reason: "because" }) },
  "flow.correct-test": { input: (at) => ({ testId: at("flow_tests").id, reason: "because" }) },
  "flow.issue-comparison": { input: (at) => ({ headId: at("heads").id }) },
  "flow.read-file": { input: (at, w) => ({
    headId: at("heads").id, benchId: at("benches").id, fixtureId: at("fixtures").id, purpose: "baseline", nominal: "28", flowUnit: "cfm", pressureUnit: "inH2O",
    mapping: { headerRows: 0, decimal: ".", lift: 0, flow: 1, liftUnit: "in" }, text: "0.1,20", file: { name: "x.csv", mime: "text/csv", storageKey: `${w.a.shop.id}/flow/x.csv`, sizeBytes: 6, sha256: "a".repeat(64) },
  }) },
  "flow.add-sheet-photo": { input: (at, w) => ({ headId: at("heads").id, storageKey: `${w.a.shop.id}/photo/x.jpg`, thumbKey: null, sizeBytes: 1, sha256: "a".repeat(64) }) },

  "time.askCorrection": { input: (at) => ({ timeEntryId: at("time_entries").id, operationId: at("operations").id, clock: "bench", start: "2026-03-05T15:10", end: "2026-03-05T15:40", reason: "because" }) },
  "time.enterTime": { input: (at) => ({ personId: at("people").id, replacesId: at("time_entries").id, operationId: at("operations").id, clock: "bench", start: "2026-03-05T15:10", end: "2026-03-05T15:40", reason: "because" }) },
  "time.acceptCorrection": { input: (at) => ({ id: at("correction_requests").id }) },
  "time.refuseCorrection": { input: (at) => ({ id: at("correction_requests").id, reason: "because" }) },
  "time.setAsideEntry": { input: (at) => ({ id: at("time_entries").id, reason: "because" }) },
  "time.settlePunch": { input: (at) => ({ id: at("punches").id }) },
  "time.changePerson": { input: (at) => ({ ...edit(at, "people"), name: "Taken", shortName: "Taken", roles: ["technician"] }) },
  "time.leaveShop": { input: (at) => ({ id: at("people").id }) },
  "time.setBadge": { input: (at) => ({ id: at("people").id, badgeCode: "TAKEN-1" }) },
  "time.setPin": { input: (at) => ({ id: at("people").id, pin: "583920" }) },
  "time.setRate": { input: (at) => ({ personId: at("people").id, validFrom: "2026-04-01", rate: "20.00" }) },

  "time.makeEnrolCode": { input: (at) => ({ id: at("devices").id, code: "ABCD-EFGH" }) },
  "time.makeBenchToken": { input: (at) => ({ id: at("devices").id, token: "t".repeat(43) }) },
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
  "customers.add", "menu.add", "purchasing.addSupplier", "time.addDevice", "time.enrolDevice", "time.addPerson", "time.acceptInvitation", "shop.settings", "bank.take-in",
  "flow.add-bench", "flow.add-fixture", "flow.add-family", "flow.add-camshaft", "flow.add-own-head", "flow.add-check-plate", "flow.add-lift-device", "flow.set-up-bench", "flow.set-up-fixture", "flow.set-up-family", "flow.set-limit", "flow.show-estimates", "flow.set-limits",
];
