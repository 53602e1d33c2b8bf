import { fixedText, ratio } from "@/modules/kernel/fraction";
import { minor, timesFraction, ZERO, type Minor } from "@/modules/kernel/money";
import { milli, milliText, type Milli } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/** What is on hand of one part: quantity and what it is worth. Average cost is never stored, only derived. */
export interface StockValue {
  readonly qtyMilli: Milli;
  readonly valueMinor: Minor;
}

/** State after an issue, and the cost that left with it. */
export interface Issued {
  readonly stock: StockValue;
  readonly costMinor: Minor;
}

export const EMPTY_STOCK: StockValue = { qtyMilli: milli(0), valueMinor: ZERO };

/**
 * Goods in, at their landed value (price, freight share, duty). A value of 0 is allowed: a free sample.
 * Refuses `QTY_NOT_POSITIVE`, `COST_NEGATIVE`.
 * Source: IAS 2 para 27, weighted average recalculated as each shipment is received.
 */
export function receive(stock: StockValue, qtyMilli: Milli, landedValueMinor: Minor): Result<StockValue> {
  if (qtyMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  if (landedValueMinor < 0) return refuse("COST_NEGATIVE", "Type a cost of 0 or more.", { field: "cost" });
  return ok({
    qtyMilli: milli(stock.qtyMilli + qtyMilli),
    valueMinor: minor(stock.valueMinor + landedValueMinor),
  });
}

/**
 * Goods out: cost = value / quantity * issued, rounded once to the cent; the last unit takes what is left,
 * so an empty shelf is worth exactly 0.
 * Refuses `QTY_NOT_POSITIVE`, and `INSUFFICIENT_STOCK` with the real number; nothing changes then.
 */
export function issue(stock: StockValue, qtyMilli: Milli): Result<Issued> {
  if (qtyMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  if (qtyMilli > stock.qtyMilli) {
    return refuse(
      "INSUFFICIENT_STOCK",
      `There are ${milliText(stock.qtyMilli)} on hand, not ${milliText(qtyMilli)}. Take ${milliText(stock.qtyMilli)} or fewer, or receive the rest first.`,
      { field: "qty", data: { onHandMilli: stock.qtyMilli, wantedMilli: qtyMilli } },
    );
  }
  const costMinor =
    qtyMilli === stock.qtyMilli ? stock.valueMinor : timesFraction(stock.valueMinor, qtyMilli, stock.qtyMilli);
  return ok({
    stock: { qtyMilli: milli(stock.qtyMilli - qtyMilli), valueMinor: minor(stock.valueMinor - costMinor) },
    costMinor,
  });
}

/**
 * Unused parts back from a job, at the cost they left at (not at today's average).
 * Refuses `QTY_NOT_POSITIVE`, and `RETURN_EXCEEDS_ISSUE` when more comes back than went out.
 */
export function returnFromJob(
  stock: StockValue,
  issued: { readonly qtyMilli: Milli; readonly costMinor: Minor },
  backMilli: Milli,
): Result<Issued> {
  if (backMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  if (backMilli > issued.qtyMilli) {
    return refuse(
      "RETURN_EXCEEDS_ISSUE",
      `${milliText(issued.qtyMilli)} went out to this job, so no more than ${milliText(issued.qtyMilli)} can come back.`,
      { field: "qty", data: { issuedMilli: issued.qtyMilli } },
    );
  }
  const costMinor =
    backMilli === issued.qtyMilli ? issued.costMinor : timesFraction(issued.costMinor, backMilli, issued.qtyMilli);
  return ok({
    stock: { qtyMilli: milli(stock.qtyMilli + backMilli), valueMinor: minor(stock.valueMinor + costMinor) },
    costMinor,
  });
}

/**
 * Average cost of one stock unit as decimal text with 6 decimals, in major units of a currency with two decimals
 * (`"8.035625"`), or null when nothing is on hand. For showing only: costs are always taken from the value.
 */
export const unitCost6 = (stock: StockValue, currencyDecimals = 2): string | null =>
  stock.qtyMilli === 0
    ? null
    : fixedText(
        ratio(BigInt(stock.valueMinor) * 1000n, BigInt(stock.qtyMilli) * 10n ** BigInt(currencyDecimals)),
        6,
      );
