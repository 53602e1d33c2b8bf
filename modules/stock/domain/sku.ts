import { ok, refuse, type Result } from "@/modules/kernel/result";

const ACCEPTED = "Use 2 to 40 capital letters, digits, dash or point, such as GV-S250-EX.";

/**
 * A part number of our own, read off a label by a person in poor light.
 * Refuses `SKU_BLANKS`, `SKU_SIGNS`, and `SKU_LOOKALIKE` for a letter O or I that touches a digit (it reads as 0 or 1).
 */
export function checkSku(text: string): Result<string> {
  const sku = text.trim().toUpperCase();
  if (/\s/.test(sku)) return refuse("SKU_BLANKS", `A part number has no blanks. ${ACCEPTED}`, { field: "sku" });
  if (!/^[A-Z0-9][A-Z0-9.-]{1,39}$/.test(sku)) return refuse("SKU_SIGNS", ACCEPTED, { field: "sku" });
  const near = /\d([OI])|([OI])\d/.exec(sku);
  if (near) {
    const letter = near[1] ?? near[2] ?? "";
    return refuse("SKU_LOOKALIKE", `The letter ${letter} beside a digit reads as ${letter === "O" ? "zero" : "one"}. Put a dash between, or choose another letter.`, { field: "sku" });
  }
  return ok(sku);
}

/** Two numbers with the same key look alike on a label: O as 0, I and L as 1 is too strict for L, so only O and I. */
export const lookalikeKey = (sku: string): string => sku.replaceAll("O", "0").replaceAll("I", "1");
