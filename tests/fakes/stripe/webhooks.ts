import { createHmac } from "node:crypto";
import type Stripe from "stripe";
import type { Delivery, Keeper } from "./state";

/** What happens to events on their way to the application. */
export type Road =
  | { readonly mode: "normal" }
  /** Never sent. */
  | { readonly mode: "drop" }
  /** Sent two times, at once. */
  | { readonly mode: "twice" }
  | { readonly mode: "delay"; readonly ms: number }
  /** Kept until `release`. */
  | { readonly mode: "hold" };

/** Waits between the tries of an event that the application did not take, milliseconds. */
const RETRY_MS = [300, 1000, 3000, 10_000, 30_000, 60_000, 60_000, 60_000, 60_000, 60_000];

/** `t=…,v1=…` over the exact bytes. The time is always the real one: the application refuses what is older than five minutes. */
export function signature(body: string, secret: string, unixSeconds = Math.floor(Date.now() / 1000)): string {
  return `t=${unixSeconds},v1=${createHmac("sha256", secret).update(`${unixSeconds}.${body}`).digest("hex")}`;
}

export class Webhooks {
  private road: Road = { mode: "normal" };
  private roadLeft = Number.POSITIVE_INFINITY;
  private held: Stripe.EventBase[] = [];
  private readonly timers = new Set<NodeJS.Timeout>();
  private closed = false;

  constructor(private readonly keeper: Keeper, private readonly url: string, private readonly secret: string) {}

  get setting(): { road: Road; left: number | null; held: number } {
    return { road: this.road, left: Number.isFinite(this.roadLeft) ? this.roadLeft : null, held: this.held.length };
  }

  set(road: Road, times?: number): void {
    this.road = road;
    this.roadLeft = times ?? Number.POSITIVE_INFINITY;
  }

  private note(event: Stripe.EventBase, outcome: Delivery["outcome"]): void {
    this.keeper.state.deliveries.push({ event: event.id, type: event.type, at: new Date().toISOString(), outcome });
    if (this.keeper.state.deliveries.length > 2000) this.keeper.state.deliveries.splice(0, 500);
    this.keeper.save();
  }

  private later(ms: number, work: () => void): void {
    if (this.closed) return;
    const timer = setTimeout(() => {
      this.timers.delete(timer);
      work();
    }, ms);
    this.timers.add(timer);
  }

  /** A new event sets out. */
  send(event: Stripe.EventBase): void {
    const road: Road = this.roadLeft > 0 ? this.road : { mode: "normal" };
    this.roadLeft -= 1;
    if (road.mode === "drop") {
      event.pending_webhooks = 0;
      this.note(event, "dropped");
    } else if (road.mode === "hold") {
      this.held.push(event);
      this.note(event, "held");
    } else {
      const copies = road.mode === "twice" ? 2 : 1;
      for (let i = 0; i < copies; i += 1) this.later(road.mode === "delay" ? road.ms : 0, () => void this.attempt(event, 0));
    }
  }

  /** Let held events go, one after the other, in this order. Returns how the application answered each. */
  async release(order: "kept" | "reversed"): Promise<{ event: string; type: string; status: number | null }[]> {
    const going = order === "reversed" ? this.held.reverse() : this.held;
    this.held = [];
    const answers: { event: string; type: string; status: number | null }[] = [];
    for (const event of going) answers.push({ event: event.id, type: event.type, status: await this.attempt(event, 0) });
    return answers;
  }

  private async attempt(event: Stripe.EventBase, tried: number): Promise<number | null> {
    const body = JSON.stringify(event, null, 2);
    const status = await this.put(body, signature(body, this.secret));
    if (this.closed) return status;
    if (status !== null && status >= 200 && status < 300) event.pending_webhooks = 0;
    else {
      const wait = RETRY_MS[tried];
      if (wait !== undefined) this.later(wait, () => void this.attempt(event, tried + 1));
    }
    this.note(event, status ?? "unreachable");
    return status;
  }

  /** Bytes with a signature, straight to the application: also for forging. */
  async put(body: string, header: string): Promise<number | null> {
    try {
      const answer = await fetch(this.url, {
        method: "POST", body, redirect: "manual", signal: AbortSignal.timeout(10_000),
        headers: { "content-type": "application/json; charset=utf-8", "stripe-signature": header, "user-agent": "local test payment provider" },
      });
      await answer.arrayBuffer();
      return answer.status;
    } catch {
      return null;
    }
  }

  /** Send a known event again, `times` times at once. */
  async resend(event: Stripe.EventBase, times: number): Promise<(number | null)[]> {
    return await Promise.all(Array.from({ length: times }, () => this.attempt(event, RETRY_MS.length)));
  }

  /** A message that the application must refuse. */
  async forge(event: Stripe.EventBase, how: "secret" | "body" | "old" | "none"): Promise<number | null> {
    const body = JSON.stringify(event);
    if (how === "secret") return await this.put(body, signature(body, "whsec_somebody_else"));
    if (how === "old") return await this.put(body, signature(body, this.secret, Math.floor(Date.now() / 1000) - 3600));
    if (how === "none") return await this.put(body, "");
    return await this.put(body.replace(/"amount(_total)?":\d+/, '"amount$1":1'), signature(body, this.secret));
  }

  /** After a restart: what the application never acknowledged sets out again. */
  resume(): void {
    for (const event of this.keeper.state.events) if (event.pending_webhooks > 0) this.later(100, () => void this.attempt(event, 0));
  }

  close(): void {
    this.closed = true;
    for (const timer of this.timers) clearTimeout(timer);
  }
}
