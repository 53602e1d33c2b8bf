import "server-only";
import { type Command } from "@/modules/access/command";
import { logFault } from "@/modules/access/fault";
import { ok } from "@/modules/kernel/result";
import { startPayment } from "./commands";
import type { AskedPayment } from "./payment-page";
import { openPaymentPage } from "./payment-page";
import type { startPaymentInput } from "./input";

/**
 * The customer's press on Pay: the request in one transaction, then the provider's page outside of it, within five
 * seconds. When the provider is slow the answer has no address yet; the worker makes the same page under the same key,
 * and the customer's page asks again.
 */
export const startPaymentNow: Command<typeof startPaymentInput, AskedPayment> = Object.assign(
  async (...[ctx, raw, options]: Parameters<typeof startPayment>) => {
    const asked = await startPayment(ctx, raw, options);
    if (!asked.ok || asked.value.url) return asked;
    try {
      return ok({ ...asked.value, url: await openPaymentPage(ctx, asked.value.requestId, "short") });
    } catch (error) {
      logFault("payments.start", error);
      return asked;
    }
  },
  { spec: startPayment.spec },
);
