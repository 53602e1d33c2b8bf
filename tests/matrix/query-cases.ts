import type { ShopContext } from "@/modules/access/context";
import type { Act } from "@/modules/access/roles";
import { libraryInput } from "@/modules/flow/library-input";
import { CANARY, type At } from "./world";

type Fn = (ctx: ShopContext, ...args: unknown[]) => unknown;

export interface QueryCase {
  /** The act it asks for itself; null for a part of other queries that relies on its caller, who is in this list too. */
  act: Act | null;
  /** Calls it with another shop's ids, numbers and words wherever it takes one. */
  call(fn: Fn, ctx: ShopContext, at: At): unknown;
  /** Open to the holder of a link: asked with a context whose link names the other shop's matter. */
  as?: "customer";
}

/** What B's papers are called; A has none of these names. */
const OF_B = { order: "WO-2026-0900", sku: "QF-900", tag: "260224-90" };

const byId = (act: Act | null, table: string): QueryCase => ({ act, call: (fn, ctx, at) => fn(ctx, at(table).id) });
const byIds = (act: Act | null, table: string): QueryCase => ({ act, call: (fn, ctx, at) => fn(ctx, [at(table).id]) });
const byText = (act: Act, text: string): QueryCase => ({ act, call: (fn, ctx) => fn(ctx, text) });
const plain = (act: Act | null): QueryCase => ({ act, call: (fn, ctx) => fn(ctx) });
const asked = (act: Act, ask: Record<string, unknown>): QueryCase => ({ act, call: (fn, ctx) => fn(ctx, ask) });
const q = CANARY;

/** One case a query; the key is its module, file and name. A query without one fails the matrix. */
export const QUERY_CASES: Record<string, QueryCase> = {
  "customers/queries findCustomers": asked("customers.see", { q, limit: 50 }),
  "customers/queries getCustomer": byId("customers.see", "customers"),

  "stock/queries/find-parts findParts": asked("stock.see", { q, view: "all", partClass: "", gone: true, limit: 100 }),
  "stock/queries/find-parts getPartRow": byId("stock.see", "parts"),
  "stock/queries/get-part getPart": byText("stock.see", OF_B.sku),
  "stock/queries/kits kitLinesOf": byIds("stock.see", "parts"),
  "stock/queries/kits freeOf": byIds(null, "parts"),
  "stock/queries/kits kitStands": byIds(null, "parts"),
  "stock/queries/ledger ledgerOf": { act: "stock.see", call: (fn, ctx, at) => fn(ctx, { part: at("parts").id, limit: 50 }) },
  "stock/queries/out-by-lot netOutByLot": byId(null, "work_order_parts"),

  "purchasing/queries/orders findOrders": asked("purchase.see", { q, view: "all", limit: 100 }),
  "purchasing/queries/orders getOrder": byId("purchase.see", "purchase_orders"),
  "purchasing/queries/suggestions suggestionsFor": plain("purchase.see"),
  "purchasing/queries/suppliers findSuppliers": plain("purchase.see"),
  "purchasing/queries/suppliers supplierNames": plain("parts.write"),
  "purchasing/queries/suppliers getSupplier": byId("purchase.see", "suppliers"),

  "time/queries/minutes minutesByOperation": byId("orders.see", "work_orders"),
  "time/queries/minutes laborOf": byId(null, "work_orders"),
  "time/queries/minutes minutesByPerson": byId("orders.see", "work_orders"),
  "time/queries/own-time ownWeek": byId(null, "people"),
  "time/queries/own-time missingOut": byId(null, "people"),

  "time/queries/find-operations findOperations": asked("time.see-own", { q }),
  "time/queries/people-at peopleAt": plain("floor.see"),
  "time/queries/settings-lists deviceList": plain("devices.write"),
  "time/queries/settings-lists peopleList": plain("devices.write"),
  "time/queries/settings-lists getPerson": byId("devices.write", "people"),
  "time/queries/settings-lists peopleNames": plain("time.see-all"),
  "time/queries/to-look-at toLookAt": plain("time.see-all"),
  "time/queries/week-sheet weekSheet": { act: "time.see-all", call: (fn, ctx, at) => fn(ctx, { personId: at("people").id, date: "2026-03-05" }) },

  "books/queries findEntries": asked("books.see", { limit: 100 }),
  "books/queries trialBalanceView": { act: "books.see", call: (fn, ctx) => fn(ctx, null) },
  "invoices/queries findInvoices": asked("books.see", { view: "all", q, limit: 100 }),
  "invoices/queries findReadyToBill": plain("books.see"),
  "invoices/queries getInvoice": byId("books.see", "invoices"),
  "invoices/queries invoicePdf": byId("books.see", "invoices"),
  "invoices/queries agingView": plain("books.see"),
  "invoices/queries invoicesOfOrder": byId("prices.see", "work_orders"),
  "invoices/queries invoiceForCustomer": { act: null, as: "customer", call: (fn, ctx) => fn(ctx) },
  "payments/queries findSetAside": plain("books.see"),
  "payments/queries findDisputes": plain("books.see"),
  "payments/queries paymentsFor": { act: "books.see", call: (fn, ctx, at) => fn(ctx, { invoiceId: at("invoices").id, workOrderId: at("work_orders").id }) },
  // Shows nobody anything but those who may answer.
  "payments/queries findWaitingRefunds": plain(null),
  "reports/queries jobProfitOf": byId("profit.see", "work_orders"),
  "purchasing/queries/open-work-orders openWorkOrders": plain("purchase.write"),
  "stock/queries/count-sheet countSheetFor": { act: "stock.adjust", call: (fn, ctx, at) => fn(ctx, { part: at("parts").id }) },

  "flow/queries/gain gainForPiece": byId("flow.see", "pieces"),
  "flow/queries/gear gearRoom": plain("flow.see"),
  "flow/queries/gear benchHistory": byId("flow.see", "benches"),
  "flow/queries/head-figures headFigures": byId("flow.see", "heads"),
  "flow/queries/job-cautions cautionsToShow": { act: "clock.use", call: (fn, ctx, at) => fn(ctx, { workOrderId: at("work_orders").id, step: "CLN", hazards: ["noise"] }) },
  "flow/queries/job-cautions cautionsOfOwnHead": { act: "clock.use", call: (fn, ctx, at) => fn(ctx, { headId: at("heads").id, step: "CLN", hazards: ["noise"] }) },
  "flow/queries/job-cautions cautionsSeenOn": byId("orders.see", "work_orders"),
  "flow/queries/library-family familyPicture": asked("flow.see", { family: q, side: "intake", last: 3 }),
  "flow/queries/library-family overlayOf": { act: "flow.see", call: (fn, ctx, at) => fn(ctx, { a: at("flow_tests").id, b: at("flow_tests").id }) },
  "flow/queries/library libraryTests": asked("flow.see", libraryInput.parse({ q })),
  "flow/queries/measurements measurementSheet": byId("flow.see", "heads"),
  "flow/queries/library familyNames": plain("flow.see"),
  "flow/queries/report issuedReport": byId("flow.see", "flow_comparisons"),
  "flow/queries/report flowReportPdf": byId("flow.see", "flow_comparisons"),
  "flow/workings-queries workingsShop": plain("flow.see"),
  "flow/queries/room roomPage": asked("flow.see", { q, state: "", limit: 100 }),
  "flow/queries/room headOfTag": byText("flow.see", OF_B.tag),
  "flow/queries/sheet gearOf": plain("flow.see"),
  "flow/queries/sheet flowSheetFor": { act: "flow.see", call: (fn, ctx, at) => fn(ctx, at("heads").id, 1) },
  "flow/queries/upload uploadHeads": byId("flow.see", "heads"),
  "flow/queries/upload flowFilesOf": byId("flow.see", "heads"),
  "flow/queries/tests-of-head cellsOf": byIds(null, "flow_tests"),
  "flow/queries/cams-of-tests camsOf": { act: null, call: (fn, ctx, at) => fn(ctx, [{ camshaft: { id: at("camshafts").id, label: "" } }]) },
  "flow/queries/issued-reports issuedReports": byIds("flow.see", "heads"),
  "flow/queries/tests-of-head rawTests": { act: null, call: (fn, ctx, at) => fn(ctx, { headIds: [at("heads").id] }) },
  "flow/queries/repeat-history withRepeatHistory": {
    act: null,
    call: (fn, ctx, at) => fn(ctx, [2098, 2099].map((year) => ({ id: String(year), side: "intake", state: "complete", nominalInH2O: 28, startedAt: `${year}-01-01T00:00:00.000Z`, bench: { id: at("benches").id } }))),
  },
  "work-orders/queries/families familiesOf": plain("orders.see"),

  "work-orders/queries/bench-list clockBoard": plain("clock.use"),
  "work-orders/queries/bench-list openOperations": plain(null),
  "work-orders/queries/customer-view customerView": { act: null, as: "customer", call: (fn, ctx) => fn(ctx) },
  "work-orders/queries/customer-view customerFile": { act: null, as: "customer", call: (fn, ctx, at) => fn(ctx, at("files").id, false) },
  "work-orders/queries/customer-view customerPaperId": { act: null, as: "customer", call: (fn, ctx) => fn(ctx) },
  "work-orders/queries/customer-view provedPieces": { act: null, as: "customer", call: (fn, ctx, at) => fn(ctx, at("work_orders").id) },
  "work-orders/queries/customer-view customerShop": { act: null, as: "customer", call: (fn, ctx) => fn(ctx) },
  "work-orders/queries/customer-orders ordersOfCustomer": byId("orders.see", "customers"),
  "work-orders/queries/papers tagPaper": { act: "orders.see", call: (fn, ctx) => fn(ctx, OF_B.order, 1) },
  "work-orders/queries/papers travelerPaper": { act: "orders.see", call: (fn, ctx) => fn(ctx, OF_B.order, null) },
  "work-orders/queries/papers estimatePaperOf": { act: "prices.see", call: (fn, ctx) => fn(ctx, OF_B.order, 1) },
  "work-orders/queries/deposit depositOf": byId(null, "work_orders"),
  "work-orders/queries/estimates estimateEditor": byText("estimate.write", OF_B.order),
  "work-orders/queries/estimates versionsOf": byId("prices.see", "work_orders"),
  "work-orders/queries/find findAnything": byText("orders.see", q),
  "work-orders/queries/floor floorOf": plain("floor.see"),
  "work-orders/queries/house houseOrders": { act: null, call: (fn, ctx) => fn(ctx, undefined) },
  "work-orders/queries/menu menuOf": { act: "prices.see", call: (fn, ctx) => fn(ctx, { withRetired: true }) },
  "work-orders/queries/order-money moneyOfOrders": byIds(null, "work_orders"),
  "work-orders/queries/order-money moneyOfOrder": byId(null, "work_orders"),
  "work-orders/queries/order-page orderPage": byText("orders.see", OF_B.order),
  "work-orders/queries/orders findOrders": asked("orders.see", { view: "open", q, station: "", person: "", promised: "", sort: "number", descending: "true", limit: 100 }),
  "work-orders/queries/parts partsOf": byId("stock.see", "work_orders"),
  "work-orders/queries/parts epoxySheetFor": { act: "work.record", call: (fn, ctx) => fn(ctx, OF_B.order, 1) },
  "work-orders/queries/parts epoxyFillsOf": byId("orders.see", "pieces"),
  "work-orders/queries/piece piecePage": { act: "orders.see", call: (fn, ctx) => fn(ctx, OF_B.order, 1) },
  "work-orders/queries/piece releaseSheet": byId("orders.see", "pieces"),
  "work-orders/queries/release-facts releaseFactsOf": { act: null, call: (fn, ctx, at) => fn(ctx, at("pieces").id, at("people").id) },
  "work-orders/queries/rules rulesFor": { act: null, call: (fn, ctx, at) => fn(ctx, at("customers").id, "2026-03-20") },
  "work-orders/queries/timeline timelineOf": byId(null, "work_orders"),
};

/** Functions beside the queries that read nothing. */
export const READS_NOTHING: Record<string, string> = {
  "stock/queries/part-figures partFigures": "makes a piece of SQL for the shop it is given",
  "purchasing/queries/orders seesPrices": "asks the actor's roles only",
  "flow/queries/gain portGains": "computes from tests it is given",
  "flow/queries/gain seesCustomers": "asks the actor's roles only",
};

/** Cases of endpoints, by method and path: B's ids in a query string or body. Those without ids are asked for the canary by themselves. */
export const ENDPOINT_CASES: Record<string, (at: At) => Record<string, unknown>> = {
  "GET /api/v1/s/{shop}/parts/{part}/movements": (at) => ({ part: at("parts").id }),
  "GET /api/v1/s/{shop}/flow/sheet": (at) => ({ headId: at("heads").id }),
  "GET /api/v1/s/{shop}/flow/library/overlay": (at) => ({ a: at("flow_tests").id, b: at("flow_tests").id }),
  "GET /api/v1/s/{shop}/flow/library/family": () => ({ family: q, side: "intake" }),
  "POST /api/v1/s/{shop}/flow/workings/{function}": () => ({ function: "convert_unit", inputs: { value: 28, from: "inH2O_conventional", to: "kPa" } }),
  "GET /api/v1/s/{shop}/parts/{part}": () => ({ part: OF_B.sku }),
  "POST /api/v1/s/{shop}/bank-files/look": () => ({ name: "x.csv", text: "2026-03-05,Deposit,1.00", mapping: null }),
  "POST /api/v1/clock/punches": (at) => ({ press: "doorIn", input: { proof: { kind: "pass", personId: at("people").id, pass: "x".repeat(60) } } }),
  "POST /api/v1/clock/identify": (at) => ({ kind: "pin", personId: at("people").id, pin: "480131" }),
};
