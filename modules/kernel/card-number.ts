/**
 * Check digit test of payment card numbers: every second digit from the right doubled, sum divisible by ten.
 * Source: ISO/IEC 7812-1 annex B (Luhn).
 */
export function passesLuhn(digits: string): boolean {
  if (!/^\d+$/.test(digits)) return false;
  const sum = [...digits].reverse().reduce((total, c, i) => {
    const d = Number(c) * (i % 2 === 1 ? 2 : 1);
    return total + (d > 9 ? d - 9 : d);
  }, 0);
  return sum % 10 === 0;
}

/**
 * Whether a free text holds what looks like a card number: 13 to 19 digits, blanks and hyphens between allowed, that
 * pass the check digit test. Such a text is not to be stored. One number in ten passes by chance, so the message
 * should ask, not accuse.
 */
export function holdsCardNumber(text: string): boolean {
  // RF and two check digits open a creditor reference (ISO 11649), which is no card number.
  for (const run of text.replace(/\bRF\d{2}/gi, "RF ").match(/\d(?:[ -]?\d)+/g) ?? []) {
    const digits = run.replace(/\D/g, "");
    if (digits.length < 13) continue;
    if (digits.length <= 19 && passesLuhn(digits)) return true;
    // A longer run may have a number stuck to it by blanks: look at each group of its own.
    if (digits.length > 19 && run.split(/[ -]/).some((g) => g.length >= 13 && g.length <= 19 && passesLuhn(g))) return true;
    if (digits.length > 19 && groupsOfFour(run)) return true;
  }
  return false;
}

/** Four groups of four in a row somewhere in a longer run. */
function groupsOfFour(run: string): boolean {
  const groups = run.split(/[ -]/);
  return groups.some((_, i) => {
    const four = groups.slice(i, i + 4);
    return four.length === 4 && four.every((g) => g.length === 4) && passesLuhn(four.join(""));
  });
}
