import type { EntryKind, PortSide } from "./comparison-reasons";
import type { LiftUnit } from "./lift-ladder";
import type { BenchHistory } from "./noise";
import type { SanityLimits } from "./sanity-limits";

export type BenchScale = "direct" | "percent_linear" | "orifice_head";
/** `series_orifice`: weather cancels. `absolute_meter`: counts the air as it is, and is brought to reference air. */
export type BenchKind = "series_orifice" | "absolute_meter";
export type WaterUnit = "conventional" | "39.2F" | "60F";
export type Purpose = "baseline" | "after" | "interim" | "check";
export type TestState = "draft" | "complete" | "void";
export type ValueUnit = "cfm" | "L/s" | "m3/h" | "percent" | "head";
export type HeldUnit = "inH2O" | "Pa" | "hPa" | "kPa";

export interface BenchRange {
  readonly label: string;
  /** Flow at the end of the scale, cfm. */
  readonly fullScaleCfm: number;
  /** Head at the end of the scale, in the manometer's own unit; for scales read as a head. */
  readonly fullScaleHead?: number | undefined;
}

export interface BenchFacts {
  readonly id: string;
  readonly name: string;
  /** Left out: series_orifice. */
  readonly kind?: BenchKind;
  readonly scale: BenchScale;
  readonly ranges: readonly BenchRange[];
  readonly waterUnit: WaterUnit;
}

/** Standard uncertainties of a bench and its lift device; null = not stated, and then taken as nothing, which is said. */
export interface KnownUncertainty {
  readonly pressureInH2O: number | null;
  readonly readingCfm: number | null;
  readonly liftMm: number | null;
  /** Step the indicator shows, mm. */
  readonly liftStepMm: number | null;
}

/** One cell of a sheet as it was typed: the newest revision of one lift and repeat. Empty text = cleared. */
export interface RawCell {
  readonly liftUm: number;
  readonly repeatNo: number;
  /** 0 = nothing was ever typed here. */
  readonly revision: number;
  readonly valueText: string;
  readonly valueUnit: ValueUnit;
  readonly rangeLabel: string | null;
  readonly pressureText: string;
  readonly pressureUnit: HeldUnit;
  /** Air at the port and at the orifice, with units; both or neither. */
  readonly portTemperatureText?: string;
  readonly orificeTemperatureText?: string;
  readonly acceptedReason: string | null;
  readonly excludedReason: string | null;
  readonly takenAt: string;
}

/** One run over the lifts as kept: conditions and cells as typed, nothing computed. Instants are ISO texts. */
export interface RawTest {
  readonly id: string;
  readonly side: PortSide;
  readonly purpose: Purpose;
  readonly runNo: number;
  readonly state: TestState;
  readonly version: number;
  readonly bench: BenchFacts;
  readonly benchFactor: number;
  readonly benchCheckedAt: string | null;
  /** Left out: nothing is stated. */
  readonly known?: KnownUncertainty;
  /** Repeats of its bench in the twelve months up to this test, at its pressure. Left out: not asked for. */
  readonly history?: BenchHistory;
  /** What its checks are held against, where the shop set any of it. Left out: the product's. */
  readonly limits?: SanityLimits;
  readonly fixture: { readonly id: string; readonly name: string; readonly boreMm: number };
  readonly nominalInH2O: number;
  readonly lifts: readonly { readonly liftUm: number; readonly text: string }[];
  readonly liftUnit: LiftUnit;
  readonly camLiftUm: number | null;
  readonly liftDevice?: { readonly id: string; readonly name: string } | null;
  readonly camshaft?: { readonly id: string; readonly label: string } | null;
  readonly entry: EntryKind;
  /** Names of the open valves, comma between; "all" when all of the port. */
  readonly valvesOpen: string;
  readonly valveMm: number | null;
  readonly seatNote: string;
  readonly plugClosed: boolean;
  readonly testSprings: boolean;
  readonly warmUpMinutes: number | null;
  readonly roomTemperatureText: string;
  readonly roomPressureText: string;
  readonly roomHumidityText: string;
  readonly leakText: string;
  readonly leakPressureText: string;
  /** A leak read at another pressure than a reading may be scaled to it. Left out: not agreed. */
  readonly leakScalingAgreed?: boolean;
  /** What the indicator showed on the closed seat after the last lift, micrometres; null or left out: not looked at. */
  readonly zeroReturnUm?: number | null;
  readonly notes: string;
  readonly operator: { readonly id: string; readonly name: string };
  readonly startedAt: string;
  readonly completedAt: string | null;
  readonly correctsTestId: string | null;
  readonly voidReason: string | null;
  readonly cells: readonly RawCell[];
}
