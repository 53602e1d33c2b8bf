import { z } from "@/modules/kernel/zod";
import { json, type Answer, type Call } from "../shared/http";
import { API_FAULTS, type ApiFaults } from "./faults";
import type { Provider } from "./provider";
import { noSuch, Refusal } from "./refusal";
import type { Webhooks } from "./webhooks";

export interface Controlled {
  readonly provider: Provider;
  readonly faults: ApiFaults;
  readonly webhooks: Webhooks;
  readonly clear: () => void;
  readonly saved: () => void;
}

const currency = z.string().regex(/^[A-Za-z]{3}$/).transform((c) => c.toLowerCase());
const times = z.int().min(1).max(10_000);
const amountMinor = z.int().min(1).max(99_999_999);

const wanted = {
  faults: z.strictObject({ fail: z.union([z.literal(API_FAULTS.filter((f) => typeof f === "number")), z.enum(API_FAULTS.filter((f) => typeof f === "string")), z.null()]), times: times.default(1) }),
  fee: z.strictObject({ basisPoints: z.int().min(0).max(10_000), fixedMinor: z.int().min(0).max(10_000) }),
  sale: z.strictObject({ amountMinor, currency, description: z.string().max(200).default("Sale at the terminal") }),
  refund: z.strictObject({ charge: z.string().optional(), paymentIntent: z.string().optional(), amountMinor: amountMinor.optional() }),
  settle: z.strictObject({ session: z.string(), outcome: z.enum(["succeeded", "failed"]) }),
  dispute: z.strictObject({ charge: z.string(), feeMinor: z.int().min(0).max(100_000).default(1500) }),
  disputeClose: z.strictObject({ dispute: z.string(), won: z.boolean() }),
  payout: z.strictObject({ currency: currency.default("usd"), arrivalDate: z.iso.date().optional() }),
  webhooks: z.union([
    z.strictObject({ mode: z.enum(["normal", "drop", "twice", "hold"]), times: times.optional() }),
    z.strictObject({ mode: z.literal("delay"), ms: z.int().min(1).max(600_000), times: times.optional() }),
  ]),
  release: z.strictObject({ order: z.enum(["kept", "reversed"]).default("kept") }),
  resend: z.strictObject({ event: z.string(), times: times.default(1) }),
  forge: z.strictObject({ event: z.string(), how: z.enum(["secret", "body", "old", "none"]) }),
};

async function act(c: Controlled, what: string, input: unknown): Promise<unknown> {
  const { provider, webhooks, faults } = c;
  const event = (id: string) => {
    const found = provider.state.events.find((e) => e.id === id);
    if (found === undefined) throw noSuch("event", id);
    return found;
  };
  switch (what) {
    case "": {
      const { fail, times: n } = wanted.faults.parse(input);
      faults.set(fail, n);
      return faults.pending;
    }
    case "fee":
      provider.state.fee = wanted.fee.parse(input);
      c.saved();
      return provider.state.fee;
    case "sale": {
      const sale = wanted.sale.parse(input);
      return provider.sale(sale.amountMinor, sale.currency, sale.description);
    }
    case "refund": {
      const r = wanted.refund.parse(input);
      return provider.refund({ charge: r.charge ?? null, paymentIntent: r.paymentIntent ?? null }, r.amountMinor ?? null, {}, { idempotencyKey: null });
    }
    case "settle": {
      const s = wanted.settle.parse(input);
      return provider.settle(s.session, s.outcome === "succeeded");
    }
    case "dispute": {
      const d = wanted.dispute.parse(input);
      return provider.dispute(d.charge, d.feeMinor);
    }
    case "dispute/close": {
      const d = wanted.disputeClose.parse(input);
      return provider.closeDispute(d.dispute, d.won);
    }
    case "payout": {
      const p = wanted.payout.parse(input);
      return provider.payout(p.currency, p.arrivalDate ?? null);
    }
    case "webhooks": {
      const { times: n, ...road } = wanted.webhooks.parse(input);
      webhooks.set(road, n);
      return webhooks.setting;
    }
    case "webhooks/release":
      return await webhooks.release(wanted.release.parse(input).order);
    case "webhooks/resend": {
      const r = wanted.resend.parse(input);
      return await webhooks.resend(event(r.event), r.times);
    }
    case "webhooks/forge": {
      const f = wanted.forge.parse(input);
      return { status: await webhooks.forge(event(f.event), f.how) };
    }
    case "expire":
      provider.expireOverdue();
      return {};
    case "clear":
      c.clear();
      return {};
    default:
      throw new Refusal(404, "invalid_request_error", `There is no control called "${what}"; see the README beside this file.`);
  }
}

/** The levers for tests and for people, below `/_control`. */
export async function answerControl(c: Controlled, call: Call): Promise<Answer> {
  const what = call.url.pathname.replace(/^\/_control\/?/, "").replace(/\/$/, "");
  if (call.method === "GET") {
    if (what === "events") return json(c.provider.state.events);
    if (what === "deliveries") return json(c.provider.state.deliveries);
    if (what === "") return json({ ...c.faults.pending, webhooks: c.webhooks.setting, fee: c.provider.state.fee });
    return json({ error: "no such control" }, 404);
  }
  try {
    return json(await act(c, what, call.body.length === 0 ? {} : JSON.parse(call.body.toString("utf8"))));
  } catch (error) {
    if (error instanceof Refusal) return json(error.body(), error.status);
    if (error instanceof z.ZodError || error instanceof SyntaxError) return json({ error: error.message }, 422);
    throw error;
  }
}
