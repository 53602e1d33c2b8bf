import "server-only";
import { type Command } from "@/modules/access/command";
import { logFault } from "@/modules/access/fault";
import { ok } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { askInvoicePayment, startPayment } from "./commands";
import { openPaymentPage, type AskedPayment } from "./payment-page";

/**
 * A press that wants the provider's page now: the request in one transaction, then the page outside of it, within five
 * seconds. When the provider is slow the answer has no address yet; the worker makes the same page under the same key,
 * and the screen asks again.
 */
function withPage<S extends z.ZodType>(command: Command<S, AskedPayment>, where: string): Command<S, AskedPayment> {
  return Object.assign(
    async (...[ctx, raw, options]: Parameters<Command<S, AskedPayment>>) => {
      const asked = await command(ctx, raw, options);
      if (!asked.ok || asked.value.url) return asked;
      try {
        return ok({ ...asked.value, url: await openPaymentPage(ctx, asked.value.requestId, "short") });
      } catch (error) {
        logFault(where, error);
        return asked;
      }
    },
    { spec: command.spec },
  );
}

/** The customer's press on Pay. */
export const startPaymentNow = withPage(startPayment, "payments.start");
/** The counter's press, for a customer who stands there with a card. */
export const askInvoicePaymentNow = withPage(askInvoicePayment, "payments.ask");
