import { z } from "@/modules/kernel/zod";
import { typedNumber } from "./domain/typed-number";

interface Limits { min?: number; max: number; unit?: string; /** The least value itself is not accepted. */ above?: boolean }

const said = ({ min, max, unit = "", above = false }: Limits): string => {
  const u = unit ? ` ${unit}` : "";
  if (min === undefined) return `A number up to ${max}${u}, with a point or a comma for decimals.`;
  return above ? `A number above ${min} and up to ${max}${u}, with a point or a comma for decimals.` : `A number from ${min} to ${max}${u}, with a point or a comma for decimals.`;
};

/** Number of a text as typed, or null when it is outside. */
function numberIn(text: string, { min = -Infinity, max, above = false }: Limits): number | null {
  const typed = typedNumber(text);
  if (!typed.ok || typed.value > max) return null;
  return typed.value > min || (!above && typed.value === min) ? typed.value : null;
}

/** A number typed by hand, with point or comma; sent as text, read as a number. */
export const typedField = (limits: Limits) =>
  z.string().trim().max(24, "At most 24 characters.").transform((text, ctx) => {
    const value = numberIn(text, limits);
    if (value !== null) return value;
    ctx.addIssue({ code: "custom", message: said(limits) });
    return z.NEVER;
  });

/** The same, and an empty field is null. */
export const optionalField = (limits: Limits) =>
  z.string().trim().max(24, "At most 24 characters.").default("").transform((text, ctx) => {
    if (text === "") return null;
    const value = numberIn(text, limits);
    if (value !== null) return value;
    ctx.addIssue({ code: "custom", message: `${said(limits)} Or leave it empty.` });
    return z.NEVER;
  });

export const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");
export const words = (max: number) => z.string().trim().max(max, `At most ${max} characters.`);
