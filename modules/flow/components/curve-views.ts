/** What the curve of the page of figures shows. */
export type CurveView = "flow" | "cd" | "speed";
export const CURVE_VIEWS = [{ key: "flow", label: "Flow" }, { key: "cd", label: "Coefficient" }, { key: "speed", label: "Speed" }] as const;
/** The view an address asks for; what it does not know is passed over. */
export const curveViewAsked = (asked: unknown): CurveView => (asked === "cd" || asked === "speed" ? asked : "flow");
