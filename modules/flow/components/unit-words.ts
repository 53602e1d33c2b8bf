import { decimal } from "@/modules/kernel/format";
import { LITRES_S_PER_CFM, pressureText, type Units } from "../domain/curve-measure";
import type { LiftUnit } from "../domain/lift-ladder";
import { differenceText, liftWords } from "./flow-words";

/** Figures as words in one system of units; flows come in as CFM, lifts as micrometres, pressures as inches of water. */
export interface UnitWords {
  readonly units: Units;
  readonly liftUnit: LiftUnit;
  readonly flowUnit: "CFM" | "L/s";
  readonly speedUnit: "ft/s" | "m/s";
  /** CFM into what is shown. */
  readonly perCfm: number;
  /** A tenth unless a mean asks for more. */
  readonly flow: (cfm: number, digits?: number) => string;
  readonly difference: (cfm: number, digits?: number) => string;
  readonly lift: (um: number) => string;
  readonly pressure: (inH2O: number) => string;
  readonly percent: (value: number, digits?: number) => string;
}

/** @param liftUnit the unit the test was read in; it stands unless another system is asked for. */
export function unitWords(units: Units, liftUnit: LiftUnit, locale: string): UnitWords {
  const isSi = units === "si";
  const unit = isSi ? "mm" : units === "us" ? "in" : liftUnit;
  const perCfm = isSi ? LITRES_S_PER_CFM : 1;
  return {
    units, liftUnit: unit, flowUnit: isSi ? "L/s" : "CFM", speedUnit: isSi ? "m/s" : "ft/s", perCfm,
    flow: (cfm, digits = 1) => decimal(cfm * perCfm, digits, locale), difference: (cfm, digits = 1) => differenceText(cfm * perCfm, locale, digits), lift: (um) => liftWords(um, unit, locale),
    pressure: (inH2O) => pressureText(inH2O, units, (v, d) => decimal(v, d, locale)), percent: (value, digits = 1) => `${decimal(value, digits, locale)} %`,
  };
}

/** The system an address asks for; what it does not know is passed over. */
export const unitsAsked = (asked: unknown): Units => (asked === "si" || asked === "us" ? asked : "read");

/** Choices for the switch: as read, inches too where lifts were read in millimetres, and SI. */
export const unitViews = (liftUnit: LiftUnit, href: (units: Units) => string): { key: Units; label: string; href: string }[] => [
  { key: "read", label: `CFM, ${liftUnit}, in H₂O`, href: href("read") },
  ...(liftUnit === "mm" ? [{ key: "us" as const, label: "CFM, in, in H₂O", href: href("us") }] : []),
  { key: "si", label: "L/s, mm, kPa", href: href("si") },
];
