import { beforeAll, describe, expect, it } from "vitest";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { heroParts } from "@/tests/support/hero-parts";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { openStock, reverseMovement, scrapStock } from "./commands/adjust";
import { countStock } from "./commands/count";
import { issueStock } from "./commands/issue-stock";
import { addPart, changePart, setKit } from "./commands/parts";
import { partsAsk } from "./input";
import { countSheetFor } from "./queries/count-sheet";
import { findParts } from "./queries/find-parts";
import { getPart } from "./queries/get-part";
import { kitLinesOf } from "./queries/kits";
import { ledgerOf } from "./queries/ledger";

let a: TestShop, b: TestShop, id: (sku: string) => string;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); id = await heroParts(a); });

const part = async (sku: string, who = "owner") => {
  const { rows } = await findParts(a.as(who), partsAsk({ q: sku }));
  const row = rows.find((r) => r.sku === sku);
  if (!row) throw new Error(`no ${sku}`);
  return row;
};
const account = (code: string, shop = a) => behindTheCurtain(`select coalesce(sum(amount_minor), 0) from journal_lines where shop_id = '${shop.shop.id}' and account_code = '${code}'`);
const last = async (sku: string) => { const row = (await ledgerOf(a.as("owner"), { part: id(sku), limit: 1 })).rows[0]; if (!row) throw new Error("empty ledger"); return row; };

describe("parts", () => {
  it("are found by number, words and family, with sale price and cost for those who see them", async () => {
    expect((await findParts(a.as("counter"), partsAsk({ q: "s250 exhaust valve" }))).rows.map((r) => r.sku)).toEqual(["EV-S250", "GV-S250"]);
    expect(await part("GV-S250")).toMatchObject({ onHandMilli: 6000, valueMinor: 4500, unitCost: "7.500000", salePriceMinor: 1875, bin: "A 4" });
    expect(await part("GV-S250", "counter")).toMatchObject({ salePriceMinor: 1875, valueMinor: null, unitCost: null });
  });

  it("hide cost and price from the technician in list, page and ledger", async () => {
    expect(await part("GV-S250", "tech")).toMatchObject({ onHandMilli: 6000, salePriceMinor: null, valueMinor: null, unitCost: null });
    const page = await getPart(a.as("tech"), "GV-S250");
    expect(page).toMatchObject({ valueMinor: null, lastPriceMinor: null, form: { salePrice: "" } });
    expect((await ledgerOf(a.as("tech"), { part: id("GV-S250"), limit: 5 })).rows.map((r) => r.valueMinor)).toEqual([null]);
    expect((await ledgerOf(a.as("book"), { part: id("GV-S250"), limit: 5 })).rows.map((r) => r.valueMinor)).toEqual([4500]);
  });

  it("page by number without losing or doubling one", async () => {
    const seen: string[] = [];
    let after: string | undefined;
    do {
      const page = await findParts(a.as("counter"), partsAsk({ limit: 5, after }));
      seen.push(...page.rows.map((r) => r.sku));
      after = page.next ?? undefined;
    } while (after);
    expect(seen).toEqual([...new Set(seen)].sort());
    expect(seen).toContain("SPK-S250");
    expect(seen).toContain("EP-04");
  });

  it("keep a number for ever and refuse one that reads alike", async () => {
    const more = { description: "x", partClass: "valve", salePrice: "1" } as const;
    expect(await addPart(a.as("mgr"), { ...more, sku: "iv-s250" })).toMatchObject({ ok: false, refusal: { code: "SKU_TAKEN", field: "sku" } });
    expect(await addPart(a.as("mgr"), { ...more, sku: "1V-S250" })).toMatchObject({ ok: false, refusal: { code: "SKU_LOOKALIKE" } });
    expect(await addPart(a.as("mgr"), { ...more, sku: "IV S250" })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "sku" }] } });
    expect((await addPart(b.as("mgr"), { ...more, sku: "IV-S250" })).ok).toBe(true);
  });

  it("keep unit and lots once they moved, and show the second editor that they changed", async () => {
    const page = await getPart(a.as("mgr"), "HG-S250");
    const edit = { id: page.id, version: page.version, description: page.description, partClass: "gasket", salePrice: "38.50", bin: "G 2", stockUnit: "each", lotTracked: false, active: true } as const;
    expect(await changePart(a.as("mgr"), { ...edit, stockUnit: "gram" })).toMatchObject({ ok: false, refusal: { code: "PART_HAS_MOVED", field: "stockUnit" } });
    must(await changePart(a.as("mgr"), edit));
    expect(await changePart(a.as("counter"), { ...edit, bin: "G 9" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    // Receiving does not see sale prices; what it saves leaves the price as it was.
    must(await changePart(a.as("rcv"), { ...edit, version: page.version + 1, salePrice: "" }));
    expect(await part("HG-S250")).toMatchObject({ salePriceMinor: 3850, bin: "G 2" });
  });

  it("make kits of single parts, whose availability is the scarcest part", async () => {
    expect((await kitLinesOf(a.as("tech"), [id("SPK-S250"), id("SP-S250")])).map((l) => [l.sku, l.qtyMilli])).toEqual([["KP-S250", 8000], ["RT-S250", 4000], ["SP-S250", 4000], ["SS-S250", 4000]]);
    expect(await part("SPK-S250")).toMatchObject({ isKit: true, freeMilli: 10_000, kitShort: [] });
    expect(await setKit(a.as("mgr"), { kitPartId: id("SPK-S250"), version: 2, lines: [{ partId: id("SPK-S250"), qty: "1" }] })).toMatchObject({ ok: false, refusal: { field: "lines.0.partId" } });
  });

  it("do not exist for the other shop", async () => {
    await expect(getPart(b.as("owner"), "GV-S250")).rejects.toThrow(NotFound);
    await expect(ledgerOf(b.as("owner"), { part: id("GV-S250"), limit: 5 })).rejects.toThrow(NotFound);
    expect((await findParts(b.as("owner"), partsAsk({ q: "GV-S250", gone: "true" }))).rows).toEqual([]);
    expect(await kitLinesOf(b.as("owner"), [id("SPK-S250")])).toEqual([]);
    const edit = { id: id("GV-S250"), version: 1, description: "mine", partClass: "guide", salePrice: "1", stockUnit: "each", lotTracked: false, active: true } as const;
    expect(await changePart(b.as("owner"), edit)).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(openStock(b.as("owner"), { partId: id("GV-S250"), qty: "1", value: "1" })).rejects.toThrow(NotFound);
    await expect(countStock(b.as("owner"), { cause: "routine count", lines: [{ partId: id("GV-S250"), counted: "1" }] })).rejects.toThrow(NotFound);
    await expect(scrapStock(b.as("owner"), { partId: id("GV-S250"), qty: "1", reason: "mine" })).rejects.toThrow(NotFound);
    expect(await reverseMovement(b.as("owner"), { movementId: (await last("GV-S250")).id, reason: "mine" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await part("GV-S250")).toMatchObject({ onHandMilli: 6000, valueMinor: 4500 });
  });

  it("are written only by those who may", async () => {
    await expect(addPart(a.as("tech"), { sku: "TT-1", description: "x", partClass: "valve", salePrice: "1" })).rejects.toThrow(NotFound);
    await expect(countStock(a.as("counter"), { cause: "routine count", lines: [{ partId: id("GV-S250"), counted: "1" }] })).rejects.toThrow(NotFound);
    await expect(scrapStock(a.as("rcv"), { partId: id("GV-S250"), qty: "1", reason: "bent" })).rejects.toThrow(NotFound);
    await expect(openStock(a.as("rcv"), { partId: id("GV-S250"), qty: "1", value: "1" })).rejects.toThrow(NotFound);
  });
});

describe("the shelf", () => {
  it("gives the last part to one of fifty who reach for it, and says to the rest what there is", async () => {
    const { id: one } = must(await addPart(a.as("mgr"), { sku: "LAST-ONE", description: "the last one", partClass: "valve", salePrice: "9", bin: "Z 9" }));
    must(await openStock(a.as("mgr"), { partId: one, qty: "1", value: "23.57" }));
    const tries = await Promise.all(Array.from({ length: 50 }, () => withShop(a.shop.id, (tx) => issueStock({ ...a.as("tech"), tx }, { partId: one, qtyMilli: 1000 }))));
    expect(tries.filter((t) => t.ok)).toHaveLength(1);
    expect(tries.filter((t) => !t.ok && t.refusal.code === "INSUFFICIENT_STOCK" && t.refusal.message.includes("LAST-ONE") && t.refusal.message.includes("Z 9"))).toHaveLength(49);
    expect(await part("LAST-ONE")).toMatchObject({ onHandMilli: 0, valueMinor: 0 });
  });

  it("agrees with the journal to the cent", async () => {
    expect(await account("1200")).toEqual(await behindTheCurtain(`select coalesce(sum(value_minor), 0) from stock_balances where shop_id = '${a.shop.id}'`));
    expect(await behindTheCurtain(`select count(*) from stock_balances b where on_hand_milli <> (select coalesce(sum(qty_milli), 0) from stock_movements m where m.shop_id = b.shop_id and m.part_id = b.part_id)`)).toEqual(["0"]);
  });

  it("refuses half a valve, and more than there is with the real number and the bin", async () => {
    const take = (qtyMilli: number) => withShop(a.shop.id, (tx) => issueStock({ ...a.as("tech"), tx }, { partId: id("GV-S250"), qtyMilli }));
    expect(await take(500)).toMatchObject({ ok: false, refusal: { code: "NOT_WHOLE_PIECES" } });
    const seven = await take(7000);
    expect(seven).toMatchObject({ ok: false, refusal: { code: "INSUFFICIENT_STOCK", data: { onHandMilli: 6000, bin: "A 4" } } });
    expect(!seven.ok && seven.refusal.message).toContain("There are 6 of GV-S250 on the shelf at A 4, not 7.");
    expect(await withShop(a.shop.id, (tx) => issueStock({ ...a.as("tech"), tx }, { partId: id("SPK-S250"), qtyMilli: 1000 }))).toMatchObject({ ok: false, refusal: { code: "KIT_HAS_NO_SHELF" } });
  });

  it("never offers an expired lot, also not when it is asked for, and throws it out with a reason", async () => {
    const page = await getPart(a.as("tech"), "EP-04");
    expect(page.lots.map((l) => [l.code, l.state])).toEqual([["E-2511", "expired"], ["E-2602", "good"], ["E-2604", "good"]]);
    expect(page).toMatchObject({ onHandMilli: 1_130_000, expiredMilli: 100_000, freeMilli: 1_030_000 });
    const lotId = page.lots[0]?.id ?? "";
    const take = (more: object) => withShop(a.shop.id, (tx) => issueStock({ ...a.as("tech"), tx }, { partId: id("EP-04"), qtyMilli: 5000, ...more }));
    expect(await take({ lotId })).toMatchObject({ ok: false, refusal: { code: "LOT_EXPIRED", field: "lotId" } });
    const tooMuch = await take({ qtyMilli: 1_031_000 });
    expect(tooMuch).toMatchObject({ ok: false, refusal: { code: "INSUFFICIENT_STOCK" } });
    expect(!tooMuch.ok && tooMuch.refusal.message).toContain("lot E-2511 is expired");
    must(await scrapStock(a.as("mgr"), { partId: id("EP-04"), lotId, qty: "100", reason: "past its date" }));
    expect(await part("EP-04")).toMatchObject({ onHandMilli: 1_030_000, valueMinor: 12_772, expiredMilli: 0 });
    expect(await account("5400")).toEqual(["1240"]);
  });
});

describe("counting", () => {
  it("writes the difference at average, posts it, and says why", async () => {
    const found = must(await countStock(a.as("rcv"), { cause: "routine count", lines: [{ partId: id("SH-S250"), counted: "29" }, { partId: id("SL-S250"), counted: "60" }, { partId: id("HG-S250"), counted: "" }] }));
    expect(found).toEqual({ counted: 2, differences: [{ sku: "SH-S250", lotCode: null, differenceMilli: -1000 }] });
    expect(await part("SH-S250")).toMatchObject({ onHandMilli: 29_000, valueMinor: 7540 });
    expect(await last("SH-S250")).toMatchObject({ kind: "count difference", qtyMilli: -1000, valueMinor: -260, reason: "routine count", personName: "rcv" });
    expect(await last("SL-S250")).toMatchObject({ kind: "count difference", qtyMilli: 0 });
    expect(await account("5400")).toEqual(["1500"]);
  });

  it("takes into account what moved after the count", async () => {
    must(await withShop(a.shop.id, (tx) => issueStock({ ...a.as("tech", "2026-02-18T18:00:00Z"), tx }, { partId: id("SL-S250"), qtyMilli: 4000 })));
    // Counted at 10:30 local, when all sixty were there; entered at noon.
    must(await countStock(a.as("rcv", "2026-02-18T19:00:00Z"), { countedAt: "2026-02-18T10:30", cause: "routine count", lines: [{ partId: id("SL-S250"), counted: "60" }] }));
    expect(await part("SL-S250")).toMatchObject({ onHandMilli: 56_000 });
  });

  it("refuses without a cause, without a count, of a kit, of half a piece and of a time to come", async () => {
    const count = (more: object) => countStock(a.as("rcv"), { cause: "routine count", lines: [{ partId: id("SH-S250"), counted: "1" }], ...more });
    expect(await countStock(a.as("rcv"), { lines: [{ partId: id("SH-S250"), counted: "1" }] } as never)).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "cause" }] } });
    expect(await count({ lines: [{ partId: id("SH-S250"), counted: "" }] })).toMatchObject({ ok: false, refusal: { code: "NOTHING_COUNTED" } });
    expect(await count({ lines: [{ partId: id("SPK-S250"), counted: "1" }] })).toMatchObject({ ok: false, refusal: { code: "KIT_HAS_NO_SHELF" } });
    expect(await count({ lines: [{ partId: id("SH-S250"), counted: "1.5" }] })).toMatchObject({ ok: false, refusal: { code: "NOT_WHOLE_PIECES", field: "lines.0.counted" } });
    expect(await count({ lines: [{ partId: id("EP-04"), counted: "7" }] })).toMatchObject({ ok: false, refusal: { code: "LOT_MISSING" } });
    expect(await count({ countedAt: "2027-01-01T10:00" })).toMatchObject({ ok: false, refusal: { code: "TIME_NOT_READABLE", field: "countedAt" } });
  });

  it("leaves a large difference to the manager", async () => {
    const lines = [{ partId: id("SP-S250"), counted: "20" }];
    expect(await countStock(a.as("rcv"), { cause: "routine count", lines })).toMatchObject({ ok: false, refusal: { code: "DIFFERENCE_TOO_LARGE", field: "lines.0.counted" } });
    must(await countStock(a.as("mgr"), { cause: "miscounted before", lines }));
    expect(await part("SP-S250")).toMatchObject({ onHandMilli: 20_000, valueMinor: 19_700 });
  });

  it("takes one repeat of a request as one", async () => {
    const key = requestId();
    const input = { cause: "routine count", lines: [{ partId: id("KP-S250"), counted: "79" }] } as const;
    const all = await Promise.all(Array.from({ length: 10 }, () => countStock(a.as("rcv"), { ...input, lines: [...input.lines] }, { requestId: key })));
    expect(new Set(all.map((r) => JSON.stringify(must(r)))).size).toBe(1);
    expect((await ledgerOf(a.as("owner"), { part: id("KP-S250"), limit: 10 })).rows).toHaveLength(2);
  });
});

describe("reversing", () => {
  it("turns a movement round once, with its journal entry", async () => {
    const before = await account("5400");
    const count = await last("SP-S250");
    must(await reverseMovement(a.as("mgr"), { movementId: count.id, reason: "the other box was overlooked" }));
    expect(await part("SP-S250")).toMatchObject({ onHandMilli: 40_000, valueMinor: 39_400 });
    expect(Number((await account("5400"))[0])).toBe(Number(before[0]) - 19_700);
    expect(await reverseMovement(a.as("mgr"), { movementId: count.id, reason: "again" })).toMatchObject({ ok: false, refusal: { code: "ALREADY_REVERSED" } });
    const [turn, first] = (await ledgerOf(a.as("mgr"), { part: id("SP-S250"), limit: 2 })).rows;
    expect([turn?.kind, turn?.reversesId, first?.reversedById, turn?.afterMilli]).toEqual(["reversal", first?.id, turn?.id, 40_000]);
    await expect(reverseMovement(a.as("rcv"), { movementId: count.id, reason: "not mine" })).rejects.toThrow(NotFound);
  });

  it("refuses to take an opening back that was used already", async () => {
    const opening = (await ledgerOf(a.as("owner"), { part: id("SL-S250"), limit: 20 })).rows.find((r) => r.kind === "opening");
    expect(await reverseMovement(a.as("owner"), { movementId: opening?.id ?? "", reason: "typed twice" })).toMatchObject({ ok: false, refusal: { code: "INSUFFICIENT_STOCK" } });
  });

  it("leaves shelf and journal equal", async () => {
    expect(await account("1200")).toEqual(await behindTheCurtain(`select coalesce(sum(value_minor), 0) from stock_balances where shop_id = '${a.shop.id}'`));
  });
});

describe("the count sheet", () => {
  it("lists a shelf or a part, lot by lot, with nothing on it to lean on", async () => {
    const shelf = await countSheetFor(a.as("rcv"), { bin: "A 4" });
    expect(shelf.lines.map((l) => [l.sku, l.lotCode])).toEqual([["GV-S250", null]]);
    expect(shelf.bins).toContain("F 1");
    expect((await countSheetFor(a.as("rcv"), { part: "EP-04" })).lines.map((l) => l.lotCode)).toEqual(["E-2602", "E-2604"]);
    expect(JSON.stringify(shelf)).not.toMatch(/onHand|expected/i);
    expect((await countSheetFor(b.as("owner"), { bin: "A 4" })).lines).toEqual([]);
    await expect(countSheetFor(a.as("tech"), { bin: "A 4" })).rejects.toThrow(NotFound);
  });
});
