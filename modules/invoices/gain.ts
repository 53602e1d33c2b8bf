import "server-only";
import type { ShopContext } from "@/modules/access/context";
import type { SideGain } from "@/modules/flow/domain/side-gain";
import { gainForPiece } from "@/modules/flow/queries/gain";
import { NOT_MEASURED, pieceGain, type GainSide, type PieceGain } from "./domain/gain-block";

function sideOf(cylinder: number, s: SideGain): GainSide | null {
  if (s.state === "absent") return null;
  const conditions = `${s.conditions.join(", ")}.`;
  const base = { side: s.side, cylinder, atInH2O: s.atInH2O, camLiftUm: s.camLiftUm, conditions };
  if (s.state === "withheld") return { ...base, comparison: { comparable: false, reasons: s.reasons, notes: s.notes, rows: s.rows } };
  return {
    ...base,
    comparison: {
      comparable: true, notes: s.notes, rows: s.rows, unpairedRows: s.unpairedRows, meanBeforeCfm: s.meanBeforeCfm, meanAfterCfm: s.meanAfterCfm, meanGainCfm: s.meanGainCfm,
      meanPercent: s.meanPercent, peak: s.peak, losses: s.losses, crossovers: s.crossovers, atCamLift: s.atCamLift,
    },
  };
}

const ABSENT_WORDS = { before: "before the work", after: "after the work", both: "before or after the work" } as const;

/** The measured gain of a piece as an invoice prints it: both tables, or in words why there is none. */
export async function gainOfPiece(ctx: ShopContext, pieceId: string): Promise<PieceGain> {
  const { ports } = await gainForPiece(ctx, pieceId);
  const sides = ports.flatMap((p) => [sideOf(p.cylinder, p.intake), sideOf(p.cylinder, p.exhaust)]).filter((s) => s !== null);
  if (sides.length > 0) return pieceGain(sides);
  const absent = [...new Set(ports.flatMap((p) => [p.intake, p.exhaust]).flatMap((s) => (s.state === "absent" && s.absent !== "both" ? [s.absent] : [])))];
  return absent.length === 0 ? NOT_MEASURED : { comparable: false, sides: [], reasons: absent.map((a) => `No flow was measured ${ABSENT_WORDS[a]}.`) };
}
