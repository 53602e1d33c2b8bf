import { allocate } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/** How one interval on one setup is shared over several pieces. */
export type ShareBasis =
  | { readonly by: "equal"; readonly pieces: number }
  | { readonly by: "book"; readonly bookMinutes: readonly number[] }
  | { readonly by: "typed"; readonly minutes: readonly number[] };

/**
 * Whole minutes per piece by largest remainder; the earlier line (lower tag) wins a tie. The shares add up to the
 * interval, never to more.
 * Refuses `NO_PIECES`, and `SHARES_DO_NOT_ADD_UP` with the difference for typed shares.
 */
export function shareMinutes(interval: number, basis: ShareBasis): Result<number[]> {
  const count = basis.by === "equal" ? basis.pieces : basis.by === "book" ? basis.bookMinutes.length : basis.minutes.length;
  if (!Number.isInteger(count) || count < 1) return refuse("NO_PIECES", "Choose at least one piece for this time.", { field: "pieces" });
  if (basis.by === "equal") return ok(allocate(interval, Array.from({ length: count }, () => 1)));
  if (basis.by === "book") {
    const known = basis.bookMinutes.some((m) => m > 0);
    return ok(allocate(interval, known ? basis.bookMinutes : basis.bookMinutes.map(() => 1)));
  }
  const sum = basis.minutes.reduce((a, b) => a + b, 0);
  if (basis.minutes.some((m) => !Number.isInteger(m) || m < 0) || sum !== interval) {
    return refuse("SHARES_DO_NOT_ADD_UP", `The shares come to ${sum} min, the interval has ${interval}. Use whole minutes that add up to ${interval}.`, {
      field: "minutes", data: { differenceMinutes: sum - interval },
    });
  }
  return ok([...basis.minutes]);
}
