import { minor, sumMinor, timesFraction, type Minor } from "@/modules/kernel/money";
import { milli, milliText, type Milli } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/** What is left of one receipt. `receipt` is its running number: lower came first. */
export interface CostLayer {
  readonly receipt: number;
  readonly qtyMilli: Milli;
  readonly valueMinor: Minor;
}

/** A part of an issue, with the layer it left. A return names this again. */
export interface LayerPart {
  readonly receipt: number;
  readonly qtyMilli: Milli;
  readonly costMinor: Minor;
}

export interface FifoIssued {
  readonly layers: readonly CostLayer[];
  readonly parts: readonly LayerPart[];
  readonly costMinor: Minor;
}

/** Refuses `QTY_NOT_POSITIVE`, `COST_NEGATIVE`. Source: IAS 2 para 27, first-in first-out by layer. */
export function addLayer(layers: readonly CostLayer[], layer: CostLayer): Result<readonly CostLayer[]> {
  if (layer.qtyMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  if (layer.valueMinor < 0) return refuse("COST_NEGATIVE", "Type a cost of 0 or more.", { field: "cost" });
  return ok(inOrder([...layers, layer]));
}

/**
 * Takes from the oldest receipt first. Inside a layer the cost is value / quantity * taken, to the cent;
 * the last unit of a layer takes what is left of it.
 * Refuses `QTY_NOT_POSITIVE`, `INSUFFICIENT_STOCK` with the real number.
 */
export function issueFifo(layers: readonly CostLayer[], qtyMilli: Milli): Result<FifoIssued> {
  if (qtyMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  const onHand = layers.reduce((sum, l) => sum + l.qtyMilli, 0);
  if (qtyMilli > onHand) {
    return refuse(
      "INSUFFICIENT_STOCK",
      `There are ${milliText(onHand)} on hand, not ${milliText(qtyMilli)}. Take ${milliText(onHand)} or fewer, or receive the rest first.`,
      { field: "qty", data: { onHandMilli: onHand, wantedMilli: qtyMilli } },
    );
  }
  let need: number = qtyMilli;
  const parts: LayerPart[] = [];
  const left: CostLayer[] = [];
  for (const layer of inOrder(layers)) {
    const taken = Math.min(need, layer.qtyMilli);
    need -= taken;
    const cost = taken === layer.qtyMilli ? layer.valueMinor : timesFraction(layer.valueMinor, taken, layer.qtyMilli);
    if (taken > 0) parts.push({ receipt: layer.receipt, qtyMilli: milli(taken), costMinor: cost });
    if (taken < layer.qtyMilli) {
      left.push({ ...layer, qtyMilli: milli(layer.qtyMilli - taken), valueMinor: minor(layer.valueMinor - cost) });
    }
  }
  return ok({ layers: left, parts, costMinor: sumMinor(parts.map((p) => p.costMinor)) });
}

/** Unused parts go back into the layer they left, at its cost; an emptied layer stands up again in its old place. */
export function restoreLayer(layers: readonly CostLayer[], part: LayerPart): Result<readonly CostLayer[]> {
  if (part.qtyMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  const there = layers.find((l) => l.receipt === part.receipt);
  if (!there) return addLayer(layers, { receipt: part.receipt, qtyMilli: part.qtyMilli, valueMinor: part.costMinor });
  return ok(
    layers.map((l) =>
      l === there
        ? { ...l, qtyMilli: milli(l.qtyMilli + part.qtyMilli), valueMinor: minor(l.valueMinor + part.costMinor) }
        : l,
    ),
  );
}

const inOrder = (layers: readonly CostLayer[]) => [...layers].sort((a, b) => a.receipt - b.receipt);
