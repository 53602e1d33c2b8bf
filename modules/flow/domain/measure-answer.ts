/** What the records answer to one line of the sheet. */
export interface SavedMeasure { key: string; revision: number; valueText: string; unit: string; base: number }
export interface RefusedMeasure {
  key: string;
  code: string;
  message: string;
  /** It is kept when the person says that it stands. */
  asks: boolean;
  /** What somebody else wrote there meanwhile. */
  theirs: { revision: number; valueText: string; unit: string } | null;
}
