import { stripePayments } from "@/modules/outbound/payments/stripe";
import type { CheckoutRequest, PaymentPort, ProviderEvent } from "@/modules/outbound/payments/port";
import type { Result } from "@/modules/kernel/result";
import { listen } from "../shared/http";
import { startPayments, type PaymentsStandIn } from "./server";

/** A stand-in, our port pointed at it, and an application that only listens: for tests of either. */
export interface Bench {
  readonly fake: PaymentsStandIn;
  readonly port: PaymentPort;
  /** Every webhook call, checked by the port as the application would. */
  readonly heard: Result<ProviderEvent>[];
  /** What the application answers; 200 unless set. */
  answer: number;
  control(what: string, input?: unknown): Promise<unknown>;
  /** Send the payment page's form. */
  submit(sessionId: string, form: Record<string, string>): Promise<Response>;
  /** Wait until `fits` holds. */
  until(fits: () => boolean, what: string): Promise<void>;
  close(): Promise<void>;
}

export const SECRET_KEY = "sk_test_local_bench";
export const WEBHOOK_SECRET = "whsec_bench";

export async function openBench(options: { now: () => Date; file?: string | null; timeoutMs?: number; retriesMax?: number }): Promise<Bench> {
  const heard: Result<ProviderEvent>[] = [];
  const receiver = await listen((call) => {
    const header = call.headers["stripe-signature"];
    heard.push(bench.port.verifyEvent(call.body, typeof header === "string" ? header : null));
    return { status: bench.answer };
  }, 0);
  const fake = await startPayments({
    port: 0, file: options.file ?? null, secretKey: SECRET_KEY, webhookSecret: WEBHOOK_SECRET, webhookUrl: `http://127.0.0.1:${receiver.port}/`, now: options.now,
  });
  const port = stripePayments({
    secretKey: SECRET_KEY, webhookSecret: WEBHOOK_SECRET, apiBase: `http://127.0.0.1:${fake.port}`, timeoutMs: options.timeoutMs ?? 10_000, retriesMax: options.retriesMax ?? 2,
  });
  const bench: Bench = {
    fake, port, heard, answer: 200,
    control: async (what, input = {}) => {
      const answer = await fetch(`http://127.0.0.1:${fake.port}/_control/${what}`, { method: "POST", body: JSON.stringify(input) });
      if (!answer.ok) throw new Error(`${what}: ${answer.status} ${await answer.text()}`);
      return (await answer.json()) as unknown;
    },
    submit: (id, form) => fetch(`http://127.0.0.1:${fake.port}/c/pay/${id}`, { method: "POST", body: new URLSearchParams(form), redirect: "manual" }),
    until: async (fits, what) => {
      const end = Date.now() + 15_000;
      while (!fits()) {
        if (Date.now() > end) throw new Error(`waited in vain: ${what}`);
        await new Promise((resolve) => setTimeout(resolve, 10));
      }
    },
    close: async () => {
      await fake.close();
      await receiver.close();
    },
  };
  return bench;
}

export const request = (now: Date, more: Partial<CheckoutRequest> = {}): CheckoutRequest => ({
  amountMinor: 191_033, currency: "USD", description: "Invoice 1042", reference: "invoice:1042", metadata: { shop: "s1", invoice: "i1" },
  successUrl: "http://localhost:3999/l/t/paid?s={CHECKOUT_SESSION_ID}", cancelUrl: "http://localhost:3999/l/t", customerEmail: "dana@example.org",
  idempotencyKey: `k-${Math.random()}`, expiresAt: new Date(now.getTime() + 23 * 3_600_000), ...more,
});

export const goodCard = { email: "dana@example.org", number: "4242 4242 4242 4242", expiry: "12/34", cvc: "123", name: "Dana Ortiz", way: "card" };
