import { allocate, minor, type Minor } from "@/modules/kernel/money";
import { type Milli } from "@/modules/kernel/quantity";

/** How inbound freight is spread over the lines of a receipt. By value unless the shop says otherwise. */
export type FreightBasis = "value" | "weight" | "quantity";

export interface ReceiptLine {
  readonly valueMinor: Minor;
  readonly qtyMilli: Milli;
  /** Weight of the whole line in grams; 0 when not known. */
  readonly weightGrams: number;
}

export interface LandedLine {
  readonly freightMinor: Minor;
  /** Price of the line plus its share of the freight: what goes into stock. */
  readonly landedMinor: Minor;
}

/**
 * Shares freight over lines to the cent by largest remainder; the earlier line wins a tie. The shares always add
 * up to the freight. When every line weighs 0 on the chosen basis, quantity is used instead.
 * Source: largest remainder (Hamilton) method; cost of purchase includes freight in, IAS 2 para 11.
 */
export function landReceipt(lines: readonly ReceiptLine[], freightMinor: Minor, basis: FreightBasis = "value"): LandedLine[] {
  const weightOf = { value: (l: ReceiptLine) => l.valueMinor, weight: (l: ReceiptLine) => l.weightGrams, quantity: (l: ReceiptLine) => l.qtyMilli };
  const chosen = lines.map(weightOf[basis]);
  const weights = chosen.some((w) => w > 0) ? chosen : lines.map(weightOf.quantity);
  const shares = allocate(freightMinor, weights);
  return lines.map((line, i) => {
    const share = minor(shares[i] ?? 0);
    return { freightMinor: share, landedMinor: minor(line.valueMinor + share) };
  });
}
