export interface Combo {
  readonly key: string;
  readonly alt: boolean;
  readonly ctrl: boolean;
  readonly shift: boolean;
}

/** Keys that may act from anywhere: function keys, and anything held with Alt or Ctrl. */
const FUNCTION_KEY = /^F([1-9]|1[0-2])$/;

/**
 * Reads "F9", "Alt+1", "Ctrl+P". A bare letter, digit or sign is refused: single-key shortcuts outside a focused component
 * would fire on dictated or stray keystrokes (WCAG 2.2, 2.1.4).
 * @throws RangeError for a combination that is not allowed page-wide.
 */
export function parseCombo(text: string): Combo {
  const parts = text.split("+");
  const key = parts[parts.length - 1] ?? "";
  const held = new Set(parts.slice(0, -1).map((p) => p.toLowerCase()));
  const combo: Combo = { key, alt: held.has("alt"), ctrl: held.has("ctrl"), shift: held.has("shift") };
  if (!FUNCTION_KEY.test(key) && !combo.alt && !combo.ctrl) {
    throw new RangeError(`"${text}" cannot act page-wide: use a function key, or hold Alt or Ctrl`);
  }
  return combo;
}

interface Pressed {
  readonly key: string;
  readonly code: string;
  readonly altKey: boolean;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly shiftKey: boolean;
}

/** Digits and letters are matched by their place on the keyboard as well: with Alt held some systems type another sign. */
export function matches(combo: Combo, e: Pressed): boolean {
  if (e.altKey !== combo.alt || e.shiftKey !== combo.shift || (e.ctrlKey || e.metaKey) !== combo.ctrl) return false;
  if (e.key.toLowerCase() === combo.key.toLowerCase()) return true;
  return e.code === `Digit${combo.key}` || e.code === `Key${combo.key.toUpperCase()}`;
}
