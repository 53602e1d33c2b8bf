/** Hazards told at the start of a bench session, with what they rest on. Shown once a job to each person; never a block. */
export interface BenchCaution {
  readonly hazard: "noise" | "suction" | "springs";
  readonly title: string;
  readonly words: string;
  readonly source: string;
}
export const BENCH_CAUTIONS: readonly BenchCaution[] = [
  { hazard: "noise", title: "Noise.", words: "Blower and grinders: wear hearing protection.", source: "29 CFR 1910.95" },
  { hazard: "suction", title: "Suction.", words: "Loose parts, clay and rags can be drawn in; shut the blower before reaching in.", source: "common practice, no source" },
  { hazard: "springs", title: "Test springs.", words: "Stored energy: seat the tool, eye protection, keep the face out of line.", source: "29 CFR 1910.133" },
];
export const CAUTION_CLOSE = "Local law and your safety data sheet come first. Ask a qualified person.";
/** The step of a job at which they are shown. */
export const BENCH_STEP = "bench session";
