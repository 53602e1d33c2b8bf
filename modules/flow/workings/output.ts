export type Cell = number | string | null;
export type Value = number | string | boolean | readonly (number | null)[] | readonly string[] | readonly Readonly<Record<string, Cell>>[];

export type OutputKind = "number" | "numbers" | "word" | "words" | "yes" | "rows";

/** One figure of an answer, and how many digits of it mean anything. */
export interface Output {
  readonly key: string;
  readonly label: string;
  readonly unit: string;
  readonly kind: OutputKind;
  /** Digits after the point. */
  readonly decimals?: number;
  /** Significant figures, where the size is not known beforehand. */
  readonly figures?: number;
  /** What a code of the answer means. */
  readonly words?: Readonly<Record<string, string>>;
  /** Input list that heads the rows of a list. */
  readonly along?: readonly string[];
  readonly columns?: readonly Output[];
  /** Given only where the inputs determine it. */
  readonly sometimes?: true;
}

/** What a working gave: its figures unrounded, and the doubts that travel with them. */
export interface Answer {
  readonly values: Readonly<Record<string, Value>>;
  readonly flags: readonly string[];
}

export const figure = (key: string, label: string, unit: string, decimals: number): Output => ({ key, label, unit, kind: "number", decimals });
export const significant = (key: string, label: string, unit: string, figures: number): Output => ({ key, label, unit, kind: "number", figures });
export const column = (key: string, label: string, unit: string, decimals: number, along: readonly string[]): Output => ({ key, label, unit, kind: "numbers", decimals, along });
export const said = (key: string, label: string, meanings?: Readonly<Record<string, string>>): Output => ({ key, label, unit: "", kind: "word", ...(meanings ? { words: meanings } : {}) });
export const saidList = (key: string, label: string, meanings: Readonly<Record<string, string>>): Output => ({ key, label, unit: "", kind: "words", words: meanings });
export const isSo = (key: string, label: string): Output => ({ key, label, unit: "", kind: "yes" });
export const rows = (key: string, label: string, columns: readonly Output[]): Output => ({ key, label, unit: "", kind: "rows", columns });
export const sometimes = (output: Output): Output => ({ ...output, sometimes: true });
