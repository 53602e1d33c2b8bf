import type { BenchScale } from "../domain/raw-test";

export const BENCH_SCALE_SHORT: Readonly<Record<BenchScale, string>> = { direct: "flow itself", percent_linear: "percent of range", orifice_head: "orifice head" };
