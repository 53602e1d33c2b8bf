import { z } from "@/modules/kernel/zod";
import { allocate, extend, minorText, type Minor } from "@/modules/kernel/money";
import { milli, milliText, parseMilli, pieces, type Milli } from "@/modules/kernel/quantity";
import { makeCreditorReference, printCreditorReference, readCreditorReference } from "@/modules/invoices/domain/creditor-reference";
import { code128Check } from "@/modules/stock/domain/code128";
import { addLayer, issueFifo, restoreLayer, type CostLayer, type LayerPart } from "@/modules/stock/domain/fifo";
import { pickFirstExpired } from "@/modules/stock/domain/first-expired";
import { gs1CheckDigit, readGs1Label } from "@/modules/stock/domain/gs1";
import { landReceipt } from "@/modules/stock/domain/landed-freight";
import { EMPTY_STOCK, issue, receive, unitCost6, type StockValue } from "@/modules/stock/domain/moving-average";
import { economicOrderQuantity, reorderPoint } from "@/modules/stock/domain/replenishment";
import { toStockUnits } from "@/modules/stock/domain/unit-factor";
import { moneyText, qtyText, reads, valueOf, type Adapter } from "./shop-case";

const stockEvent = z.strictObject({
  type: z.enum(["opening", "receipt", "issue", "return_from_job"]),
  qty: qtyText,
  unit_cost: moneyText.optional(),
  total_cost: moneyText.optional(),
});
type StockEvent = z.output<typeof stockEvent>;

const landed = (e: StockEvent): Minor => {
  if (e.total_cost !== undefined) return e.total_cost;
  if (e.unit_cost === undefined) throw new Error("an event in needs a cost");
  return extend(e.unit_cost, e.qty);
};

function byAverage(events: readonly StockEvent[]): Record<string, unknown> {
  let stock: StockValue = EMPTY_STOCK;
  const costs: string[] = [];
  const unitCosts: (string | null)[] = [];
  let total = 0;
  for (const e of events) {
    if (e.type === "issue") {
      const out = issue(stock, e.qty);
      costs.push(out.ok ? minorText(out.value.costMinor) : "rejected");
      if (!out.ok) continue;
      stock = out.value.stock;
      total += out.value.costMinor;
    } else {
      stock = valueOf(receive(stock, e.qty, landed(e)));
    }
    unitCosts.push(unitCost6(stock));
  }
  return {
    issue_costs: costs,
    closing_qty: milliText(stock.qtyMilli),
    closing_value: minorText(stock.valueMinor),
    unit_cost_after_each_event: unitCosts,
    cost_of_issues_total: minorText(total),
    published: { cost_of_sales: minorText(total), ending: minorText(stock.valueMinor) },
    published_unit_costs: unitCosts,
  };
}

function byLayer(events: readonly StockEvent[]): Record<string, unknown> {
  let layers: readonly CostLayer[] = [];
  const costs: string[] = [];
  let lastParts: readonly LayerPart[] = [];
  events.forEach((e, i) => {
    if (e.type === "issue") {
      const out = valueOf(issueFifo(layers, e.qty));
      costs.push(minorText(out.costMinor));
      layers = out.layers;
      lastParts = out.parts;
    } else if (e.type === "return_from_job") {
      // The layer the unit left at this cost.
      const from = lastParts.find((p) => p.costMinor * 1000 === (e.unit_cost ?? NaN) * p.qtyMilli);
      if (!from) throw new Error("no part of the issue left at this cost");
      layers = valueOf(restoreLayer(layers, { receipt: from.receipt, qtyMilli: e.qty, costMinor: landed(e) }));
    } else {
      layers = valueOf(addLayer(layers, { receipt: i, qtyMilli: e.qty, valueMinor: landed(e) }));
    }
  });
  return {
    issue_costs: costs,
    closing_qty: milliText(layers.reduce((s, l) => s + l.qtyMilli, 0)),
    closing_value: minorText(layers.reduce((s, l) => s + l.valueMinor, 0)),
  };
}

const cost = reads({ method: z.enum(["moving_average", "fifo"]), events: z.array(stockEvent) }, (i) =>
  i.method === "fifo" ? byLayer(i.events) : byAverage(i.events),
);

function boughtByFactor(num: number, value: Minor, used: Milli) {
  const units = valueOf(toStockUnits(pieces(1), { num, den: 1 }));
  const stock = valueOf(receive(EMPTY_STOCK, units, value));
  return { unitCost: unitCost6(stock), issueCost: minorText(valueOf(issue(stock, used)).costMinor) };
}

const gs1 = reads({ body: z.string() }, ({ body }) => {
  const check_digit = valueOf(gs1CheckDigit(body));
  return { check_digit, full: `${body}${check_digit}` };
});

const readReference = reads({ reference: z.string() }, ({ reference }) => {
  const compact = readCreditorReference(reference);
  return { valid: compact !== null, compact };
});
const makeReference = reads({ body: z.string() }, ({ body }) => {
  const reference = valueOf(makeCreditorReference(body));
  return { check_digits: reference.slice(2, 4), reference, printed: printCreditorReference(reference) };
});

const share = reads({ total: moneyText, weights: z.array(z.string()) }, ({ total, weights }) => ({
  parts: allocate(total, weights.map((w) => valueOfMilli(w))).map((p) => minorText(p)),
}));
const valueOfMilli = (text: string): number => {
  const q = parseMilli(text);
  if (q === null) throw new Error(`not a weight: ${text}`);
  return q;
};

export const stockAdapters: Readonly<Record<string, Adapter>> = {
  "P-COST-01": cost, "P-COST-02": cost, "P-COST-03": cost, "P-COST-04": cost, "P-COST-05": cost, "P-COST-06": cost,
  "P-UOM-01": reads({ purchase_unit: z.literal("kit"), kit_content_g: z.string(), kit_cost: moneyText, issue_g: qtyText }, (i) => {
    const r = boughtByFactor(Number(i.kit_content_g), i.kit_cost, i.issue_g);
    return { unit_cost_per_g: r.unitCost, issue_cost: r.issueCost };
  }),
  "P-UOM-02": reads({ tube_lb: z.string(), tube_cost: moneyText, sticks_per_lb: z.string(), issue_sticks: qtyText }, (i) => {
    const r = boughtByFactor(Number(i.tube_lb) * Number(i.sticks_per_lb), i.tube_cost, i.issue_sticks);
    return { unit_cost_per_stick: r.unitCost, issue_cost: r.issueCost };
  }),
  "P-EOQ-01": reads({ annual_demand: z.string(), order_cost: moneyText, holding_cost_per_unit_year: moneyText }, (i) => {
    const q = valueOf(economicOrderQuantity({
      annualDemand: i.annual_demand, orderCostMinor: i.order_cost, holdingPerUnitYearMinor: String(i.holding_cost_per_unit_year),
    }));
    return {
      eoq: q.exact, orders_per_year: q.ordersPerYear, annual_ordering_cost: minorText(q.orderingCostMinor),
      annual_holding_cost: minorText(q.holdingCostMinor), annual_relevant_cost: minorText(q.orderingCostMinor + q.holdingCostMinor),
    };
  }),
  "P-ROP-01": reads({ annual_demand: z.string(), working_days: z.string(), lead_time_days: z.string(), sigma_lead_time_demand: z.string(), z: z.string() }, (i) => {
    const r = valueOf(reorderPoint({ demand: i.annual_demand, days: i.working_days, leadTimeDays: i.lead_time_days, spread: { sigmaLeadTime: i.sigma_lead_time_demand }, z: i.z }));
    return { lead_time_demand: r.leadTimeDemand, safety_stock: r.safetyStock, reorder_point_exact: r.exact, reorder_point: String(r.units) };
  }),
  "P-ROP-02": reads({ mean_daily: z.string(), sd_daily: z.string(), lead_time_days: z.string(), z: z.string() }, (i) => {
    const r = valueOf(reorderPoint({ demand: i.mean_daily, days: "1", leadTimeDays: i.lead_time_days, spread: { sigmaDaily: i.sd_daily }, z: i.z }));
    return { sigma_lead_time: r.sigmaLeadTime, safety_stock: r.safetyStock, reorder_point: String(r.units) };
  }),
  "P-GS1-01": gs1, "P-GS1-02": gs1, "P-GS1-03": gs1,
  "P-GS1-04": reads({ data: z.string() }, ({ data }) => {
    const l = valueOf(readGs1Label(data, 2026));
    return { gtin: l.gtin, expiry: l.expiry, count: l.count };
  }),
  "P-C128-01": reads({ set: z.enum(["B", "C"]), data: z.string() }, (i) => ({ check_value: valueOf(code128Check(i.set, i.data)) })),
  "P-RF-01": readReference, "P-RF-02": makeReference, "P-RF-03": readReference, "P-RF-04": makeReference,
  "P-ALL-01": reads({ total: moneyText, weights: z.array(moneyText) }, (i) => ({
    parts: landReceipt(i.weights.map((valueMinor) => ({ valueMinor, qtyMilli: milli(1000), weightGrams: 0 })), i.total).map((l) => minorText(l.freightMinor)),
  })),
  "P-ALL-02": share,
  "P-LOT-01": reads(
    { today: z.string(), need_g: qtyText, min_days_left: z.number(), lots: z.array(z.strictObject({ lot: z.string(), expiry: z.string(), on_hand_g: qtyText })) },
    (i) => {
      const r = pickFirstExpired({
        lots: i.lots.map((l) => ({ lot: l.lot, expiry: l.expiry, availableMilli: l.on_hand_g })),
        needMilli: i.need_g, today: i.today, daysLeftMin: i.min_days_left,
      });
      return { picks: r.picks.map((p) => ({ lot: p.lot, g: milliText(p.qtyMilli) })), blocked: r.blocked.map((b) => b.lot) };
    },
  ),
};
