import type { InvoiceLineKind } from "./invoice-snapshot";

/** A line the customer agreed to, with what became of it. */
export interface AgreedLine {
  readonly id: string;
  readonly kind: string;
  readonly pieceId: string | null;
  readonly description: string;
  readonly qtyMilli: number;
  readonly unitPriceMinor: number;
  readonly amountMinor: number;
  readonly bookMinutes: number;
  readonly actualMinutes: number;
  /** Its operation was done, or there is none to do. */
  readonly isDone: boolean;
}
export interface BillablePiece { readonly id: string; readonly tag: string; readonly released: boolean; readonly stopped: boolean }

export interface NewInvoiceLine {
  readonly kind: InvoiceLineKind;
  readonly pieceTag: string;
  readonly description: string;
  readonly qtyMilli: number;
  readonly unitPriceMinor: number;
  readonly amountMinor: number;
  readonly bookMinutes: number;
  readonly actualMinutes: number;
  readonly sourceKind: string;
  readonly sourceId: string | null;
}

/**
 * Lines of a draft from what was agreed: labor first, then parts and outside work, each in the agreed order; freight last.
 * Lines billed before are left out, and of a piece that was stopped only what was done on it. With `released` only
 * pieces that passed are billed.
 */
export function draftLines(p: {
  readonly agreed: readonly AgreedLine[];
  readonly pieces: readonly BillablePiece[];
  readonly billedIds: ReadonlySet<string>;
  readonly which: "all" | "released";
  readonly freightMinor: number;
}): NewInvoiceLine[] {
  const pieceOf = new Map(p.pieces.map((x) => [x.id, x]));
  const wanted = p.agreed.filter((l) => {
    if (p.billedIds.has(l.id) || l.kind === "note") return false;
    const piece = l.pieceId ? pieceOf.get(l.pieceId) : undefined;
    if (!piece) return true;
    if (piece.stopped) return l.kind !== "part" && l.isDone;
    return p.which === "all" || piece.released;
  });
  const rank = (kind: string) => (kind === "labor" ? 0 : kind === "outside" ? 1 : 2);
  const lines = wanted.map((l, i) => ({ l, i })).sort((a, b) => rank(a.l.kind) - rank(b.l.kind) || a.i - b.i).map(({ l }): NewInvoiceLine => ({
    kind: l.kind === "labor" || l.kind === "outside" ? l.kind : "part", pieceTag: (l.pieceId && pieceOf.get(l.pieceId)?.tag) || "", description: l.description,
    qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor, amountMinor: l.amountMinor, bookMinutes: l.bookMinutes, actualMinutes: l.actualMinutes,
    sourceKind: "estimate-line", sourceId: l.id,
  }));
  if (p.freightMinor === 0) return lines;
  return [...lines, {
    kind: "freight", pieceTag: "", description: "Freight & insurance", qtyMilli: 1000, unitPriceMinor: p.freightMinor, amountMinor: p.freightMinor,
    bookMinutes: 0, actualMinutes: 0, sourceKind: "estimate", sourceId: null,
  }];
}
