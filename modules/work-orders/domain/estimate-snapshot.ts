import type { DocumentTotals } from "@/modules/books/domain/document-totals";
import { money, type Place } from "@/modules/kernel/format";
import type { DocumentRules } from "./document-rules";
import { ROAD_CAUTION } from "./uses";

export type EstimateState = "draft" | "sent" | "replaced" | "approved" | "declined";

/** Words of a state as people read them. `expired` is not stored: it is a sent version past its day. */
export const ESTIMATE_STATE_WORDS: Record<EstimateState | "expired", string> = {
  draft: "Draft", sent: "Sent", replaced: "Replaced", approved: "Approved", declined: "Declined", expired: "Out of date",
};

export const ESTIMATE_LINE_KINDS = ["labor", "part", "outside", "note"] as const;
export type EstimateLineKind = (typeof ESTIMATE_LINE_KINDS)[number];

export interface SnapshotLine {
  readonly lineNo: number;
  readonly kind: EstimateLineKind;
  readonly pieceNo: number | null;
  /** Menu code or part number. */
  readonly code: string;
  readonly description: string;
  readonly qtyMilli: number;
  readonly unitPriceMinor: number;
  readonly amountMinor: number;
  readonly bookMinutes: number;
}

/** Everything an estimate prints, frozen when it is sent. Its hash is what the customer answers to. */
export interface EstimateSnapshot {
  readonly kind: "estimate";
  readonly number: string;
  readonly version: number;
  readonly date: string;
  readonly validUntil: string;
  readonly currency: string;
  readonly locale: string;
  readonly shop: { readonly name: string; readonly address: string; readonly phone: string; readonly email: string; readonly taxNumber: string };
  readonly customer: { readonly name: string; readonly address: string; readonly email: string; readonly phone: string };
  readonly customerReference: string;
  readonly use: string;
  readonly pieces: readonly { readonly pieceNo: number; readonly family: string; readonly castingNumber: string; readonly serial: string; readonly description: string; readonly tag: string | null }[];
  readonly lines: readonly SnapshotLine[];
  readonly laborDiscountBp: number;
  readonly exclusions: string;
  readonly message: string;
  readonly readyOn: string | null;
  readonly depositBp: number;
  /** Deposit of the order: asked once, with the first agreed version. */
  readonly depositMinor: number;
  /** True when an earlier version's deposit stands, so that nothing new is asked. */
  readonly depositStands: boolean;
  readonly rules: DocumentRules;
  readonly totals: DocumentTotals;
  /** Against the version agreed before, if any. */
  readonly change: { readonly fromVersion: number; readonly fromTotalMinor: number; readonly changeMinor: number } | null;
  readonly findings: readonly { readonly id: string; readonly position: string; readonly words: string }[];
  /** What a yes means, in words. */
  readonly words: string;
}

/** The words agreed to. Written estimate and consent rules differ by place; the shop answers for its own. */
export function agreementWords(p: {
  number: string; version: number; totalMinor: number; depositMinor: number; depositStands: boolean; change: EstimateSnapshot["change"]; use: string; place: Pick<Place, "locale" | "currency">;
}): string {
  const m = (minor: number) => money(minor, p.place);
  const deposit = p.depositStands
    ? ` The deposit of ${m(p.depositMinor)} given before stands; none is asked again.`
    : p.depositMinor > 0 ? ` A deposit of ${m(p.depositMinor)} is due now and is taken off the invoice.` : "";
  const change = p.change ? ` It replaces version ${p.change.fromVersion} and changes the total by ${m(p.change.changeMinor)}.` : "";
  const road = p.use === "road" ? ` ${ROAD_CAUTION}` : "";
  return `I agree to the work and prices of estimate ${p.number}, version ${p.version}, for ${m(p.totalMinor)} in all.${change}${deposit} Nothing beyond it is started without asking me again.${road}`;
}
