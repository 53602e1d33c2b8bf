import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { asCustomer, HERO_LABOR, HERO_SHELF, hashOf, heroLines, heroMenu, heroParts, openHero, pieceVersion, sendVersion, type HeroOrder } from "@/tests/support/hero-order";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { answerByLink } from "./commands/answer-estimate";
import { openOrder } from "./commands/open-order";
import { receivePiece } from "./commands/receive-piece";
import { recordFinding } from "./commands/findings";
import { setHold } from "./commands/holds";
import { startEstimate } from "./commands/estimate-draft";
import { findOrdersInput } from "./input";
import { customerFile, customerView } from "./queries/customer-view";
import { estimateEditor, versionsOf } from "./queries/estimates";
import { findAnything } from "./queries/find";
import { floorOf } from "./queries/floor";
import { menuOf } from "./queries/menu";
import { orderPage } from "./queries/order-page";
import { findOrders } from "./queries/orders";
import { piecePage, releaseSheet } from "./queries/piece";

let a: TestShop;
let b: TestShop;
let hero: HeroOrder;
let estimateId: string;
const AT = "2026-03-21T17:00:00Z";
const ask = (more: Record<string, string> = {}) => findOrdersInput.parse(more);

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  await heroMenu(a);
  const ids = await heroParts(a);
  hero = await openHero(a, ids);
  const v1 = await sendVersion(a, hero, heroLines(ids, HERO_LABOR, HERO_SHELF), "2026-02-18T17:00:00Z");
  estimateId = v1.estimateId;
});

describe("looking at the shop", () => {
  it("shows an order that waits for its answer, before the head is in the house", async () => {
    const floor = await floorOf(a.as("counter", "2026-02-18T18:00:00Z"));
    expect(floor.waiting).toMatchObject([{ number: hero.number, name: "Odalys Brennan", totalMinor: 241_032, isOpened: false }]);
    expect(floor.headsHere).toBe(0);
    const list = await findOrders(a.as("counter"), ask({ view: "approval" }));
    expect(list.rows).toMatchObject([{ number: hero.number, word: "Approval", dial: "wait", totalMinor: 241_032 }]);
    expect(list.counts).toMatchObject({ open: 1, approval: 1, gone: 0 });
  });
  it("walks it to the counter, names it late after its day, and lists it as promised", async () => {
    must(await answerByLink(await asCustomer(a, hero, estimateId, "2026-02-19T17:42:00Z"), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, estimateId) }, { requestId: requestId() }));
    must(await receivePiece(a.as("rcv", "2026-02-24T17:00:00Z"), { pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), parcelCondition: "sound", fewPhotosOk: true }));
    const floor = await floorOf(a.as("counter", AT));
    expect(floor.stations.find((s) => s.station === "Counter in")?.heads).toMatchObject([{ tag: "260224-01", orderNumber: hero.number, word: "Late", dial: "late" }]);
    expect(floor.leftMinutes).toBe(1086);
    expect(floor.promised[0]?.words).toBe("Late. Clean and hot wash, 18.1 h to go");
    must(await setHold(a.as("tech", AT), { pieceId: hero.pieceId, reason: "machine" }));
    expect((await floorOf(a.as("counter", AT))).stations[0]?.heads[0]?.word).toBe("Held, machine");
  });
  it("takes sale prices from those who may not see them, on the server", async () => {
    expect((await findOrders(a.as("tech"), ask())).rows[0]?.totalMinor).toBeNull();
    expect(JSON.stringify(await orderPage(a.as("tech", AT), hero.number))).not.toMatch(/241032|2,410\.32|303-555-0142|odalys@/);
    await expect(versionsOf(a.as("tech"), hero.orderId)).rejects.toThrow(NotFound);
    await expect(menuOf(a.as("tech"))).rejects.toThrow(NotFound);
  });
  it("puts the order's facts on one page: routing, line, timeline, mails", async () => {
    must(await recordFinding(a.as("tech", AT), { pieceId: hero.pieceId, words: "Guides worn", position: "exhaust" }));
    const page = await orderPage(a.as("mgr", AT), hero.number);
    expect(page.operations.map((o) => o.code)).toEqual(["CLN", "TDN", "PRT", "FLB", "EPX", "PIN", "PEX", "SEA", "LAP", "SPR", "LSH", "FLF", "ASM", "INS"]);
    expect(page.lineNow).toBe(0);
    expect(page.line.find((l) => l.station === "Porting")?.note).toBe("3 to do");
    expect(page.money).toMatchObject({ agreedMinor: 241_032, leftMinor: 241_032 });
    expect(page.timeline.map((t) => t.words).join("|")).toMatch(/found: Guides worn.*booked in 260224-01.*approved version 1 by link, \$2,410\.32.*opened the order/s);
    expect(page.findings).toMatchObject([{ state: "open", words: "Guides worn" }]);
    expect((await releaseSheet(a.as("insp", AT), hero.pieceId)).missing[0]).toBe("On hold: machine. End the hold first.");
  });
  it("finds anything by a scrap and goes straight to a scanned tag", async () => {
    expect((await findAnything(a.as("counter"), "260224-01")).exact).toBe(`/s/first/orders/${hero.number}/pieces/1`);
    expect((await findAnything(a.as("counter"), `http://localhost:3999/s/first/orders/${hero.number}/pieces/1`)).exact).toBe(`/s/first/orders/${hero.number}/pieces/1`);
    for (const q of ["k7-22", "brennan", "0142", "s250", hero.number.slice(-4)]) expect((await findAnything(a.as("counter"), q)).rows.length, q).toBeGreaterThan(0);
    expect((await findAnything(a.as("counter"), "VIN-S250")).rows.some((r) => r.kind === "part")).toBe(true);
    expect((await findAnything(a.as("tech"), "brennan")).rows.some((r) => r.kind === "customer")).toBe(false);
    expect(await findAnything(a.as("counter"), "100%_")).toEqual({ rows: [], exact: null });
  });
  it("pages by key without skipping or repeating", async () => {
    for (let i = 0; i < 5; i++) must(await openOrder(a.as("counter"), { customerId: hero.customerId, use: "other", promisedOn: i % 2 ? "2026-04-01" : "", pieces: [{ family: "S450-4V" }] }));
    for (const [sort, descending] of [["number", "true"], ["promised", "false"], ["customer", "true"]] as const) {
      const seen: string[] = [];
      let after: string | undefined;
      do {
        const page = await findOrders(a.as("counter"), ask({ sort, descending, limit: "2", ...(after ? { after } : {}) }));
        seen.push(...page.rows.map((r) => r.number));
        after = page.next ?? undefined;
      } while (after);
      expect(new Set(seen).size, sort).toBe(6);
      expect(seen, sort).toHaveLength(6);
    }
    expect((await findOrders(a.as("counter", AT), ask({ station: "Counter in" }))).rows).toHaveLength(1);
    expect((await findOrders(a.as("counter", AT), ask({ promised: "none" }))).rows).toHaveLength(3);
    expect((await findOrders(a.as("counter", AT), ask({ q: "260224" }))).rows).toHaveLength(1);
  });
  it("opens for the customer their own order and nothing else, without hours of people, cost or notes", async () => {
    const ctx = await asCustomer(a, hero, estimateId, AT);
    const view = await customerView(ctx);
    expect(view).toMatchObject({ number: hero.number, version: 1, standing: "approved", deposit: { openMinor: 72_310 }, pieces: [{ place: "Here, waiting for its turn; on hold, we will call" }] });
    await expect(customerFile(ctx, "00000000-0000-4000-8000-000000000000", false)).rejects.toThrow(NotFound);
    await expect(orderPage(ctx, hero.number)).rejects.toThrow(NotFound);
    await expect(floorOf(ctx)).rejects.toThrow(NotFound);
    await expect(customerView(a.as("owner"))).rejects.toThrow(NotFound);
  });
  it("hands the draft's form what it computes with", async () => {
    must(await startEstimate(a.as("counter"), { workOrderId: hero.orderId }));
    const editor = await estimateEditor(a.as("counter"), hero.number);
    expect(editor).toMatchObject({ agreed: { totalMinor: 241_032, depositMinor: 72_310 }, draft: { estimateNo: 2 }, rules: { taxRateText: "7.35", suppliesCapMinor: 6000 } });
    expect(editor.draft?.lines).toHaveLength(20);
  });
  it("shows another shop nothing", async () => {
    await expect(orderPage(b.as("owner"), hero.number)).rejects.toThrow(NotFound);
    await expect(piecePage(b.as("owner"), hero.number, 1)).rejects.toThrow(NotFound);
    await expect(estimateEditor(b.as("owner"), hero.number)).rejects.toThrow(NotFound);
    await expect(releaseSheet(b.as("owner"), hero.pieceId)).rejects.toThrow(NotFound);
    expect((await findOrders(b.as("owner"), ask())).rows).toEqual([]);
    expect((await findAnything(b.as("owner"), "260224-01")).rows).toEqual([]);
    expect((await floorOf(b.as("owner"))).headsHere).toBe(0);
    expect(await versionsOf(b.as("owner"), hero.orderId)).toEqual([]);
  });
});
