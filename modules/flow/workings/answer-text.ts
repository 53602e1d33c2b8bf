import { decimal } from "@/modules/kernel/format";
import type { Output } from "./output";

/** A number with the digits that mean something, and a true minus. */
export function figureText(output: Output, value: number, locale: string): string {
  const size = value === 0 ? 0 : Math.floor(Math.log10(Math.abs(value)));
  const digits = output.figures === undefined ? (output.decimals ?? 0) : Math.min(9, Math.max(0, output.figures - 1 - size));
  const rounded = output.figures === undefined ? value : Number(value.toPrecision(output.figures));
  const text = decimal(Math.abs(rounded), digits, locale);
  return value < 0 && Number(Math.abs(rounded).toFixed(digits)) !== 0 ? `−${text}` : text;
}

/** One entry of an answer in words: a figure, yes or no, or what a code means. */
export function entryText(output: Output, value: number | string | boolean | null, locale: string): string {
  if (value === null) return "–";
  if (typeof value === "boolean") return value ? "yes" : "no";
  const meant = output.words?.[String(value)];
  if (meant !== undefined) return meant;
  return typeof value === "number" ? figureText(output, value, locale) : value;
}

