export type Stage = "before" | "after";
/** Where a measurement belongs: a valve has side and position, a cylinder or the whole head neither. */
export interface LinePlace { readonly cylinder: number; readonly side: "" | "intake" | "exhaust"; readonly position: "" | "single" | "left" | "centre" | "right" }

/** Name of a line on its sheet. */
export const lineKey = (stage: Stage, p: LinePlace, kind: string): string => `${stage}/${p.cylinder}/${p.side}/${p.position}/${kind}`;
