import { eq } from "drizzle-orm";
import { beforeAll, describe, expect, it } from "vitest";
import { operations, workOrders, workPieces } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { draftPurchaseOrder, sendPurchaseOrder } from "@/modules/purchasing/commands/orders";
import { receiveGoods } from "@/modules/purchasing/commands/receive";
import { addSupplier } from "@/modules/purchasing/commands/suppliers";
import { getOrder } from "@/modules/purchasing/queries/orders";
import { getPart } from "@/modules/stock/queries/get-part";
import { benchJob, type BenchJob } from "@/tests/support/bench-job";
import { behindTheCurtain } from "@/tests/support/database";
import { heroParts } from "@/tests/support/hero-parts";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { recordEpoxyFill } from "./commands/epoxy";
import { dropNeed, issueAllReady, issueToWorkOrder, needPart, returnUnused } from "./commands/parts";
import { epoxyFillsOf, epoxySheetFor, partsOf } from "./queries/parts";
import { releaseReservations, reserveForWorkOrder } from "./reserve";

let a: TestShop, b: TestShop, id: (sku: string) => string, job: BenchJob;
const at = "2026-03-12T17:00:00Z";
const books = async (code: string) => Number((await behindTheCurtain(`select coalesce(sum(amount_minor), 0) from journal_lines where shop_id = '${a.shop.id}' and account_code = '${code}'`))[0]);
const rowOf = async (j: BenchJob, sku: string, who = "book") => {
  const row = (await partsOf(a.as(who, at), j.workOrderId)).find((p) => p.sku === sku);
  if (!row) throw new Error(`no ${sku} on the order`);
  return row;
};
async function jobAt(codes: string[], promisedOn: string | null): Promise<BenchJob> {
  const made = await benchJob(a, codes);
  await withShop(a.shop.id, async (tx) => {
    await tx.update(workOrders).set({ promisedOn }).where(eq(workOrders.id, made.workOrderId));
    await tx.update(workPieces).set({ bookedInAt: new Date("2026-02-24T17:00:00Z") }).where(eq(workPieces.id, made.pieceId));
    await tx.update(operations).set({ station: "Porting" }).where(eq(operations.pieceId, made.pieceId));
  });
  return made;
}

// Figures: docs/hero-job.md.
describe("parts of the hero job", () => {
  beforeAll(async () => {
    a = await testShop("first");
    b = await testShop("second");
    id = await heroParts(a);
    job = await jobAt(["EPX", "PIN", "PEX"], "2026-03-20");
    for (const [sku, qty] of [["SPK-S250", "1"], ["SL-S250", "4"], ["SH-S250", "4"], ["HG-S250", "1"], ["IV-S250", "2"], ["EV-S250", "2"], ["GV-S250", "2"]] as const) {
      must(await needPart(a.as("counter", "2026-02-19T17:42:00Z"), { workOrderId: job.workOrderId, pieceId: job.pieceId, partId: id(sku), qty }));
    }
  });

  it("are reserved as far as they are there; the kit comes as its parts", async () => {
    const rows = await partsOf(a.as("tech", at), job.workOrderId);
    expect(rows.map((r) => [r.sku, r.neededMilli, r.state])).toEqual([
      ["EV-S250", 2000, "short"], ["GV-S250", 2000, "ready"], ["HG-S250", 1000, "ready"], ["IV-S250", 2000, "ready"], ["KP-S250", 8000, "ready"], ["RT-S250", 4000, "ready"],
      ["SH-S250", 4000, "ready"], ["SL-S250", 4000, "ready"], ["SP-S250", 4000, "ready"], ["SS-S250", 4000, "ready"],
    ]);
    expect(await getPart(a.as("tech"), "SP-S250")).toMatchObject({ onHandMilli: 40_000, reservedMilli: 4000, freeMilli: 36_000 });
  });

  it("wait for the valves, take in the purchase order, and then leave the shelf at moving average", async () => {
    const supplierId = must(await addSupplier(a.as("mgr"), { name: "Greywater Valve", email: "orders@greywater.example" })).id;
    const { id: po } = must(await draftPurchaseOrder(a.as("mgr"), { supplierId, lines: [{ partId: id("EV-S250"), qty: "6", price: "22.00", workOrderId: job.workOrderId }, { partId: id("GV-S250"), qty: "10", price: "7.80" }] }));
    must(await sendPurchaseOrder(a.as("mgr"), { id: po, version: 1 }));
    const lines = (await getOrder(a.as("mgr"), po)).lines.map((l) => ({ lineId: l.id, came: String(l.qtyMilli / 1000) }));
    must(await receiveGoods(a.as("rcv", "2026-03-03T17:00:00Z"), { purchaseOrderId: po, freight: "15.00", lines }));

    const key = requestId();
    const taps = await Promise.all(Array.from({ length: 4 }, () => issueAllReady(a.as("tech", at), { workOrderId: job.workOrderId }, { requestId: key })));
    expect(taps.every((t) => t.ok)).toBe(true);
    expect(must(taps[0] ?? (await issueAllReady(a.as("tech"), { workOrderId: job.workOrderId }))).short).toEqual([]);
    const cost = Object.fromEntries((await partsOf(a.as("book", at), job.workOrderId)).map((r) => [r.sku, r.costMinor]));
    expect(cost).toEqual({
      "SP-S250": 3940, "RT-S250": 3440, "KP-S250": 1000, "SS-S250": 840, // kit 92.20
      "SL-S250": 980, "SH-S250": 1040, "HG-S250": 1690, "IV-S250": 6280, "EV-S250": 4714, "GV-S250": 1607,
    });
    expect(await issueAllReady(a.as("tech", at), { workOrderId: job.workOrderId })).toMatchObject({ ok: false, refusal: { code: "NOTHING_READY" } });
  });

  it("take 42 g of epoxy from the two good lots, never from the expired one, and the cure runs over the change of clocks", async () => {
    const sheet = await epoxySheetFor(a.as("tech", "2026-03-07T18:31:00Z"), (await behindTheCurtain(`select number from work_orders where id = '${job.workOrderId}'`))[0] ?? "", 1);
    expect(sheet.epoxies[0]?.lots.map((l) => [l.code, l.expired])).toEqual([["E-2511", true], ["E-2602", false], ["E-2604", false]]);
    const fill = {
      pieceId: job.pieceId, operationId: job.op("EPX"), partId: id("EP-04"), port: "intake", gramsInPort: "38", gramsWaste: "4", ratio: "100:20", surfacePrepared: true, mixedAt: "2026-03-07T11:30", cureHours: "24",
    } as const;
    const now = a.as("tech", "2026-03-07T18:31:00Z");
    expect(await recordEpoxyFill(now, { ...fill, surfacePrepared: false })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "surfacePrepared" }] } });
    expect(await recordEpoxyFill(now, { ...fill, mixedAt: "2026-03-08T02:30" })).toMatchObject({ ok: false, refusal: { code: "TIME_DOES_NOT_EXIST", field: "mixedAt" } });
    expect(await recordEpoxyFill(now, { ...fill, mixedAt: "2026-03-07T13:00" })).toMatchObject({ ok: false, refusal: { code: "TIME_AHEAD" } });
    expect(await recordEpoxyFill(now, { ...fill, lotId: sheet.epoxies[0]?.lots[0]?.id ?? "" })).toMatchObject({ ok: false, refusal: { code: "LOT_EXPIRED", field: "lotId" } });
    expect(await recordEpoxyFill(now, { ...fill, gramsInPort: "2000" })).toMatchObject({ ok: false, refusal: { code: "INSUFFICIENT_STOCK", field: "gramsInPort" } });
    expect(await recordEpoxyFill(now, { ...fill, partId: id("GV-S250") })).toMatchObject({ ok: false, refusal: { code: "NOT_BY_WEIGHT" } });
    expect(await rowOf(job, "EP-04").catch(() => "none")).toBe("none");

    const done = must(await recordEpoxyFill(now, fill));
    expect(done.lots).toEqual([{ lotCode: "E-2602", qtyMilli: 30_000 }, { lotCode: "E-2604", qtyMilli: 12_000 }]);
    // Mixed 11:30 MST, 24 hours: 12:30 MDT on the next day, because the clocks went forward that night.
    expect(done.readyAt).toBe("2026-03-08T18:30:00.000Z");
    expect(await behindTheCurtain(`select code || ' ' || coalesce(to_char(not_before at time zone 'UTC', 'YYYY-MM-DD HH24:MI'), '-') from operations where piece_id = '${job.pieceId}' order by sequence`)).toEqual(["EPX -", "PIN 2026-03-08 18:30", "PEX 2026-03-08 18:30"]);
    expect((await rowOf(job, "EP-04")).costMinor).toBe(521);
    expect(await epoxyFillsOf(a.as("tech"), job.pieceId)).toMatchObject([{ gramsInPortMilli: 38_000, gramsWasteMilli: 4000, ratio: "100:20", personName: "tech" }]);
  });

  it("come to 260.52, in the order and in the books", async () => {
    expect((await partsOf(a.as("book", at), job.workOrderId)).reduce((sum, r) => sum + (r.costMinor ?? 0), 0)).toBe(26_052);
    expect(await books("1250")).toBe(26_052);
    expect(await books("2050")).toBe(-22_500);
    expect(await books("1200")).toBe(Number((await behindTheCurtain(`select sum(value_minor) from stock_balances where shop_id = '${a.shop.id}'`))[0]));
  });

  it("hide their cost from the technician, in the list and in the answer of the issue", async () => {
    expect((await partsOf(a.as("tech", at), job.workOrderId)).map((r) => r.costMinor)).toEqual(new Array(11).fill(null));
    const need = must(await needPart(a.as("tech", at), { workOrderId: job.workOrderId, partId: id("SL-S250"), qty: "1" })).workOrderPartIds[0] ?? "";
    const answer = JSON.stringify(must(await issueToWorkOrder(a.as("tech", at), { workOrderPartId: need, qty: "1" })));
    expect(answer).not.toMatch(/cost|minor|245/i);
    must(await returnUnused(a.as("tech", at), { workOrderPartId: need, qty: "1" }));
    expect(await books("1250")).toBe(26_052);
  });

  it("come back unused at the cost they left at, into the lot they came from, and no more than went out", async () => {
    const epoxy = await rowOf(job, "EP-04");
    expect(await returnUnused(a.as("tech", at), { workOrderPartId: epoxy.id, qty: "43" })).toMatchObject({ ok: false, refusal: { code: "RETURN_EXCEEDS_ISSUE", field: "qty" } });
    must(await returnUnused(a.as("tech", at), { workOrderPartId: epoxy.id, qty: "20" }));
    expect((await getPart(a.as("tech", at), "EP-04")).lots.filter((l) => l.code !== "E-2511").map((l) => [l.code, l.onHandMilli])).toEqual([["E-2602", 8000], ["E-2604", 1_000_000]]);
    expect((await rowOf(job, "EP-04")).costMinor).toBe(273); // 5.21 less 2.48
    expect(await books("1250")).toBe(26_052 - 248);
  });

  it("do not exist for the other shop or a role that may not, and nothing changed", async () => {
    const row = await rowOf(job, "IV-S250");
    await expect(partsOf(b.as("owner"), job.workOrderId)).rejects.toThrow(NotFound);
    await expect(epoxySheetFor(b.as("owner"), "WO-TEST-1", 1)).rejects.toThrow(NotFound);
    expect(await epoxyFillsOf(b.as("owner"), job.pieceId)).toEqual([]);
    const refused = [
      await issueToWorkOrder(b.as("owner"), { workOrderPartId: row.id, qty: "1" }), await returnUnused(b.as("owner"), { workOrderPartId: row.id, qty: "1" }), await dropNeed(b.as("owner"), { workOrderPartId: row.id, version: row.version }),
      await needPart(b.as("owner"), { workOrderId: job.workOrderId, partId: id("IV-S250"), qty: "1" }), await issueAllReady(b.as("owner"), { workOrderId: job.workOrderId }),
      await recordEpoxyFill(b.as("owner", at), { pieceId: job.pieceId, operationId: job.op("EPX"), partId: id("EP-04"), port: "intake", gramsInPort: "1", gramsWaste: "", ratio: "1:1", surfacePrepared: true, mixedAt: "2026-03-07T11:30", cureHours: "24" }),
    ];
    for (const r of refused) expect(r.ok).toBe(false);
    await expect(issueToWorkOrder(a.as("book"), { workOrderPartId: row.id, qty: "1" })).rejects.toThrow(NotFound);
    await expect(recordEpoxyFill(a.as("counter", at), {} as never)).rejects.toThrow(NotFound);
    expect(await rowOf(job, "IV-S250")).toEqual(row);
  });
});

describe("who gets the last four springs", () => {
  let early: BenchJob, late: BenchJob, needEarly = "", needLate = "";
  beforeAll(async () => {
    late = await jobAt([], "2026-04-10");
    early = await jobAt([], "2026-03-27");
    needLate = must(await needPart(a.as("lead", at), { workOrderId: late.workOrderId, partId: id("HG-S250"), qty: "4" })).workOrderPartIds[0] ?? "";
  });

  it("is the earlier promise, whoever asked first; the other is short", async () => {
    expect(await rowOf(late, "HG-S250")).toMatchObject({ reservedMilli: 4000, state: "ready" });
    needEarly = must(await needPart(a.as("lead", at), { workOrderId: early.workOrderId, partId: id("HG-S250"), qty: "4" })).workOrderPartIds[0] ?? "";
    expect(await rowOf(early, "HG-S250")).toMatchObject({ reservedMilli: 4000, state: "ready" });
    expect(await rowOf(late, "HG-S250")).toMatchObject({ reservedMilli: 0, shortMilli: 4000, state: "short" });
  });

  it("may not be taken for the other order, with the figures and the order's number", async () => {
    expect(await issueToWorkOrder(a.as("tech", at), { workOrderPartId: needLate, qty: "1" })).toMatchObject({ ok: false, refusal: { code: "PROMISED_TO_OTHERS", message: expect.stringMatching(/4 of the 4 HG-S250 on the shelf are promised to WO-TEST-/) as string } });
    expect(await issueToWorkOrder(a.as("tech", at), { workOrderPartId: needEarly, qty: "5" })).toMatchObject({ ok: false, refusal: { code: "MORE_THAN_NEEDED", data: { openMilli: 4000 } } });
    expect(await issueToWorkOrder(a.as("tech", at), { workOrderPartId: needEarly, qty: "5", moreThanNeeded: true })).toMatchObject({ ok: false, refusal: { code: "INSUFFICIENT_STOCK" } });
  });

  it("goes to the one who waits when the other order is called off or the part is dropped", async () => {
    await withShop(a.shop.id, async (tx) => {
      await tx.update(workOrders).set({ cancelledAt: new Date(at) }).where(eq(workOrders.id, early.workOrderId));
      await releaseReservations({ ...a.as("mgr", at), tx }, early.workOrderId);
    });
    expect(await rowOf(late, "HG-S250")).toMatchObject({ reservedMilli: 4000, state: "ready" });
    expect(await issueToWorkOrder(a.as("tech", at), { workOrderPartId: needEarly, qty: "1" })).toMatchObject({ ok: false, refusal: { code: "ORDER_CANCELLED" } });
    const row = await rowOf(late, "HG-S250");
    must(await issueToWorkOrder(a.as("tech", at), { workOrderPartId: row.id, qty: "1" }));
    expect(await dropNeed(a.as("tech", at), { workOrderPartId: row.id, version: row.version })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect(await dropNeed(a.as("tech", at), { workOrderPartId: row.id, version: (await rowOf(late, "HG-S250")).version })).toMatchObject({ ok: false, refusal: { code: "PART_ISSUED" } });
    await withShop(a.shop.id, (tx) => reserveForWorkOrder({ ...a.as("mgr", at), tx }, late.workOrderId));
    expect(await getPart(a.as("tech", at), "HG-S250")).toMatchObject({ onHandMilli: 3000, reservedMilli: 3000, freeMilli: 0 });
  });

  it("never lets fifty hands at once take what is not there", async () => {
    const jobs: BenchJob[] = [];
    for (let i = 0; i < 10; i++) jobs.push(await jobAt([], null));
    const needs: string[] = [];
    for (const j of jobs) needs.push(must(await needPart(a.as("lead", at), { workOrderId: j.workOrderId, partId: id("IV-S250"), qty: "5" })).workOrderPartIds[0] ?? "");
    const tries = await Promise.all(Array.from({ length: 50 }, (_, i) => issueToWorkOrder(a.as("tech", at), { workOrderPartId: needs[i % 10] ?? "", qty: "1" })));
    expect(tries.filter((t) => t.ok).length).toBe(6);
    expect(await getPart(a.as("book", at), "IV-S250")).toMatchObject({ onHandMilli: 0, valueMinor: 0, reservedMilli: 0 });
  });
});
