import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { sha256 } from "@/modules/access/audit";
import { NotFound } from "@/modules/access/context";
import { addFamily } from "@/modules/flow/commands/gear";
import { asCustomer, HERO_LABOR, HERO_SHELF, hashOf, heroLines, heroMenu, heroParts, openHero, pieceVersion, sendVersion, type HeroOrder } from "@/tests/support/hero-order";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { answerByLink } from "./commands/answer-estimate";
import { handOver, shipPieces } from "./commands/hand-over";
import { endHold, setHold } from "./commands/holds";
import { markOperation } from "./commands/operation-state";
import { addPhoto } from "./commands/photos";
import { receivePiece } from "./commands/receive-piece";
import { releasePiece, reopenPiece } from "./commands/release-piece";
import { CHECKLIST } from "./domain/release-check";

let a: TestShop;
let b: TestShop;
let ids: Record<string, string>;
let hero: HeroOrder;
const AT = "2026-02-24T17:00:00Z";
const one = async (sql: string) => (await behindTheCurtain(sql))[0];
const every = CHECKLIST.map((c) => c.key);
const trayOf = (valves: number) => [{ kind: "valves" as const, fitted: valves, returned: "0", scrapped: "0" }, { kind: "springs" as const, fitted: "0", returned: "4", scrapped: "0" }];

async function agreedOrder(mark: string): Promise<HeroOrder> {
  const h = await openHero(a, ids, mark);
  const v1 = await sendVersion(a, h, heroLines(ids, HERO_LABOR, HERO_SHELF), "2026-02-18T17:00:00Z");
  must(await answerByLink(await asCustomer(a, h, v1.estimateId, "2026-02-19T17:42:00Z"), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v1.estimateId) }, { requestId: requestId() }));
  return h;
}
const photo = (subjectId: string) => ({ subjectKind: "piece" as const, subjectId, name: "face.jpg", storageKey: `${a.shop.id}/photo/${randomUUID()}.jpg`, thumbKey: null, sizeBytes: 1000, sha256: sha256(randomUUID()) });

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  await heroMenu(a);
  ids = await heroParts(a);
  hero = await agreedOrder("A1193");
});

describe("booking in", () => {
  const input = async (more: object = {}) => ({ pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), parcelCondition: "sound" as const, counts: { valves: "4", springs: "4" }, damage: "nick on the deck edge", ...more });
  it("asks about fewer than four photos, and takes yes for an answer", async () => {
    expect(await receivePiece(a.as("rcv", AT), await input())).toMatchObject({ ok: false, refusal: { code: "FEW_PHOTOS", data: { photos: 0 } } });
    for (let i = 0; i < 3; i++) must(await addPhoto(a.as("rcv", AT), photo(hero.pieceId)));
    expect(await receivePiece(a.as("rcv", AT), await input())).toMatchObject({ ok: false, refusal: { data: { photos: 3 } } });
    must(await addPhoto(a.as("rcv", AT), photo(hero.pieceId)));
  });
  it("refuses counts that are no whole numbers, naming the cell", async () => {
    expect(await receivePiece(a.as("rcv", AT), await input({ counts: { valves: "four" } }))).toMatchObject({ ok: false, refusal: { fields: [{ path: "counts.valves" }] } });
  });
  it("gives the day's next tag on the shop's calendar, makes the head, and tells the customer", async () => {
    // 2026-02-25 03:30 UTC is still the evening of the 24th in Denver.
    const late = "2026-02-25T03:30:00Z";
    expect(must(await receivePiece(a.as("rcv", late), await input()))).toMatchObject({ tag: "260224-01", photos: 4, mailed: true });
    expect(await one(`select mark || ' ' || family || ' ' || casting_number from heads where piece_id = '${hero.pieceId}'`)).toBe("260224-01 S250-4V K7-2201");
    expect(await one(`select body_text like '%nick on the deck edge%' from mail_messages where kind = 'head-arrived'`)).toBe("t");
    expect(await receivePiece(a.as("rcv", late), await input())).toMatchObject({ ok: false, refusal: { code: "ALREADY_BOOKED_IN" } });
  });
  it("gives the head the cylinders, bore and cam lifts of the shop's family, so that every port of it can be flowed", async () => {
    must(await addFamily(a.as("mgr", AT), { name: "S250-4V", cylinders: 2, boreMm: 77, strokeMm: 53.6, camLiftIntake: "0.340", camLiftExhaust: "0.330" }));
    const twin = await agreedOrder("twin");
    must(await receivePiece(a.as("rcv", AT), { pieceId: twin.pieceId, version: await pieceVersion(a, twin.pieceId), parcelCondition: "sound", fewPhotosOk: true }));
    expect(await one(`select concat_ws(' ', cylinders, bore_mm, stroke_mm, cam_lift_intake_um, cam_lift_exhaust_um) from heads where piece_id = '${twin.pieceId}'`)).toBe("2 77 53.6 8636 8382");
  });
  it("takes the same picture once, however often it is sent", async () => {
    const same = photo(hero.pieceId);
    const first = must(await addPhoto(a.as("rcv", AT), same));
    expect(must(await addPhoto(a.as("rcv", AT), { ...same, storageKey: `${a.shop.id}/photo/${randomUUID()}.jpg` }))).toEqual(first);
  });
  it("takes no photo for a piece of another shop, and none that points elsewhere", async () => {
    expect(await addPhoto(b.as("rcv"), photo(hero.pieceId))).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await addPhoto(a.as("rcv"), { ...photo(hero.pieceId), storageKey: `${b.shop.id}/photo/${randomUUID()}.jpg` })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await receivePiece(b.as("rcv"), await input())).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
  });
});

describe("final inspection", () => {
  it("names everything that is missing", async () => {
    const hold = must(await setHold(a.as("tech", AT), { pieceId: hero.pieceId, reason: "parts" }));
    expect(await setHold(a.as("tech", AT), { pieceId: hero.pieceId, reason: "parts" })).toMatchObject({ ok: false, refusal: { code: "HELD_ALREADY" } });
    const r = await releasePiece(a.as("insp", AT), { pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), checked: every.slice(1), tray: trayOf(3) });
    expect(r).toMatchObject({ ok: false, refusal: { code: "NOT_READY" } });
    const said = r.ok ? "" : r.refusal.message;
    for (const words of ["On hold: parts", "Lap and vacuum check (LAP) is not done", "valves: 4 came in, 3 accounted for", "Casting and serial match"]) expect(said).toContain(words);
    must(await endHold(a.as("tech", AT), { holdId: hold.id }));
  });
  it("lets technicians finish operations and only the lead skip them, with a reason", async () => {
    const ops = (await behindTheCurtain(`select id || ' ' || code || ' ' || version from operations where piece_id = '${hero.pieceId}' and skill <> 'inspection' order by sequence`)).map((r) => r.split(" "));
    for (const [id = "", code = "", version = ""] of ops) {
      const input = { operationId: id, version: Number(version) };
      if (code === "LSH") {
        expect(await markOperation(a.as("tech", AT), { ...input, to: "skipped", reason: "no shims" })).toMatchObject({ ok: false, refusal: { code: "LEAD_ONLY" } });
        expect(await markOperation(a.as("lead", AT), { ...input, to: "skipped" })).toMatchObject({ ok: false, refusal: { fields: [{ path: "reason" }] } });
        must(await markOperation(a.as("lead", AT), { ...input, to: "skipped", reason: "lash in the middle of the range" }));
      } else must(await markOperation(a.as("tech", AT), { ...input, to: "done" }));
    }
    const [id = "", , version = ""] = ops[0] ?? [];
    expect(await markOperation(a.as("tech", AT), { operationId: id, version: Number(version), to: "done" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    // A finished one is opened again with its reason only: without it the time after would count as book hours earned.
    expect(await markOperation(a.as("lead", AT), { operationId: id, version: Number(version) + 1, to: "open" })).toMatchObject({ ok: false, refusal: { code: "DONE_ALREADY" } });
  });
  it("wants the reading sets of its flow operations", async () => {
    const r = await releasePiece(a.as("insp", AT), { pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), checked: every, tray: trayOf(4) });
    expect(r).toMatchObject({ ok: false, refusal: { data: { missing: "Baseline flow: no finished reading set.\nFinal flow: no finished reading set." } } });
    await behindTheCurtain(`update operations set skill = 'bench' where piece_id = '${hero.pieceId}' and skill = 'flow bench'`);
  });
  it("refuses whoever ported it, lets another release, and the release finishes the inspection", async () => {
    await behindTheCurtain(`insert into time_entries (shop_id, id, person_id, clock, operation_id, work_order_id, piece_id, started_at, ended_at, source)
      select shop_id, gen_random_uuid(), '${a.people.insp}', 'bench', id, work_order_id, piece_id, now() - interval '2 hours', now(), 'test' from operations where piece_id = '${hero.pieceId}' and code = 'PIN'`);
    const input = async () => ({ pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), checked: every, tray: trayOf(4) });
    expect(await releasePiece(a.as("insp", AT), await input())).toMatchObject({ ok: false, refusal: { data: { missing: "You ported this piece. Somebody else must release it." } } });
    await expect(releasePiece(a.as("counter", AT), await input())).rejects.toThrow(NotFound);
    expect(must(await releasePiece(a.as("lead", AT), await input()))).toMatchObject({ alone: false });
    expect(await one(`select done_at is not null from operations where piece_id = '${hero.pieceId}' and code = 'INS'`)).toBe("t");
    expect(await one(`select count(*) from mail_messages where kind = 'proved'`)).toBe("1");
  });
  it("opens again with a reason, and is released anew", async () => {
    must(await reopenPiece(a.as("lead", AT), { pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), reason: "a nick in seat 2" }));
    expect(await one(`select done_at is null from operations where piece_id = '${hero.pieceId}' and code = 'INS'`)).toBe("t");
    must(await releasePiece(a.as("lead", AT), { pieceId: hero.pieceId, version: await pieceVersion(a, hero.pieceId), checked: every, tray: trayOf(4) }));
    expect(await behindTheCurtain(`select outcome from inspections where piece_id = '${hero.pieceId}'`)).toEqual(["released", "released"]);
  });
});

describe("leaving", () => {
  const parcel = { carrier: "Prairie Parcel", service: "Ground", tracking: "PP-1", insured: "", cost: "36.40" };
  it("keeps an unpaid piece for all but a manager who says so", async () => {
    const input = { workOrderId: hero.orderId, pieceIds: [hero.pieceId], to: "Odalys Brennan" };
    expect(await handOver(a.as("counter", AT), { ...input, unpaidOk: true })).toMatchObject({ ok: false, refusal: { code: "MONEY_OWED", data: { owedMinor: 241_032 } } });
    expect(await handOver(a.as("mgr", AT), input)).toMatchObject({ ok: false, refusal: { code: "MONEY_OWED" } });
  });
  it("ships insured at the declared value and posts the carrier's bill: Dr 5200, Cr 2000 36.40", async () => {
    const key = requestId();
    const send = () => shipPieces(a.as("mgr", "2026-03-16T17:00:00Z"), { workOrderId: hero.orderId, pieceIds: [hero.pieceId], ...parcel, unpaidOk: true }, { requestId: key });
    const first = must(await send());
    expect(first).toMatchObject({ insuredMinor: 320_000, owedMinor: 241_032 });
    expect(must(await send())).toEqual(first);
    expect(await behindTheCurtain(`select account_code || ' ' || amount_minor from journal_lines order by line_no`)).toEqual(["5200 3640", "2000 -3640"]);
    expect(await one(`select closed_at is not null from work_orders where id = '${hero.orderId}'`)).toBe("t");
    expect(await handOver(a.as("mgr", AT), { workOrderId: hero.orderId, pieceIds: [hero.pieceId], to: "x y", unpaidOk: true })).toMatchObject({ ok: false, refusal: { code: "GONE_ALREADY" } });
  });
  it("lets nothing go that was not released, nor anything of another shop", async () => {
    const h = await agreedOrder("B-2");
    expect(await handOver(a.as("mgr", AT), { workOrderId: h.orderId, pieceIds: [h.pieceId], to: "Somebody" })).toMatchObject({ ok: false, refusal: { code: "NOT_BOOKED_IN" } });
    must(await receivePiece(a.as("rcv", AT), { pieceId: h.pieceId, version: await pieceVersion(a, h.pieceId), parcelCondition: "sound", fewPhotosOk: true }));
    expect(await handOver(a.as("mgr", AT), { workOrderId: h.orderId, pieceIds: [h.pieceId], to: "Somebody" })).toMatchObject({ ok: false, refusal: { code: "NOT_RELEASED" } });
    expect(await handOver(b.as("mgr", AT), { workOrderId: h.orderId, pieceIds: [h.pieceId], to: "Somebody" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
  });
});
