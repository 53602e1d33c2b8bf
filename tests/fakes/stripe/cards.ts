/** The test cards and what typed card details have to look like. */
export interface Typed {
  number: string;
  expiry: string;
  cvc: string;
  name: string;
  email: string;
}

export type CardOutcome =
  | { readonly kind: "accepted" }
  | { readonly kind: "second-step" }
  | { readonly kind: "declined"; readonly code: string; readonly message: string };

/** Source: the provider's published test cards. */
export const TEST_CARDS: readonly { number: string; what: string; outcome: CardOutcome }[] = [
  { number: "4242 4242 4242 4242", what: "is accepted", outcome: { kind: "accepted" } },
  { number: "4000 0025 0000 3155", what: "asks for a second step", outcome: { kind: "second-step" } },
  { number: "4000 0000 0000 0002", what: "is declined", outcome: { kind: "declined", code: "generic_decline", message: "Your card was declined. Use another card." } },
  { number: "4000 0000 0000 9995", what: "is declined for lack of funds", outcome: { kind: "declined", code: "insufficient_funds", message: "Your card has insufficient funds. Use another card." } },
];

export const digitsOf = (text: string): string => text.replace(/[\s-]/g, "");

/** Check digit of ISO/IEC 7812-1 annex B. */
function passesCheckDigit(digits: string): boolean {
  let sum = 0;
  [...digits].reverse().forEach((d, i) => {
    const n = Number(d) * (i % 2 === 1 ? 2 : 1);
    sum += n > 9 ? n - 9 : n;
  });
  return sum % 10 === 0;
}

export function outcomeOf(number: string): CardOutcome | null {
  return TEST_CARDS.find((card) => digitsOf(card.number) === digitsOf(number))?.outcome ?? null;
}

export function expiryOf(text: string): { month: number; year: number } | null {
  const m = /^\s*(\d{1,2})\s*\/\s*(\d{2}|\d{4})\s*$/.exec(text);
  if (m === null) return null;
  const month = Number(m[1]);
  const year = Number(m[2]) < 100 ? 2000 + Number(m[2]) : Number(m[2]);
  return month >= 1 && month <= 12 ? { month, year } : null;
}

/** What is wrong, by field. Empty when the details can be tried. */
export function mistakesIn(typed: Typed, now: Date): Partial<Record<keyof Typed, string>> {
  const mistakes: Partial<Record<keyof Typed, string>> = {};
  const digits = digitsOf(typed.number);
  if (!/^\d{13,19}$/.test(digits) || !passesCheckDigit(digits)) mistakes.number = "This is not a card number. Use one of the test cards below.";
  else if (outcomeOf(digits) === null) mistakes.number = "Only the test cards below work here. Never type a real card.";
  const expiry = expiryOf(typed.expiry);
  if (expiry === null) mistakes.expiry = "Write month and year, such as 12/34.";
  else if (expiry.year * 12 + expiry.month < now.getUTCFullYear() * 12 + now.getUTCMonth() + 1) mistakes.expiry = "This card has expired. Any month to come works.";
  if (!/^\d{3,4}$/.test(typed.cvc.trim())) mistakes.cvc = "The security code has 3 digits. Any work here.";
  if (!/^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(typed.email.trim())) mistakes.email = "Write an e-mail address, such as name@example.com.";
  return mistakes;
}
