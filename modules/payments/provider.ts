import "server-only";
import { eq } from "drizzle-orm";
import { shops } from "@/db/schema";
import { withSystem } from "@/db/scope";
import { now } from "@/modules/access/clock";
import { NotFound, type ShopContext } from "@/modules/access/context";
import { env } from "@/modules/access/env";
import type { PaymentPort } from "@/modules/outbound/payments/port";
import { stripePayments } from "@/modules/outbound/payments/stripe";

const ports = new Map<string, PaymentPort>();

/** The payment provider of this installation. `patience` short: a person waits; long: a job does. */
export function paymentPort(patience: "short" | "long" = "long"): PaymentPort {
  const e = env();
  const known = ports.get(patience);
  if (known) return known;
  const port = stripePayments({
    secretKey: e.STRIPE_SECRET_KEY, webhookSecret: e.STRIPE_WEBHOOK_SECRET, ...(e.STRIPE_API_BASE ? { apiBase: e.STRIPE_API_BASE } : {}),
    ...(patience === "short" ? { timeoutMs: 5000, retriesMax: 0 } : { timeoutMs: 20_000, retriesMax: 1 }),
  });
  ports.set(patience, port);
  return port;
}

/** The context in which a message of the provider is worked on, once its shop is known. */
export async function systemContext(shopId: string, name = "payments"): Promise<ShopContext> {
  const [row] = await withSystem("the shop a provider's message belongs to", (tx) => tx.select().from(shops).where(eq(shops.id, shopId)));
  if (!row) throw new NotFound("shop");
  const { createdAt: _, ...shop } = row;
  return { shop, actor: { kind: "system", id: name, name: "Valvekeeper" }, now: now(), request: { ip: "", agent: "provider" } };
}
