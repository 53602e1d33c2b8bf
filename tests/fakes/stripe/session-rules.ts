import { invalid } from "./refusal";

export interface SessionWanted {
  amount: number;
  currency: string;
  description: string;
  reference: string | null;
  metadata: Record<string, string>;
  intentMetadata: Record<string, string>;
  email: string | null;
  successUrl: string;
  cancelUrl: string | null;
  expiresAt: number | null;
}

export const DAY_SECONDS = 86_400;

/** What the provider refuses to make a payment page for. Times are Unix seconds; a few seconds of grace for slow calls. */
export function checkSession(amount: number, expiresAt: number, created: number): void {
  if (expiresAt < created + 30 * 60 - 5) throw invalid("The `expires_at` timestamp must be at least 30 minutes from Checkout Session creation.", "expires_at");
  if (expiresAt > created + DAY_SECONDS + 5) throw invalid("The `expires_at` timestamp must be less than 24 hours from Checkout Session creation.", "expires_at");
  if (amount < 50) throw invalid("The Checkout Session's total amount is below the smallest that can be charged.", "line_items", "amount_too_small");
  if (amount > 99_999_999) throw invalid("The amount must be no more than 999,999.99.", "line_items", "amount_too_large");
}
