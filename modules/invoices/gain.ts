import "server-only";
import type { ShopContext } from "@/modules/access/context";
import { NOT_MEASURED, type PieceGain } from "./domain/gain-block";

/** The measured gain of a piece as an invoice prints it. */
export async function gainOfPiece(_ctx: ShopContext, _pieceId: string): Promise<PieceGain> {
  return NOT_MEASURED;
}
