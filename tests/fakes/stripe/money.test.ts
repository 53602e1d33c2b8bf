import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { PaymentFailure } from "@/modules/outbound/payments/port";
import { stripePayments } from "@/modules/outbound/payments/stripe";
import { goodCard, openBench, request, SECRET_KEY, WEBHOOK_SECRET, type Bench } from "./bench";
import { feeOf } from "./state";
import { signature } from "./webhooks";

const now = new Date("2026-03-14T16:20:00Z");
let folder: string;
let bench: Bench;
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), "pay-"));
  bench = await openBench({ now: () => now, file: path.join(folder, "payments.json") });
});
afterEach(async () => {
  await bench.close();
  await rm(folder, { recursive: true });
});

async function paidSession(amountMinor: number): Promise<{ id: string; paymentIntent: string }> {
  const { id } = await bench.port.createCheckoutSession(request(now, { amountMinor }));
  await bench.submit(id, goodCard);
  const { paymentIntent } = await bench.port.getSession(id);
  return { id, paymentIntent: paymentIntent ?? "" };
}
const failure = async (call: Promise<unknown>): Promise<PaymentFailure> => {
  const error: unknown = await call.then(() => null, (e: unknown) => e);
  expect(error).toBeInstanceOf(PaymentFailure);
  return error as PaymentFailure;
};

describe("fees and payouts", () => {
  // The figures of docs/hero-job.md: 2.7 % + 0.25, rounded to the cent.
  it.each([[72_310, 1977], [191_033, 5183], [41_250, 1139]])("takes of %i minor units the fee %i", (amount, fee) => {
    expect(feeOf(amount, { basisPoints: 270, fixedMinor: 25 })).toBe(fee);
  });

  it("pays out charges less fees less refunds, to the cent, and shows every part", async () => {
    const { paymentIntent } = await paidSession(191_033);
    const sale = (await bench.control("sale", { amountMinor: 41_250, currency: "USD" })) as { id: string; payment_intent: string };
    await bench.control("refund", { charge: sale.id, amountMinor: 8500 });
    const payout = (await bench.control("payout", { currency: "usd", arrivalDate: "2026-03-17" })) as { id: string };
    const [listed] = await bench.port.payoutsSince(new Date("2026-03-14T00:00:00Z"));
    expect(listed).toMatchObject({ id: payout.id, amountMinor: 217_461, currency: "USD", arrivalDate: "2026-03-17", status: "paid" });
    const lines = await bench.port.balanceTransactionsOf(payout.id);
    expect(lines.map((l) => [l.kind, l.grossMinor, l.feeMinor, l.netMinor, l.paymentIntent]).sort()).toEqual([
      ["charge", 191_033, 5183, 185_850, paymentIntent],
      ["charge", 41_250, 1139, 40_111, sale.payment_intent],
      ["refund", -8500, 0, -8500, sale.payment_intent],
    ].sort());
    expect(lines.reduce((sum, l) => sum + l.netMinor, 0)).toBe(217_461);
    expect(await bench.port.payoutsSince(new Date(now.getTime() + 1000))).toEqual([]);
    await expect(bench.control("payout", { currency: "usd" })).rejects.toThrow("nothing to pay out");
  });

  it("reads a payout of many parts page by page", async () => {
    for (let i = 0; i < 230; i += 1) bench.fake.provider.sale(1000 + i, "usd", `sale ${i}`);
    const { id } = bench.fake.provider.payout("usd", null);
    const lines = await bench.port.balanceTransactionsOf(id);
    expect(lines).toHaveLength(230);
    expect(new Set(lines.map((l) => l.id)).size).toBe(230);
    const [payout] = await bench.port.payoutsSince(now);
    expect(payout?.amountMinor).toBe(lines.reduce((sum, l) => sum + l.netMinor, 0));
  });

  it("takes a disputed charge and its fee from the balance, and gives the charge back when won", async () => {
    const sale = bench.fake.provider.sale(33_000, "usd", "x");
    const dispute = bench.fake.provider.dispute(sale.id, 1500);
    expect((await failure(bench.port.refund({ paymentIntent: sale.payment_intent as string, amountMinor: 1, idempotencyKey: "d" }))).code).toBe("charge_disputed");
    bench.fake.provider.closeDispute(dispute.id, true);
    expect(bench.fake.provider.state.balance.reduce((sum, b) => sum + b.net, 0)).toBe(33_000 - feeOf(33_000, { basisPoints: 270, fixedMinor: 25 }) - 1500);
    await bench.until(() => bench.heard.filter((r) => r.ok && r.value.fact.kind === "dispute").length === 2, "both events of the dispute");
  });
});

describe("refunds", () => {
  it("give money back in parts, never more than was paid", async () => {
    const { paymentIntent } = await paidSession(10_000);
    expect(await bench.port.refund({ paymentIntent, amountMinor: 4000, idempotencyKey: "r1" })).toMatchObject({ status: "succeeded", amountMinor: 4000, currency: "USD", paymentIntent });
    expect((await failure(bench.port.refund({ paymentIntent, amountMinor: 6001, idempotencyKey: "r2" }))).code).toBe("amount_too_large");
    await bench.port.refund({ paymentIntent, amountMinor: 6000, idempotencyKey: "r3" });
    expect(await failure(bench.port.refund({ paymentIntent, amountMinor: 1, idempotencyKey: "r4" }))).toMatchObject({ kind: "refused", code: "charge_already_refunded", retry: false });
    await bench.until(() => bench.heard.some((r) => r.ok && r.value.fact.kind === "refunded" && r.value.fact.refundedMinor === 10_000), "the event");
  });
});

describe("the same request twice", () => {
  it("gives the same session for the same key, and refuses the key for another request", async () => {
    const wanted = request(now, { idempotencyKey: "invoice-1042-v1" });
    const [a, b] = await Promise.all([bench.port.createCheckoutSession(wanted), bench.port.createCheckoutSession(wanted)]);
    expect(b).toEqual(a);
    expect(await failure(bench.port.createCheckoutSession({ ...wanted, amountMinor: 1_000 }))).toMatchObject({ kind: "reused-key", retry: false });
    expect(bench.fake.provider.state.sessions).toHaveLength(1);
  });
  it("does once what was done but not answered", async () => {
    const { paymentIntent } = await paidSession(10_000);
    await bench.control("", { fail: "lost", times: 1 });
    await bench.port.refund({ paymentIntent, amountMinor: 4000, idempotencyKey: "lost" });
    expect(bench.fake.provider.state.refunds).toHaveLength(1);
  });
  it("keeps sessions and keys over a restart", async () => {
    const wanted = request(now, { idempotencyKey: "kept" });
    const session = await bench.port.createCheckoutSession(wanted);
    await bench.close();
    bench = await openBench({ now: () => now, file: path.join(folder, "payments.json") });
    expect(await bench.port.createCheckoutSession(wanted)).toMatchObject({ id: session.id });
    expect((await bench.submit(session.id, goodCard)).status).toBe(303);
  });
});

describe("a provider in trouble", () => {
  it.each([500, 503, "reset", "truncate"] as const)("is asked again after %s", async (fail) => {
    await bench.control("", { fail, times: fail === "truncate" ? 1 : 2 });
    const call = bench.port.createCheckoutSession(request(now));
    // Half an answer is not tried again by the library: it is up to the job.
    if (fail === "truncate") expect(await failure(call)).toMatchObject({ kind: "unreachable", retry: true });
    else await expect(call).resolves.toMatchObject({ status: "open" });
  });
  it.each([[500, "busy"], [429, "busy"], ["reset", "unreachable"]] as const)("after three times %s is %s, to be tried later", async (fail, kind) => {
    await bench.control("", { fail, times: 3 });
    expect(await failure(bench.port.getSession("cs_test_x"))).toMatchObject({ kind, retry: true });
    await bench.control("", { fail: null });
  });
  it("that stays silent is given up after the time allowed, to be tried later", async () => {
    const hasty = stripePayments({ secretKey: SECRET_KEY, webhookSecret: WEBHOOK_SECRET, apiBase: `http://127.0.0.1:${bench.fake.port}`, timeoutMs: 300, retriesMax: 1 });
    await bench.control("", { fail: "hang", times: 2 });
    expect(await failure(hasty.getSession("cs_test_x"))).toMatchObject({ kind: "unreachable", retry: true });
    expect(bench.fake.faults.pending.times).toBe(0);
  });
  it("that does not know our key says so", async () => {
    const other = stripePayments({ secretKey: "sk_test_other", webhookSecret: "x", apiBase: `http://127.0.0.1:${bench.fake.port}` });
    expect(await failure(other.getSession("x"))).toMatchObject({ kind: "key" });
  });
});

describe("events", () => {
  const body = () => JSON.stringify(bench.fake.provider.state.events[0]);
  const code = (signed: string | null, bytes = body()) => {
    const result = bench.port.verifyEvent(Buffer.from(bytes), signed);
    return result.ok ? "accepted" : result.refusal.code;
  };
  it("are accepted only with a fresh signature over the same bytes by the right secret", async () => {
    await paidSession(10_000);
    const seconds = Math.floor(Date.now() / 1000);
    expect(code(signature(body(), WEBHOOK_SECRET))).toBe("accepted");
    expect(code(signature(body(), WEBHOOK_SECRET, seconds - 240))).toBe("accepted");
    expect(code(signature(body(), WEBHOOK_SECRET, seconds - 400))).toBe("payment_signature");
    expect(code(signature(body(), "whsec_other"))).toBe("payment_signature");
    expect(code(signature(body(), WEBHOOK_SECRET), body().replace("10000", "1"))).toBe("payment_signature");
    expect(code(null)).toBe("payment_signature");
    expect(code("t=1,v1=")).toBe("payment_signature");
    const odd = JSON.stringify({ id: "evt_1", object: "event", type: "payout.paid", created: 1, livemode: false, data: { object: { object: "payout", amount: "12" } } });
    expect(code(signature(odd, WEBHOOK_SECRET), odd)).toBe("payment_event");
  });
  it("can be sent twice, dropped, held and let go in reverse, and forged in four ways", async () => {
    await bench.control("webhooks", { mode: "twice" });
    bench.fake.provider.sale(1000, "usd", "x");
    await bench.until(() => bench.heard.length === 4, "two events, twice");
    await bench.control("webhooks", { mode: "drop", times: 2 });
    bench.fake.provider.sale(1000, "usd", "x");
    await bench.control("webhooks", { mode: "hold" });
    bench.fake.provider.sale(1000, "usd", "x");
    const released = (await bench.control("webhooks/release", { order: "reversed" })) as { type: string; status: number }[];
    expect(released.map((r) => [r.type, r.status])).toEqual([["payment_intent.succeeded", 200], ["charge.succeeded", 200]]);
    expect(bench.heard).toHaveLength(6);
    const event = bench.fake.provider.state.events[0]?.id;
    for (const how of ["secret", "body", "old", "none"]) await bench.control("webhooks/forge", { event, how });
    expect(bench.heard.slice(6).map((r) => r.ok)).toEqual([false, false, false, false]);
    // What was dropped is still there to be asked for.
    expect(await bench.port.eventsSince(new Date(now.getTime() - 1000))).toHaveLength(6);
  });
  it("are sent again until the application takes them, also after a restart", async () => {
    bench.answer = 503;
    bench.fake.provider.sale(1000, "usd", "x");
    await bench.until(() => bench.heard.length >= 2, "the first tries");
    bench.answer = 200;
    await bench.until(() => bench.fake.provider.state.events.every((e) => e.pending_webhooks === 0), "acknowledgement");
    bench.answer = 500;
    bench.fake.provider.sale(1000, "usd", "x");
    await bench.until(() => bench.fake.provider.state.deliveries.at(-1)?.outcome === 500, "refusal");
    await bench.close();
    bench = await openBench({ now: () => now, file: path.join(folder, "payments.json") });
    await bench.until(() => bench.heard.length === 2, "both after the restart");
    expect(bench.heard).toHaveLength(2);
  });
});

describe("the page of payments", () => {
  it("shows what happened and can pay out", async () => {
    await paidSession(191_033);
    const url = `http://127.0.0.1:${bench.fake.port}`;
    expect(await (await fetch(url)).text()).toContain("51.83 USD");
    const out = await fetch(`${url}/payout`, { method: "POST", body: new URLSearchParams({ currency: "usd" }) });
    expect(await out.text()).toContain("1,858.50 USD");
  });
});
