import "server-only";
import { and, eq, inArray, isNotNull, isNull, lt } from "drizzle-orm";
import { payouts, providerEvents } from "@/db/schema";
import { withShop, withSystem } from "@/db/scope";
import { now } from "@/modules/access/clock";
import { keepEvent, shopOfPayment, type KeptEvent } from "./events";
import { paymentPort, systemContext } from "./provider";
import { takePayout } from "./payouts";

/** How far back a sweep looks: longer than any outage a provider's own retries would not bridge. */
const DAYS_BACK = 3;

export interface Swept { found: number; retried: number; payouts: number }

/**
 * Looks at the provider for what a lost webhook would have said: events we never saw, events set aside because their
 * payment was not known yet, payouts without an entry. Everything goes the same way as a webhook, so a repeat does nothing.
 * @throws PaymentFailure when the provider does not answer
 */
export async function reconcile(): Promise<Swept> {
  const from = new Date(now().getTime() - DAYS_BACK * 86_400_000);
  const events = await paymentPort().eventsSince(from);
  const ids = events.map((e) => e.id);
  const known = new Set(ids.length ? (await withSystem("which events are known", (tx) => tx.select({ id: providerEvents.id }).from(providerEvents).where(inArray(providerEvents.id, ids)))).map((r) => r.id) : []);
  let found = 0;
  for (const event of [...events].reverse()) {
    if (known.has(event.id)) continue;
    await keepEvent(event, null);
    found += 1;
  }
  // Set aside for want of a shop: its payment may have come in since.
  const aside = await withSystem("events that found no shop", (tx) => tx.select({ id: providerEvents.id, body: providerEvents.body }).from(providerEvents)
    .where(and(isNull(providerEvents.doneAt), isNotNull(providerEvents.parkedReason), lt(providerEvents.receivedAt, now()))).limit(200));
  for (const row of aside) {
    const kept = row.body as KeptEvent;
    await keepEvent(kept.event, kept.raw);
  }
  let taken = 0;
  for (const payout of await paymentPort().payoutsSince(from)) {
    if (payout.status !== "paid") continue;
    const lines = await paymentPort().balanceTransactionsOf(payout.id);
    const intent = lines.find((l) => l.paymentIntent)?.paymentIntent;
    const owner = intent ? await shopOfPayment(intent) : null;
    if (!owner) continue;
    const [row] = await withShop(owner, (tx) => tx.select({ state: payouts.state }).from(payouts).where(and(eq(payouts.shopId, owner), eq(payouts.providerPayoutId, payout.id))));
    if (row?.state === "booked") continue;
    await takePayout(await systemContext(owner), payout, null);
    taken += 1;
  }
  return { found, retried: aside.length, payouts: taken };
}

