import { decimal } from "@/modules/kernel/format";
import { scaleLiftText } from "../domain/curve-scale";
import type { LiftUnit } from "../domain/lift-ladder";

/** `24.6` for the reader's place. Flow is never printed finer than a tenth. */
export const flowText = (cfm: number, locale: string): string => decimal(cfm, 1, locale);
/** `+2.7`, `−0.6`, `0.0`: a difference with its sign, a true minus. */
export const differenceText = (cfm: number, locale: string, digits = 1): string => {
  const size = decimal(Math.abs(cfm), digits, locale);
  const isZero = Number(Math.abs(cfm).toFixed(digits)) === 0;
  return isZero ? size : `${cfm > 0 ? "+" : "−"}${size}`;
};
/** `.350` in, `8.6` mm. */
export const liftWords = (liftUm: number, unit: LiftUnit, locale: string): string => scaleLiftText(liftUm, unit, (v, d) => decimal(v, d, locale));
