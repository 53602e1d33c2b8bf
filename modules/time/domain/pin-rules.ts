/** A clock PIN is an activation secret beside an enrolled tablet, never a password. Source: NIST SP 800-63B-4, 3.2.10. */
export const PIN_DIGITS_MIN = 6;
export const PIN_DIGITS_MAX = 8;
/** Wrong PINs in a row before the first wait, and before the PIN is dead until a manager resets it. */
const PIN_TRIES_FREE = 5;
export const PIN_TRIES_MAX = 10;
const FIRST_WAIT_SECONDS = 30;

/** What is wrong with a PIN somebody wants, in words, or null. Repeats, runs and doubled halves are the first a thief types. */
export function pinProblem(pin: string): string | null {
  if (!/^\d+$/.test(pin) || pin.length < PIN_DIGITS_MIN || pin.length > PIN_DIGITS_MAX) return `Type ${PIN_DIGITS_MIN} to ${PIN_DIGITS_MAX} digits.`;
  const digits = [...pin].map(Number);
  const steps = digits.slice(1).map((d, i) => d - (digits[i] ?? 0));
  if (new Set(digits).size <= 2) return "Only one or two different digits: too easy to guess. Use at least three.";
  if (steps.every((s) => s === 1 || s === -9) || steps.every((s) => s === -1 || s === 9)) return "Digits in a row are too easy to guess. Mix them.";
  for (const part of [2, 3, 4]) {
    if (pin.length % part === 0 && pin === pin.slice(0, part).repeat(pin.length / part)) return "The same digits again and again are too easy to guess. Mix them.";
  }
  if (/^(19|20)\d{2}(0[1-9]|1[0-2])(0[1-9]|[12]\d|3[01])?$/.test(pin)) return "This reads like a date. Choose digits that do not.";
  return null;
}

/** Seconds to wait after this many wrong PINs in a row; null when the PIN is dead. 5 wrong: 30 s, then doubling. */
export const pinWaitSeconds = (wrongInARow: number): number | null =>
  wrongInARow >= PIN_TRIES_MAX ? null : wrongInARow < PIN_TRIES_FREE ? 0 : FIRST_WAIT_SECONDS * 2 ** (wrongInARow - PIN_TRIES_FREE);
