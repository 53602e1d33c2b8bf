import { milliText } from "@/modules/kernel/quantity";
import { unitMark } from "./part-words";

/** Quantity as shown: `6`, `42.5 g`; a true minus sign below 0. */
export const qtyText = (qtyMilli: number, unit: string): string => [milliText(qtyMilli).replace("-", "−"), unitMark(unit)].filter(Boolean).join(" ");

/** With a plus before what came: `+6`, `−2`. */
export const signedQtyText = (qtyMilli: number, unit: string): string => `${qtyMilli > 0 ? "+" : ""}${qtyText(qtyMilli, unit)}`;
