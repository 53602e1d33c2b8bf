import { refuse, type Refused, type Result } from "@/modules/kernel/result";
import { POWER_ESTIMATE_WORDS } from "../domain/power-estimate";
import { AIR_WORKINGS } from "./air";
import { AREA_WORKINGS } from "./areas";
import { CHAMBER_WORKINGS } from "./chamber";
import { CLEARANCE_WORKINGS } from "./clearances";
import { COEFFICIENT_WORKINGS } from "./coefficients";
import { CURVE_WORKINGS } from "./curves";
import { DOUBT_WORKINGS } from "./doubts";
import { ENGINE_WORKINGS } from "./engine";
import { EPOXY_WORKINGS } from "./epoxy";
import { GAIN_WORKINGS } from "./gain";
import { NOISE_WORKINGS } from "./noise";
import { ORIFICE_WORKINGS } from "./orifice";
import type { Answer } from "./output";
import { READING_WORKINGS } from "./reading";
import { SPRING_WORKINGS } from "./springs";
import type { Working } from "./working";

export interface WorkingGroup { readonly key: string; readonly label: string; readonly workings: readonly Working[] }

/** Every function of the bench, in the order a bench operator meets them. */
export const WORKING_GROUPS: readonly WorkingGroup[] = [
  { key: "air", label: "Units and air", workings: AIR_WORKINGS },
  { key: "reading", label: "Reading and leak", workings: READING_WORKINGS },
  { key: "orifice", label: "Orifice and calibration", workings: ORIFICE_WORKINGS },
  { key: "areas", label: "Areas and coefficients", workings: [...AREA_WORKINGS, ...COEFFICIENT_WORKINGS] },
  { key: "curves", label: "Curves and means", workings: CURVE_WORKINGS },
  { key: "gain", label: "Gain and noise", workings: [...GAIN_WORKINGS, ...NOISE_WORKINGS, ...DOUBT_WORKINGS] },
  { key: "engine", label: "Engine estimates", workings: ENGINE_WORKINGS },
  { key: "chamber", label: "Chamber and springs", workings: [...CHAMBER_WORKINGS, ...SPRING_WORKINGS] },
  { key: "clearances", label: "Clearances", workings: CLEARANCE_WORKINGS },
  { key: "epoxy", label: "Epoxy", workings: EPOXY_WORKINGS },
];

export const WORKINGS: readonly Working[] = WORKING_GROUPS.flatMap((g) => g.workings);
const BY_NAME = new Map(WORKINGS.map((w) => [w.name, w]));
export const workingOf = (name: string): Working | null => BY_NAME.get(name) ?? null;

/** What an estimate says in a shop that did not switch estimates on. */
export const estimatesOff = (): Refused =>
  refuse("ESTIMATES_OFF", `Estimates from airflow are off in this shop; the owner may switch them on under Coefficients and noise of a head. ${POWER_ESTIMATE_WORDS}`);

/** Runs a working in a shop: estimates only where its owner wants them. */
export const runWorking = (working: Working, inputs: unknown, shop: { readonly estimatesOn: boolean }): Result<Answer> =>
  working.isEstimate && !shop.estimatesOn ? estimatesOff() : working.run(inputs);
