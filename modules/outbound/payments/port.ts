import type { Result } from "@/modules/kernel/result";

/** What the application needs of a card payment provider. Amounts are whole minor units, currencies ISO 4217 in capitals. */
export interface CheckoutRequest {
  readonly amountMinor: number;
  readonly currency: string;
  /** What the customer reads beside the amount. */
  readonly description: string;
  /** Our own name for what is paid. It is handed back with the session and its events. */
  readonly reference: string;
  readonly metadata: Readonly<Record<string, string>>;
  /** `{CHECKOUT_SESSION_ID}` in it is replaced by the session's id. */
  readonly successUrl: string;
  readonly cancelUrl: string;
  readonly customerEmail?: string;
  /** The same key with the same request gives the same session. */
  readonly idempotencyKey: string;
  /** Between 30 minutes and 24 hours ahead by the provider's clock. */
  readonly expiresAt: Date;
}

export interface CheckoutSession {
  readonly id: string;
  /** Page to pay on; null once the session is over. */
  readonly url: string | null;
  readonly status: "open" | "complete" | "expired";
  /** Money is there only when this says `paid`: a complete session may still wait for a slow method. */
  readonly paymentStatus: "paid" | "unpaid" | "no_payment_required";
  readonly amountMinor: number;
  readonly currency: string;
  readonly reference: string | null;
  readonly paymentIntent: string | null;
  readonly metadata: Readonly<Record<string, string>>;
  readonly expiresAt: Date;
}

export interface RefundRequest {
  readonly paymentIntent: string;
  readonly amountMinor: number;
  readonly idempotencyKey: string;
  readonly metadata?: Readonly<Record<string, string>>;
}

export interface Refund {
  readonly id: string;
  readonly status: "pending" | "requires_action" | "succeeded" | "failed" | "canceled";
  readonly amountMinor: number;
  readonly currency: string;
  readonly paymentIntent: string | null;
}

export interface Payout {
  readonly id: string;
  readonly status: "pending" | "in_transit" | "paid" | "failed" | "canceled";
  /** What arrives at the bank: the sum of the nets of its balance transactions. */
  readonly amountMinor: number;
  readonly currency: string;
  /** Day (UTC) on which the bank should have it, `YYYY-MM-DD`. */
  readonly arrivalDate: string;
  readonly createdAt: Date;
}

export interface BalanceTransaction {
  readonly id: string;
  /** `charge`, `refund`, `adjustment`, `payout` and others: new kinds may appear. */
  readonly kind: string;
  readonly grossMinor: number;
  readonly feeMinor: number;
  /** gross less fee; checked when read. */
  readonly netMinor: number;
  readonly currency: string;
  /** Charge, refund or payout that moved the balance. */
  readonly source: string | null;
  /** Set for charges and refunds, and so leads back to the checkout session. */
  readonly paymentIntent: string | null;
  readonly createdAt: Date;
}

export type ProviderFact =
  /** `checkout.session.*` */
  | { readonly kind: "checkout"; readonly session: CheckoutSession }
  /** `charge.refunded` and `refund.*`: totals of the charge so far, or the refund itself. */
  | { readonly kind: "refunded"; readonly paymentIntent: string | null; readonly refundedMinor: number; readonly currency: string }
  | { readonly kind: "refund"; readonly refund: Refund }
  /** `charge.dispute.*`; `evidenceBy`: until when the shop may answer, null when the provider names no such instant. */
  | { readonly kind: "dispute"; readonly id: string; readonly paymentIntent: string | null; readonly status: string; readonly amountMinor: number; readonly currency: string; readonly evidenceBy: Date | null }
  /** `payout.*` */
  | { readonly kind: "payout"; readonly payout: Payout }
  /** Kinds we have no use for. They are acknowledged and kept, nothing else. */
  | { readonly kind: "other" };

export interface ProviderEvent {
  readonly id: string;
  readonly type: string;
  readonly createdAt: Date;
  /** False for test keys. */
  readonly live: boolean;
  readonly fact: ProviderFact;
}

export interface PaymentPort {
  /** All but `verifyEvent`: @throws PaymentFailure */
  createCheckoutSession(request: CheckoutRequest): Promise<CheckoutSession>;
  getSession(id: string): Promise<CheckoutSession>;
  /** Refused by the provider once the session is complete. */
  expireSession(id: string): Promise<CheckoutSession>;
  refund(request: RefundRequest): Promise<Refund>;
  payoutsSince(createdFrom: Date): Promise<Payout[]>;
  /** Everything that makes up a payout, without the payout's own line. Nets add up to the payout. */
  balanceTransactionsOf(payoutId: string): Promise<BalanceTransaction[]>;
  /** Events straight from the provider, newest first: what a lost webhook would have said. */
  eventsSince(createdFrom: Date): Promise<ProviderEvent[]>;
  /** A webhook's body, taken only when the provider signed exactly these bytes in the last five minutes. */
  verifyEvent(rawBody: Uint8Array, signature: string | null): Result<ProviderEvent>;
}

export type PaymentFailureKind =
  | "unreachable" // no answer, or a broken one on the way
  | "busy" // 429 or 5xx
  | "refused" // the provider says no, and will again
  | "missing" // no such object
  | "key" // our secret key is wrong or may not do this
  | "reused-key" // same idempotency key, other request
  | "answer"; // an answer that is not what the provider promises

/** Why the provider did not do what was asked. */
export class PaymentFailure extends Error {
  override readonly name = "PaymentFailure";
  /** Trying again with the same idempotency key can help. */
  readonly retry: boolean;
  constructor(
    readonly kind: PaymentFailureKind,
    message: string,
    /** The provider's own code, such as `charge_already_refunded`. */
    readonly code: string | null = null,
    options?: { cause?: unknown },
  ) {
    super(message, options);
    this.retry = kind === "unreachable" || kind === "busy" || kind === "key";
  }
}
