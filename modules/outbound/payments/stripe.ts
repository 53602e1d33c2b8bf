import Stripe from "stripe";
import { ok, refuse } from "@/modules/kernel/result";
import { readBalanceTransaction, readEvent, readPayout, readRefund, readSession } from "./answers";
import { PaymentFailure, type PaymentPort } from "./port";

export interface StripeConfig {
  readonly secretKey: string;
  readonly webhookSecret: string;
  /** Only for a stand-in on this machine, such as `http://127.0.0.1:3030`. */
  readonly apiBase?: string;
  /** Longest wait for one answer, milliseconds. */
  readonly timeoutMs?: number;
  readonly retriesMax?: number;
}

/** The version the library was written for, so that an account's own setting can't change the answers' shape. */
const API_VERSION = "2026-10-28.endive";

/** Most objects read of one list; far above what a shop makes in the spans we ask for. */
const LIST_MAX = 10_000;

const unixSeconds = (instant: Date): number => Math.floor(instant.getTime() / 1000);

/** Any error of the library, as ours. */
function paymentFailure(error: unknown): PaymentFailure {
  if (error instanceof PaymentFailure) return error;
  const more = { cause: error };
  if (!(error instanceof Stripe.errors.StripeError)) {
    return new PaymentFailure("unreachable", "The payment provider's answer was broken off.", null, more);
  }
  const code = error.code ?? null;
  const status = error.statusCode ?? 0;
  if (error instanceof Stripe.errors.StripeIdempotencyError) {
    return new PaymentFailure("reused-key", "The same request key was used for another payment.", code, more);
  }
  if (error instanceof Stripe.errors.StripeConnectionError || status === 0) {
    return new PaymentFailure("unreachable", "The payment provider can't be reached.", code, more);
  }
  if (status === 429 || status >= 500) return new PaymentFailure("busy", "The payment provider is busy.", code, more);
  if (status === 401 || status === 403) return new PaymentFailure("key", "The payment provider does not accept our key.", code, more);
  // Another request with the same key is still running there.
  if (status === 409) return new PaymentFailure("busy", "The payment provider is still at the first try.", code, more);
  if (status === 404) return new PaymentFailure("missing", "The payment provider does not know this payment.", code, more);
  if (status >= 200 && status < 300) return new PaymentFailure("answer", "The payment provider's answer can't be read.", code, more);
  return new PaymentFailure("refused", `The payment provider refused: ${error.message}`, code, more);
}

async function asked<T>(call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    throw paymentFailure(error);
  }
}

function address(apiBase: string) {
  const url = new URL(apiBase);
  const protocol = url.protocol === "http:" ? ("http" as const) : ("https" as const);
  return { host: url.hostname, port: url.port || (protocol === "http" ? "80" : "443"), protocol };
}

/** Payments through the provider's own library. */
export function stripePayments(config: StripeConfig): PaymentPort {
  const stripe = new Stripe(config.secretKey, {
    apiVersion: API_VERSION,
    timeout: config.timeoutMs ?? 5000,
    maxNetworkRetries: config.retriesMax ?? 2,
    telemetry: false,
    ...(config.apiBase === undefined ? {} : address(config.apiBase)),
  });

  return {
    createCheckoutSession: (request) =>
      asked(async () =>
        readSession(
          await stripe.checkout.sessions.create(
            {
              mode: "payment",
              client_reference_id: request.reference,
              line_items: [
                {
                  quantity: 1,
                  price_data: {
                    currency: request.currency.toLowerCase(),
                    unit_amount: request.amountMinor,
                    product_data: { name: request.description },
                  },
                },
              ],
              metadata: { ...request.metadata },
              payment_intent_data: { description: request.description, metadata: { ...request.metadata } },
              success_url: request.successUrl,
              cancel_url: request.cancelUrl,
              expires_at: unixSeconds(request.expiresAt),
              ...(request.customerEmail === undefined ? {} : { customer_email: request.customerEmail }),
            },
            { idempotencyKey: request.idempotencyKey },
          ),
        ),
      ),
    getSession: (id) => asked(async () => readSession(await stripe.checkout.sessions.retrieve(id))),
    expireSession: (id) => asked(async () => readSession(await stripe.checkout.sessions.expire(id))),
    refund: (request) =>
      asked(async () =>
        readRefund(
          await stripe.refunds.create(
            { payment_intent: request.paymentIntent, amount: request.amountMinor, metadata: { ...request.metadata } },
            { idempotencyKey: request.idempotencyKey },
          ),
        ),
      ),
    payoutsSince: (createdFrom) =>
      asked(async () => {
        const list = stripe.payouts.list({ created: { gte: unixSeconds(createdFrom) }, limit: 100 });
        return (await list.autoPagingToArray({ limit: LIST_MAX })).map(readPayout);
      }),
    balanceTransactionsOf: (payoutId) =>
      asked(async () => {
        const list = stripe.balanceTransactions.list({ payout: payoutId, limit: 100, expand: ["data.source"] });
        const lines = (await list.autoPagingToArray({ limit: LIST_MAX })).map(readBalanceTransaction);
        return lines.filter((line) => line.source !== payoutId);
      }),
    eventsSince: (createdFrom) =>
      asked(async () => {
        const list = stripe.events.list({ created: { gte: unixSeconds(createdFrom) }, limit: 100 });
        return (await list.autoPagingToArray({ limit: LIST_MAX })).map(readEvent);
      }),
    verifyEvent: (rawBody, signature) => {
      const no = refuse("payment_signature", "This message was not signed by the payment provider.");
      if (signature === null || signature === "") return no;
      let event: unknown;
      try {
        event = stripe.webhooks.constructEvent(Buffer.from(rawBody), signature, config.webhookSecret);
      } catch {
        return no;
      }
      try {
        return ok(readEvent(event));
      } catch (error) {
        return refuse("payment_event", error instanceof Error ? error.message : "The event can't be read.");
      }
    },
  };
}
