/** A column of the sheet as far as its pressure goes. */
export interface StatedColumn {
  /** `intake before`. */
  readonly name: string;
  readonly atInH2O: number;
  /** ISO instant. */
  readonly startedAt: string;
  readonly isRead: boolean;
}

/** Pressures that flows are drawn at, newest test first; tests without a reading do not count. */
export function statedPressures(columns: readonly StatedColumn[]): number[] {
  return [...new Set(columns.filter((c) => c.isRead).sort((a, b) => b.startedAt.localeCompare(a.startedAt)).map((c) => c.atInH2O))];
}

/** What does not stand on one axis with the flows at this pressure, in words; empty when all of it does. */
export function leftOutWords(columns: readonly StatedColumn[], atInH2O: number, number: (value: number) => string): string {
  const out = columns.filter((c) => c.isRead && c.atInH2O !== atInH2O);
  if (out.length === 0) return "";
  const list = out.map((c) => `${c.name} at ${number(c.atInH2O)}`).join(", ");
  return `Drawn at ${number(atInH2O)} in H₂O. Not on this axis: ${list} in H₂O.`;
}
