import { extend, minorText, parseMinor } from "@/modules/kernel/money";
import { milliText, parseMilli } from "@/modules/kernel/quantity";
import type { z } from "@/modules/kernel/zod";
import { totalsUnder, type DocumentRules } from "../domain/document-rules";
import { percentText, type saveEstimateInput } from "../input";
import type { EstimateEditor } from "../queries/estimates";

export type EstimateForm = Omit<z.input<typeof saveEstimateInput>, "lines"> & { lines: LineForm[] };
export interface LineForm {
  kind: "labor" | "part" | "outside" | "note";
  /** "" or a number as text: a list gives text. */
  pieceNo: string | number | null;
  operationCode: string | null; partId: string | null; description: string; qty: string; unitPrice: string; findingId: string | null;
}

export const blankLine = (kind: LineForm["kind"], more: Partial<LineForm> = {}): LineForm => ({
  kind, pieceNo: null, operationCode: null, partId: null, description: "", qty: "1", unitPrice: "0.00", findingId: null, ...more,
});

/** The draft as text for its wells. */
export const formOf = (d: NonNullable<EstimateEditor["draft"]>): EstimateForm => ({
  estimateId: d.estimateId, version: d.version, laborDiscountPercent: minorText(d.laborDiscountBp).replace(/\.?0+$/, "") || "0", freight: minorText(d.freightMinor), depositPercent: minorText(d.depositBp).replace(/\.?0+$/, "") || "0",
  exclusions: d.exclusions, message: d.message, readyOn: d.readyOn ?? "",
  lines: d.lines.map((l) => ({ kind: l.kind, pieceNo: l.pieceNo, operationCode: l.operationCode, partId: l.partId, description: l.description, qty: milliText(l.qtyMilli), unitPrice: minorText(l.unitPriceMinor), findingId: l.findingId })),
});

/** As the command takes it: the head's number is a number again, a note has neither quantity nor price. */
export const sentOf = (f: EstimateForm): z.input<typeof saveEstimateInput> => ({
  ...f,
  lines: f.lines.map((l) => ({ ...l, pieceNo: l.pieceNo === null || l.pieceNo === "" ? null : Number(l.pieceNo), ...(l.kind === "note" ? { qty: "1", unitPrice: "0" } : {}) })),
});

/** Amount of a line as it stands; 0 while quantity or price cannot be read. */
export function amountOfLine(l: Pick<LineForm, "kind" | "qty" | "unitPrice">): number {
  const qty = parseMilli(l.qty);
  const each = parseMinor(l.unitPrice);
  return l.kind === "note" || qty === null || each === null || qty <= 0 ? 0 : extend(each, qty);
}

/** The same totals as the server's, from what is typed; null while they cannot be made. */
export function totalsOfForm(f: EstimateForm, rules: DocumentRules) {
  const discount = percentText.safeParse(f.laborDiscountPercent);
  const freight = parseMinor(f.freight || "0") ?? 0;
  const t = totalsUnder(rules, { lines: f.lines.map((l) => ({ kind: l.kind, amountMinor: amountOfLine(l) })), laborDiscountBp: discount.success ? discount.data : 0, freightMinor: Math.max(0, freight) });
  return t.ok ? t.value : null;
}
