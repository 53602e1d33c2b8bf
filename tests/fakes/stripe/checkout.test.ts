import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type { ProviderEvent } from "@/modules/outbound/payments/port";
import { goodCard, openBench, request, type Bench } from "./bench";
import { readForm } from "./form";

const now = new Date("2026-03-14T16:20:00Z");
let clock = now;
let bench: Bench;
beforeEach(async () => {
  clock = now;
  bench = await openBench({ now: () => clock });
});
afterEach(async () => {
  await bench.close();
});

const types = () => bench.heard.map((r) => (r.ok ? r.value.type : r.refusal.code));
const ofType = (type: string): ProviderEvent | undefined => bench.heard.flatMap((r) => (r.ok && r.value.type === type ? [r.value] : []))[0];

describe("a payment page", () => {
  it("is made, shown, paid once, and told about with a signature that we accept", async () => {
    const session = await bench.port.createCheckoutSession(request(now));
    expect(session).toMatchObject({
      status: "open", paymentStatus: "unpaid", amountMinor: 191_033, currency: "USD", reference: "invoice:1042", paymentIntent: null,
      metadata: { shop: "s1", invoice: "i1" }, expiresAt: new Date("2026-03-15T15:20:00Z"),
    });
    const shown = await (await fetch(session.url ?? "")).text();
    expect(shown).toContain("Local test payment provider");
    expect(shown).toContain("1,910.33 USD");
    const paid = await bench.submit(session.id, goodCard);
    expect(paid.status).toBe(303);
    expect(paid.headers.get("location")).toBe(`http://localhost:3999/l/t/paid?s=${session.id}`);
    await bench.submit(session.id, goodCard);
    const after = await bench.port.getSession(session.id);
    expect(after).toMatchObject({ status: "complete", paymentStatus: "paid", url: null });
    expect(after.paymentIntent).toMatch(/^pi_/);
    await bench.until(() => bench.heard.length >= 3, "three events");
    expect(types().sort()).toEqual(["charge.succeeded", "checkout.session.completed", "payment_intent.succeeded"]);
    expect(ofType("checkout.session.completed")).toMatchObject({ live: false, createdAt: now, fact: { kind: "checkout", session: after } });
    expect(await (await fetch(`${bench.fake.url}/c/pay/${session.id}`)).text()).toContain("Nothing more will be charged");
  });

  it("says what is wrong with a card beside its field and keeps what was typed", async () => {
    const { id } = await bench.port.createCheckoutSession(request(now));
    const wrong = await bench.submit(id, { ...goodCard, number: "4242 4242 4242 4241", expiry: "02/26", cvc: "1", email: "dana" });
    expect(wrong.status).toBe(422);
    const html = await wrong.text();
    for (const text of ["not a card number", "has expired", "3 digits", "name@example.com", 'value="4242 4242 4242 4241"', 'value="Dana Ortiz"']) expect(html).toContain(text);
    const declined = await (await bench.submit(id, { ...goodCard, number: "4000 0000 0000 0002" })).text();
    expect(declined).toContain("Your card was declined");
    expect(await bench.port.getSession(id)).toMatchObject({ status: "open", paymentStatus: "unpaid" });
    expect((await bench.submit(id, goodCard)).status).toBe(303);
    expect(await (await bench.submit(id, { ...goodCard, number: "5555555555554444" })).text()).toContain("complete");
  });

  it("asks for a second step with the card that needs one", async () => {
    const { id } = await bench.port.createCheckoutSession(request(now));
    const card = { ...goodCard, number: "4000 0025 0000 3155" };
    const step = await bench.submit(id, card);
    expect(step.status).toBe(200);
    expect(await step.text()).toContain("The bank of this card asks");
    expect((await bench.port.getSession(id)).status).toBe("open");
    expect(await (await bench.submit(id, { ...card, step: "refuse" })).text()).toContain("did not confirm");
    expect((await bench.port.getSession(id)).status).toBe("open");
    expect((await bench.submit(id, { ...card, step: "confirm" })).status).toBe(303);
    expect(await bench.port.getSession(id)).toMatchObject({ paymentStatus: "paid" });
  });

  it.each(["succeeded", "failed"] as const)("is complete but unpaid after a bank debit, until that has %s", async (outcome) => {
    const { id } = await bench.port.createCheckoutSession(request(now));
    expect((await bench.submit(id, { ...goodCard, way: "debit" })).status).toBe(303);
    expect(await bench.port.getSession(id)).toMatchObject({ status: "complete", paymentStatus: "unpaid" });
    await bench.control("settle", { session: id, outcome });
    expect(await bench.port.getSession(id)).toMatchObject({ paymentStatus: outcome === "succeeded" ? "paid" : "unpaid" });
    await bench.until(() => types().includes(`checkout.session.async_payment_${outcome}`), "the late event");
  });

  it("expires on time and by request, and can't be paid then", async () => {
    const late = await bench.port.createCheckoutSession(request(now, { expiresAt: new Date(now.getTime() + 3_600_000) }));
    const asked = await bench.port.createCheckoutSession(request(now));
    expect(await bench.port.expireSession(asked.id)).toMatchObject({ status: "expired", url: null });
    clock = new Date(now.getTime() + 3_600_001);
    expect((await bench.submit(late.id, goodCard)).status).toBe(200);
    expect(await bench.port.getSession(late.id)).toMatchObject({ status: "expired", paymentStatus: "unpaid" });
    await bench.until(() => types().filter((t) => t === "checkout.session.expired").length === 2, "two events");
    await expect(bench.port.expireSession(late.id)).rejects.toMatchObject({ kind: "refused", retry: false });
  });

  it("is refused for a time or an amount that the provider does not take", async () => {
    await expect(bench.port.createCheckoutSession(request(now, { expiresAt: new Date(now.getTime() + 60_000) }))).rejects.toMatchObject({ kind: "refused" });
    await expect(bench.port.createCheckoutSession(request(now, { expiresAt: new Date(now.getTime() + 25 * 3_600_000) }))).rejects.toMatchObject({ kind: "refused" });
    await expect(bench.port.createCheckoutSession(request(now, { amountMinor: 49 }))).rejects.toMatchObject({ kind: "refused", code: "amount_too_small" });
    await expect(bench.port.getSession("cs_test_nothing")).rejects.toMatchObject({ kind: "missing" });
  });
});

describe("the form reader", () => {
  it("reads nested names, lists and appended values", () => {
    expect(readForm("a=1&b[c]=2&l[0][x]=3&l[1][x]=4&expand[]=p&expand[]=q&m[k%20y]=v%26w")).toEqual({
      a: "1", b: { c: "2" }, l: [{ x: "3" }, { x: "4" }], expand: ["p", "q"], m: { "k y": "v&w" },
    });
  });
});
