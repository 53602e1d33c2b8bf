import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { asCustomer, HERO_FOUND, HERO_LABOR, HERO_SHELF, hashOf, heroLines, heroMenu, heroParts, openHero, pieceVersion, sendVersion, type HeroOrder } from "@/tests/support/hero-order";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { handlers } from "@/worker/handlers";
import { drain } from "@/worker/queue";
import { answerByLink, enterSpokenAnswer } from "./commands/answer-estimate";
import { saveEstimate, startEstimate } from "./commands/estimate-draft";
import { askAboutFinding, recordFinding } from "./commands/findings";
import { openOrder } from "./commands/open-order";
import { receivePiece } from "./commands/receive-piece";
import { sendEstimate } from "./commands/send-estimate";
import { depositOf } from "./queries/deposit";

let a: TestShop;
let b: TestShop;
let ids: Record<string, string>;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  await heroMenu(a);
  ids = await heroParts(a);
});

const one = async (sql: string) => (await behindTheCurtain(sql))[0];
const v1Lines = () => heroLines(ids, HERO_LABOR, HERO_SHELF);
const v2Lines = () => heroLines(ids, [...HERO_LABOR, ...HERO_FOUND.labor], [...HERO_SHELF, ...HERO_FOUND.shelf]);
const yes = (documentHash: string) => ({ answer: "approved" as const, name: "Odalys Brennan", documentHash });

describe("opening an order", () => {
  it("numbers it in the year's series and adds a new customer in the same act", async () => {
    const opened = must(await openOrder(a.as("counter"), { newCustomer: { name: "Walk In", phone: "5550100" }, use: "road", pieces: [{ family: "S450-4V" }, { family: "S450-4V" }] }));
    expect(opened.number).toMatch(/^WO-2026-\d{4}$/);
    expect(opened.pieces.map((p) => p.pieceNo)).toEqual([1, 2]);
  });
  it("takes no number and no customer when it is refused", async () => {
    const before = await one("select count(*) from customers");
    const r = await openOrder(a.as("counter"), { newCustomer: { name: "Too Late", phone: "5550101" }, use: "road", promisedOn: "2026-02-01", pieces: [{ family: "S450-4V" }] });
    expect(r).toMatchObject({ ok: false, refusal: { code: "PROMISE_IN_THE_PAST", field: "promisedOn" } });
    expect(await one("select count(*) from customers")).toBe(before);
  });
  it("refuses a piece that is on an open order, naming it, also when two counters type at once", async () => {
    const input = { newCustomer: { name: "Twice", phone: "5550102" }, use: "other" as const, pieces: [{ family: "S250-4V", castingNumber: "K7-9", serial: "Z1" }] };
    const both = await Promise.all([openOrder(a.as("counter"), input), openOrder(a.as("lead"), input)]);
    const good = both.find((r) => r.ok);
    const bad = both.find((r) => !r.ok);
    expect(good?.ok && bad && !bad.ok && bad.refusal).toMatchObject({ code: "PIECE_ON_OPEN_ORDER", field: "pieces.0.serial", data: { number: good?.ok ? good.value.number : "" } });
    expect(await openOrder(a.as("counter"), { ...input, pieces: [{ family: "x", castingNumber: "k7-9", serial: "z1" }] })).toMatchObject({ ok: false, refusal: { code: "PIECE_ON_OPEN_ORDER" } });
  });
  it("asks for a customer, a family, a use, and keeps card numbers out of free text", async () => {
    expect(await openOrder(a.as("counter"), { use: "road", pieces: [{ family: "" }] })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
    const card = await openOrder(a.as("counter"), { newCustomer: { name: "N", phone: "5550103" }, use: "road", wants: "pay with 4242 4242 4242 4242", pieces: [{ family: "S" }] });
    expect(card).toMatchObject({ ok: false, refusal: { fields: [{ path: "wants" }] } });
  });
  it("is not for technicians", async () => {
    await expect(openOrder(a.as("tech"), { newCustomer: { name: "N", phone: "5550104" }, use: "road", pieces: [{ family: "S" }] })).rejects.toThrow(NotFound);
  });
});

describe("the estimate of the hero job", () => {
  let hero: HeroOrder;
  let v1: { estimateId: string; totalMinor: number; depositMinor: number };
  let v2: typeof v1;
  beforeAll(async () => { hero = await openHero(a, ids); });

  // Figures: docs/hero-job.md.
  it("comes to 2,410.32 with a deposit of 723.10", async () => {
    v1 = await sendVersion(a, hero, v1Lines(), "2026-02-18T17:00:00Z");
    expect(v1).toMatchObject({ totalMinor: 241_032, depositMinor: 72_310, version: 1, validUntil: "2026-03-20" });
    const [labor, discount, partsSum, supplies, freight, tax] = (await one(`select concat_ws(' ', snapshot #>> '{totals,laborMinor}', snapshot #>> '{totals,laborDiscountMinor}', snapshot #>> '{totals,partsMinor}', snapshot #>> '{totals,suppliesMinor}', snapshot #>> '{totals,freightMinor}', snapshot #>> '{totals,taxMinor}') from estimates where id = '${v1.estimateId}'`))?.split(" ") ?? [];
    expect([labor, discount, partsSum, supplies, freight, tax]).toEqual(["195000", "9750", "42050", "6000", "4200", "3532"]);
  });
  it("is fixed once sent", async () => {
    expect(await sendEstimate(a.as("counter"), { estimateId: v1.estimateId, version: 99, to: "" })).toMatchObject({ ok: false, refusal: { code: "ESTIMATE_FIXED" } });
    const r = await saveEstimate(a.as("counter"), { estimateId: v1.estimateId, version: 1, laborDiscountPercent: "0", freight: "0", depositPercent: "0", exclusions: "", message: "", readyOn: "", lines: [] });
    expect(r).toMatchObject({ ok: false, refusal: { code: "ESTIMATE_FIXED" } });
  });
  it("is made into a paper and mailed with its link once, however often the worker runs", async () => {
    await drain({ "estimates.paper": handlers["estimates.paper"] ?? (() => Promise.reject(new Error("none"))) });
    await handlers["estimates.paper"]?.(a.system("2026-02-18T17:05:00Z"), { estimateId: v1.estimateId });
    expect(await behindTheCurtain(`select kind || ' ' || to_address || ' ' || cardinality(attachment_file_ids) from mail_messages where subject_id = '${v1.estimateId}'`)).toEqual(["estimate odalys@brennan.example 1"]);
    expect(await one(`select name || ' ' || (size_bytes > 5000)::text from files where subject_id = '${v1.estimateId}'`)).toBe(`${hero.number}-estimate-1.pdf true`);
  });
  it("cannot be answered under another hash than the one on file", async () => {
    const r = await answerByLink(await asCustomer(a, hero, v1.estimateId, "2026-02-19T17:42:00Z"), yes("0".repeat(64)));
    expect(r).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
  });
  it("is approved by link once: name, time, address, agent, hash and words are kept; a double tap is one answer", async () => {
    const customer = await asCustomer(a, hero, v1.estimateId, "2026-02-19T17:42:00Z");
    const hash = await hashOf(a, v1.estimateId);
    const key = requestId();
    const [first, again] = await Promise.all([answerByLink(customer, yes(hash), { requestId: key }), answerByLink(customer, yes(hash), { requestId: key })]);
    expect(must(first)).toEqual(must(again));
    expect(must(first)).toMatchObject({ answer: "approved", totalMinor: 241_032, depositMinor: 72_310 });
    expect(await answerByLink(customer, { ...yes(hash), answer: "declined" }, { requestId: requestId() })).toMatchObject({ ok: false, refusal: { code: "ALREADY_ANSWERED" } });
    expect(await behindTheCurtain(`select concat_ws('|', name, via, ip, agent, document_hash = '${hash}', total_minor, to_char(at at time zone 'UTC', 'YYYY-MM-DD HH24:MI'), words like '%$2,410.32%') from approvals`))
      .toEqual(["Odalys Brennan|link|203.0.113.9|a telephone|t|241032|2026-02-19 17:42|t"]);
  });
  it("puts the agreed work on the routing and opens the kit into its parts, reserved from the shelf", async () => {
    expect(await one(`select count(*) || ' ' || sum(book_minutes) || ' ' || sum(price_minor) from operations where work_order_id = '${hero.orderId}'`)).toBe("14 1086 195000");
    expect(await one(`select string_agg(code, ' ' order by sequence) from operations where work_order_id = '${hero.orderId}'`)).toBe("CLN TDN PRT FLB EPX PIN PEX SEA LAP SPR LSH FLF ASM INS");
    const needs = await behindTheCurtain(`select p.sku || ' ' || w.needed_milli || ' ' || w.reserved_milli from work_order_parts w join parts p on p.shop_id = w.shop_id and p.id = w.part_id where w.work_order_id = '${hero.orderId}' and p.part_class <> 'epoxy' order by p.sku`);
    expect(needs).toEqual(["GSK-S250-HD 1000 1000", "KPR-S250 8000 8000", "RET-S250-TI 4000 4000", "SEL-55 4000 4000", "SHM-748 4000 4000", "SPG-S250 4000 4000", "SST-S250 4000 4000", "VIN-S250-310 2000 2000"]);
    expect(await depositOf(a.as("counter"), hero.orderId)).toMatchObject({ dueMinor: 72_310, paidMinor: 0, openMinor: 72_310, estimateId: v1.estimateId });
  });
  it("tells the customer and the shop what was agreed", async () => {
    const kinds = await behindTheCurtain(`select kind || ' ' || to_address from mail_messages where work_order_id = '${hero.orderId}' and kind like 'estimate-answer%' order by 1`);
    expect(kinds).toEqual(["estimate-answer odalys@brennan.example", "estimate-answer-shop counter@first.example"]);
  });
  it("asks about a finding in version 2: 2,633.43, 223.11 more, and no second deposit", async () => {
    must(await receivePiece(a.as("rcv", "2026-02-24T17:00:00Z"), { pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), parcelCondition: "sound", counts: { valves: "4" }, fewPhotosOk: true }));
    const found = must(await recordFinding(a.as("tech", "2026-02-26T22:10:00Z"), { pieceId: hero.pieceId, words: "Exhaust guides and valves out of limit", position: "exhaust 1, 2" }));
    const asked = must(await askAboutFinding(a.as("counter", "2026-02-26T22:20:00Z"), { findingId: found.id, version: 1 }));
    expect(asked.estimateNo).toBe(2);
    v2 = await sendVersion(a, hero, v2Lines(), "2026-02-26T22:30:00Z");
    expect(v2).toMatchObject({ totalMinor: 263_343, depositMinor: 72_310, version: 2 });
    expect(await one(`select concat_ws(' ', snapshot #>> '{change,changeMinor}', snapshot ->> 'depositStands', jsonb_array_length(snapshot -> 'findings')) from estimates where id = '${v2.estimateId}'`)).toBe("22311 true 1");
  });
  it("keeps started work, adds the new, and leaves the first version replaced", async () => {
    await behindTheCurtain(`update operations set started_at = now() where work_order_id = '${hero.orderId}' and code = 'CLN'`);
    const key = await hashOf(a, v2.estimateId);
    must(await answerByLink(await asCustomer(a, hero, v2.estimateId, "2026-02-27T15:05:00Z"), yes(key), { requestId: requestId() }));
    expect(await one(`select count(*) || ' ' || sum(book_minutes) || ' ' || sum(price_minor) from operations where work_order_id = '${hero.orderId}' and removed_at is null`)).toBe("15 1134 203400");
    expect(await behindTheCurtain(`select estimate_no || ' ' || state from estimates where work_order_id = '${hero.orderId}' order by 1`)).toEqual(["1 replaced", "2 approved"]);
    expect(await one(`select w.needed_milli || ' ' || w.reserved_milli from work_order_parts w join parts p on p.shop_id = w.shop_id and p.id = w.part_id where w.work_order_id = '${hero.orderId}' and p.sku = 'VEX-S250-265'`)).toBe("2000 0");
    const old = await answerByLink(await asCustomer(a, hero, v1.estimateId, "2026-02-28T15:05:00Z"), yes(await hashOf(a, v1.estimateId)), { requestId: requestId() });
    expect(old).toMatchObject({ ok: false, refusal: { code: "REPLACED" } });
    expect(await depositOf(a.as("counter"), hero.orderId)).toMatchObject({ dueMinor: 72_310 });
  });
  it("is unknown to another shop, which changes nothing", async () => {
    expect(await startEstimate(b.as("counter"), { workOrderId: hero.orderId })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await enterSpokenAnswer(b.as("counter"), { estimateId: v2.estimateId, answer: "approved", via: "counter", name: "Nobody" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await depositOf(b.as("counter"), hero.orderId)).toBeNull();
  });
});

describe("answers that are refused or given otherwise", () => {
  it("says in words that an offer is out of date", async () => {
    const hero = await openHero(a, ids, "OLD-1");
    const sent = await sendVersion(a, hero, v1Lines(), "2026-02-18T17:00:00Z");
    const r = await answerByLink(await asCustomer(a, hero, sent.estimateId, "2026-03-21T12:00:00Z"), yes(await hashOf(a, sent.estimateId)));
    expect(r).toMatchObject({ ok: false, refusal: { code: "OUT_OF_DATE" } });
  });
  it("writes down a yes by telephone: number, name, who took it", async () => {
    const hero = await openHero(a, ids, "TEL-1");
    const sent = await sendVersion(a, hero, v1Lines(), "2026-02-18T17:00:00Z", "");
    const no = await enterSpokenAnswer(a.as("counter"), { estimateId: sent.estimateId, answer: "approved", via: "phone", name: "Odalys Brennan" });
    expect(no).toMatchObject({ ok: false, refusal: { fields: [{ path: "phoneNumber" }] } });
    await expect(enterSpokenAnswer(a.as("tech"), { estimateId: sent.estimateId, answer: "approved", via: "counter", name: "Odalys" })).rejects.toThrow(NotFound);
    must(await enterSpokenAnswer(a.as("counter"), { estimateId: sent.estimateId, answer: "approved", via: "phone", name: "Odalys Brennan", phoneNumber: "303-555-0142" }));
    expect(await one(`select via || ' ' || phone_number || ' ' || (taken_by = '${a.people.counter}')::text from approvals where estimate_id = '${sent.estimateId}'`)).toBe("phone 303-555-0142 true");
  });
  it("starts nothing on a no", async () => {
    const hero = await openHero(a, ids, "NO-1");
    const sent = await sendVersion(a, hero, v1Lines(), "2026-02-18T17:00:00Z");
    must(await answerByLink(await asCustomer(a, hero, sent.estimateId, "2026-02-19T17:42:00Z"), { answer: "declined", name: "Odalys Brennan", documentHash: await hashOf(a, sent.estimateId) }));
    expect(await one(`select count(*) from operations where work_order_id = '${hero.orderId}'`)).toBe("0");
  });
});

describe("a draft", () => {
  it("keeps hours and the least price with the shop, and a large discount with the manager", async () => {
    const hero = await openHero(a, ids, "DR-1");
    const draft = must(await startEstimate(a.as("counter"), { workOrderId: hero.orderId }));
    const input = (unitPrice: string, laborDiscountPercent = "5") => ({
      estimateId: draft.estimateId, version: draft.version, laborDiscountPercent, freight: "0", depositPercent: "30", exclusions: "", message: "", readyOn: "",
      lines: [{ kind: "labor" as const, operationCode: "PIN", description: "Intake porting", qty: "1", unitPrice }],
    });
    expect(await saveEstimate(a.as("counter"), input("400.00"))).toMatchObject({ ok: false, refusal: { code: "PRICE_TOO_LOW", field: "lines.0.unitPrice" } });
    expect(await saveEstimate(a.as("counter"), input("495.00", "12"))).toMatchObject({ ok: false, refusal: { code: "DISCOUNT_TOO_LARGE" } });
    expect(await saveEstimate(a.as("counter"), { ...input("495.00"), lines: [{ kind: "labor", operationCode: "XXX", description: "Magic", qty: "1", unitPrice: "1" }] })).toMatchObject({ ok: false, refusal: { code: "OPERATION_UNKNOWN", field: "lines.0.description" } });
    expect(await saveEstimate(a.as("counter"), { ...input("495.00"), lines: [{ kind: "labor", operationCode: "PIN", description: "x", qty: "-1", unitPrice: "1" }] })).toMatchObject({ ok: false, refusal: { fields: [{ path: "lines.0.qty" }] } });
    const saved = must(await saveEstimate(a.as("mgr"), input("400.00", "12")));
    expect(await saveEstimate(a.as("mgr"), input("400.00"))).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect(saved.version).toBe(2);
    expect(await sendEstimate(a.as("counter"), { estimateId: draft.estimateId, version: 1, to: "" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
  });
});
