import type { DocumentTotals } from "@/modules/books/domain/document-totals";
import { minor } from "@/modules/kernel/money";

const turn = (n: number) => minor(0 - n);

/** The same totals with every sign turned: what a credit note for all of an invoice comes to. */
export const mirrorTotals = (t: DocumentTotals): DocumentTotals => ({
  ...t,
  laborMinor: turn(t.laborMinor), laborDiscountMinor: turn(t.laborDiscountMinor), laborNetMinor: turn(t.laborNetMinor), partsMinor: turn(t.partsMinor),
  suppliesMinor: turn(t.suppliesMinor), freightMinor: turn(t.freightMinor), outsideMinor: turn(t.outsideMinor), coreMinor: turn(t.coreMinor),
  discountMinor: turn(t.discountMinor), netMinor: turn(t.netMinor), taxableMinor: turn(t.taxableMinor), taxMinor: turn(t.taxMinor), totalMinor: turn(t.totalMinor),
  baseByCode: Object.fromEntries(Object.entries(t.baseByCode).map(([code, base]) => [code, turn(base)])),
  groups: t.groups.map((g) => ({ ...g, baseMinor: turn(g.baseMinor), taxMinor: turn(g.taxMinor) })),
});
