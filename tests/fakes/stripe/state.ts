import { randomBytes } from "node:crypto";
import { mkdirSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import path from "node:path";
import type Stripe from "stripe";

/** What the stand-in remembers. Objects are the provider's own types, so the compiler checks that none lacks a field. */
export interface State {
  sessions: Stripe.Checkout.Session[];
  intents: Stripe.PaymentIntent[];
  intentOfSession: Record<string, string>;
  charges: Stripe.Charge[];
  refunds: Stripe.Refund[];
  disputes: Stripe.Dispute[];
  payouts: Stripe.Payout[];
  balance: Stripe.BalanceTransaction[];
  /** Balance transaction -> the payout that carried it to the bank. */
  paidOut: Record<string, string>;
  events: Stripe.EventBase[];
  /** Idempotency key -> what was asked and answered. */
  answers: Record<string, { asked: string; status: number; body: string }>;
  deliveries: Delivery[];
  fee: Fee;
}

/** Charge fee: basis points of the amount, rounded half-up, and a fixed part in minor units. */
export interface Fee {
  basisPoints: number;
  fixedMinor: number;
}

export interface Delivery {
  event: string;
  type: string;
  at: string;
  /** HTTP status that the application answered, or why there was none. */
  outcome: number | "dropped" | "held" | "unreachable";
}

const fresh = (fee: Fee): State => ({
  sessions: [], intents: [], intentOfSession: {}, charges: [], refunds: [], disputes: [], payouts: [], balance: [], paidOut: {}, events: [], answers: {}, deliveries: [], fee,
});

/** The state of one stand-in, kept in a file so that a restart loses nothing. Without a file it lives in memory. */
export class Keeper {
  state: State;

  constructor(private readonly file: string | null, private readonly fee: Fee) {
    this.state = fresh(fee);
    if (file === null) return;
    try {
      this.state = { ...this.state, ...(JSON.parse(readFileSync(file, "utf8")) as Partial<State>) };
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== "ENOENT") throw error;
    }
  }

  private pending: NodeJS.Timeout | null = null;

  /** Soon on the disk: many changes at once become one writing. */
  save(): void {
    if (this.file === null) return;
    this.pending ??= setTimeout(() => this.flush(), 50);
  }

  flush(): void {
    if (this.pending === null || this.file === null) return;
    clearTimeout(this.pending);
    this.pending = null;
    mkdirSync(path.dirname(this.file), { recursive: true });
    const half = `${this.file}.half`;
    writeFileSync(half, JSON.stringify(this.state));
    renameSync(half, this.file);
  }

  clear(): void {
    this.state = fresh(this.fee);
    this.save();
  }
}

const ALPHABET = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789";

/** `cs_test_…`, `pi_…` and so on. */
export function newId(prefix: string, length = 24): string {
  return `${prefix}_${[...randomBytes(length)].map((b) => ALPHABET[b % ALPHABET.length]).join("")}`;
}

/** Fee of a charge. `{ basisPoints: 270, fixedMinor: 25 }` of 191033 -> 5183. */
export const feeOf = (amountMinor: number, fee: Fee): number => Math.floor((amountMinor * fee.basisPoints + 5000) / 10_000) + fee.fixedMinor;
