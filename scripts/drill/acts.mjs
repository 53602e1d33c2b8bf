/** The mix of commands. Each act is made from what the client knows so far; its answer teaches it more. */
import { randomUUID } from "node:crypto";

/** Acts that must not pass, whatever is killed meanwhile. */
export const MUST_FAIL = ["wrong input", "foreign id", "wrong role", "stale edit"];

/** Lets a client act at the tablet: its door and bench as it believes them to be. */
const nextPress = (state, chance) => {
  if (state.door === "out") return "doorIn";
  if (state.door === "meal") return "mealIn";
  if (state.bench === "operation") return chance.pick(["stopClock", "switchTo", "doorOut"]);
  if (state.bench === "indirect") return chance.pick(["stopClock", "doorOut"]);
  return chance.weighted([[3, "startIndirect"], [3, "startOperation"], [1, "mealOut"], [1, "doorOut"]]);
};

const AFTER = {
  doorIn: { door: "in", bench: null }, doorOut: { door: "out", bench: null }, mealOut: { door: "meal", bench: null }, mealIn: { door: "in", bench: null },
  startIndirect: { bench: "indirect" }, startOperation: { bench: "operation" }, switchTo: { bench: "operation" }, stopClock: { bench: null },
};

/** What the pressed command is called. */
const COMMAND_OF_PRESS = {
  doorIn: "time.doorIn", doorOut: "time.doorOut", mealOut: "time.mealOut", mealIn: "time.mealIn", startIndirect: "time.startIndirect", stopClock: "time.stopClock",
  startOperation: "workOrders.startOperation", switchTo: "workOrders.switchTo",
};

/**
 * @param client `{ shop, n, chance, known }`: facts of the shop from prepare.ts, the client's number, what it learned
 * @returns `{ key, kind, command, path, body, by, learn }`; acts of the kinds in `MUST_FAIL` must be refused
 */
export function nextAct(client) {
  const { shop, n, chance, known } = client;
  const key = randomUUID();
  const api = `/api/v1/s/${shop.slug}`;
  const act = (kind, command, path, body, more = {}) => ({ key, kind, command, path, body, shop: shop.id, by: "owner", learn: () => {}, ...more });
  const kind = chance.weighted([
    [14, "add customer"], [8, "change customer"], [10, "open order"], [8, "need part"], [12, "issue part"], [7, "count"], [5, "opening"], [6, "draft purchase"], [6, "send purchase"], [6, "receive"],
    [10, "payment"], [12, "reading"], [16, "press"], [3, "wrong input"], [3, "foreign id"], [2, "wrong role"], [3, "stale edit"],
  ]);
  switch (kind) {
    case "change customer": {
      const c = chance.pick(known.customers);
      if (!c) break;
      return act(kind, "customers.change", `${api}/customers/change`, { id: c.id, version: c.version, name: `Changed ${key}`, email: c.email }, { learn: (r) => { c.version = r.version; } });
    }
    case "open order":
      return act(kind, "orders.open", `${api}/orders/open`, { newCustomer: { name: `Caller ${key}`, phone: "5550101" }, pieces: [{ family: "S250-4V" }, { family: "S450-4V" }], use: "road", wants: key }, { by: "counter", learn: (r) => known.orders.push(r.id) });
    case "need part":
      return act(kind, "workOrders.needPart", `${api}/orders/need-part`, { workOrderId: chance.pick(known.orders), partId: chance.pick(shop.parts), qty: String(1 + chance.below(9)) }, { learn: (r) => known.needs.push(...r.workOrderPartIds) });
    case "issue part": {
      const need = chance.pick(known.needs);
      if (!need) break;
      return act(kind, "workOrders.issuePart", `${api}/orders/issue-part`, { workOrderPartId: need, qty: String(1 + chance.below(3)), moreThanNeeded: true }, { by: "receiving" });
    }
    case "count":
      return act(kind, "stock.count", `${api}/parts/count`, { cause: "routine count", note: key, lines: [{ partId: chance.pick(shop.parts), counted: String(4000 + chance.below(2000)) }] });
    case "opening":
      return act(kind, "stock.opening", `${api}/parts/opening`, { partId: chance.pick(shop.parts), qty: String(1 + chance.below(5)), value: `${1 + chance.below(90)}.${String(chance.below(100)).padStart(2, "0")}`, reason: key });
    case "draft purchase":
      return act(kind, "purchasing.draft", `${api}/purchases/draft`, { supplierId: shop.supplierId, notes: key, lines: [{ partId: chance.pick(shop.parts), qty: "5", price: "4.20" }] }, { by: "counter", learn: (r) => known.drafts.push(r.id) });
    case "send purchase": {
      const id = known.drafts.shift();
      if (!id) break;
      return act(kind, "purchasing.send", `${api}/purchases/send`, { id, version: 1, by: chance.pick(["mail", "hand"]) }, { by: "counter", learn: async () => known.sent.push({ id, lineId: await client.lineOf(id) }) });
    }
    case "receive": {
      const purchase = known.sent.shift();
      if (!purchase) break;
      return act(kind, "purchasing.receive", `${api}/purchases/receive`, { purchaseOrderId: purchase.id, freight: "3.33", deliveryNote: key, lines: [{ lineId: purchase.lineId, came: String(1 + chance.below(5)) }] }, { by: "receiving" });
    }
    case "payment":
      return act(kind, "payments.take", `${api}/payments/take`, { workOrderId: chance.pick([...shop.orders, ...known.orders]), method: chance.pick(["cash", "transfer"]), amount: `${1 + chance.below(200)}.${String(chance.below(100)).padStart(2, "0")}`, note: key, confirmed: true }, { by: "bookkeeper" });
    case "reading": {
      const lift = chance.pick(shop.lifts);
      const seen = known.revisions[lift] ?? 0;
      return act(kind, "flow.record-reading", `${api}/flow/readings`, { testId: shop.tests[n], lift, value: (20 + Number(lift) * 300 + chance.below(10) / 10).toFixed(1), revisionSeen: seen, acceptedReason: "drill" }, { learn: (r) => { known.revisions[lift] = r.revision; } });
    }
    case "press": {
      const press = nextPress(known.clock, chance);
      const input = { note: key };
      if (press === "startIndirect") input.work = chance.pick(["clean-up", "waiting for parts"]);
      if (press === "startOperation" || press === "switchTo") input.operationId = known.operation;
      if (press !== "startIndirect" && !press.startsWith("door") && !press.startsWith("meal")) delete input.note;
      if (press === "switchTo" || !known.operation && press === "startOperation") break;
      return act(`press ${press}`, COMMAND_OF_PRESS[press], "/api/v1/clock/punches", { press, input }, { by: "tablet", learn: () => Object.assign(known.clock, AFTER[press]) });
    }
    case "stale edit": {
      const c = chance.pick(known.customers.filter((x) => x.version > 1));
      if (!c) break;
      return act(kind, "customers.change", `${api}/customers/change`, { id: c.id, version: c.version - 1, name: `Stale ${key}`, email: c.email });
    }
    case "wrong input":
      return act(kind, "customers.add", `${api}/customers`, { name: "", phone: "1", note: key });
    case "foreign id":
      return act(kind, "orders.open", `${api}/orders/open`, { customerId: client.foreignCustomer, pieces: [{ family: "S250-4V" }], use: "road", wants: key });
    case "wrong role":
      return act(kind, "stock.opening", `${api}/parts/opening`, { partId: chance.pick(shop.parts), qty: "1", value: "1.00", reason: key }, { by: "counter" });
    default:
  }
  const email = `c-${key}@drill.example`;
  return act("add customer", "customers.add", `${api}/customers`, { name: `Customer ${key}`, email }, { by: chance.pick(["owner", "counter", "bookkeeper"]), learn: (r) => known.customers.push({ id: r.id, version: 1, email }) });
}
