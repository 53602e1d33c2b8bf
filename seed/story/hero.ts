import { and, eq } from "drizzle-orm";
import { purchaseOrderLines, workOrderParts } from "@/db/schema";
import { withShop } from "@/db/scope";
import { issueComparison } from "@/modules/flow/commands/issue-comparison";
import { postWholeTest } from "@/modules/flow/commands/post-test";
import { draftPurchaseOrder, sendPurchaseOrder } from "@/modules/purchasing/commands/orders";
import { receiveGoods } from "@/modules/purchasing/commands/receive";
import { recordEpoxyFill } from "@/modules/work-orders/commands/epoxy";
import { recordFinding } from "@/modules/work-orders/commands/findings";
import { shipPieces } from "@/modules/work-orders/commands/hand-over";
import { openOrder } from "@/modules/work-orders/commands/open-order";
import { issueAllReady } from "@/modules/work-orders/commands/parts";
import { releasePiece } from "@/modules/work-orders/commands/release-piece";
import { must, type Cast } from "../cast";
import { HERO_BENCH, HERO_CAM_LIFT_IN, HERO_FLOW, HERO_FOUND_LABOR, HERO_FOUND_SHELF, HERO_LABOR, HERO_LIFTS, HERO_SHELF, HERO_VALVE_MM } from "../facts/hero";
import { HERO_EPOXY, HERO_KIT, HERO_PARTS, NINEBARK_MENU } from "../facts/ninebark";
import { arrive, goHome, operationsOf, stretch } from "./bench-day";
import { headOfPiece } from "./flowed";
import { answer, bill, bookIn, offer, paidByCard, versionOf, type Line } from "./orders";

export interface HeroScene {
  parts: Readonly<Record<string, string>>;
  suppliers: Readonly<Record<string, string>>;
  customerId: string;
  benchId: string;
  fixtureId: string;
}
export interface HeroOutcome { workOrderId: string; number: string; pieceId: string; tag: string; invoiceId: string; invoiceNumber: string; deposit: string; balance: string }

const menu = new Map<string, (typeof NINEBARK_MENU)[number]>(NINEBARK_MENU.map((m) => [m.code, m]));
const goods = new Map<string, { description: string; sale: string }>([...HERO_PARTS, HERO_KIT, HERO_EPOXY].map((p) => [p.sku, p]));

/** Lines of an offer on one piece, priced from menu and shelf. */
export function offerLines(parts: Readonly<Record<string, string>>, labor: readonly (readonly [string, string])[], shelf: readonly (readonly [string, string])[], pieceNo = 1): Line[] {
  return [
    ...labor.map(([code, qty]): Line => ({ kind: "labor", pieceNo, operationCode: code, description: menu.get(code)?.name ?? code, qty, unitPrice: menu.get(code)?.price ?? "0" })),
    ...shelf.map(([sku, qty]): Line => ({ kind: "part", pieceNo, partId: parts[sku] ?? null, description: goods.get(sku)?.description ?? sku, qty, unitPrice: goods.get(sku)?.sale ?? "0" })),
  ];
}

/** Both sides of a port at the bench. */
async function bothSides(cast: Cast, s: HeroScene, at: string, tag: string, purpose: "baseline" | "after", seatNote: string): Promise<void> {
  for (const side of ["intake", "exhaust"] as const) {
    must(await postWholeTest(cast.as("June", at), {
      tag, side, purpose, benchId: s.benchId, fixtureId: s.fixtureId, nominal: "28", camLift: HERO_CAM_LIFT_IN, valve: HERO_VALVE_MM[side], seatNote, complete: true,
      roomTemperature: "68 F", roomPressure: "24.9 inHg", liftUnit: "in", readings: HERO_LIFTS.map((lift, i) => ({ lift, value: HERO_FLOW[side][purpose][i] ?? "" })),
    }), `flow ${side} ${purpose}`);
  }
}

/**
 * One job from the first call to the paid invoice: what docs/hero-job.md tells, through the product's own commands.
 * Payouts and the bank file follow in the chapter on the bank.
 */
export async function heroJob(cast: Cast, s: HeroScene): Promise<HeroOutcome> {
  const counter = (at: string) => cast.as("Tobias", at);
  const opened = must(await openOrder(counter("2026-02-17T11:20"), {
    customerId: s.customerId, use: "closed_course", wants: "Full port, intake floor filled. Wants proof on the bench.", promisedOn: "2026-03-20",
    pieces: [{ family: "S250-4V", castingNumber: "K7-2201", serial: "A1193", declaredValue: "3,200.00", description: "250 single, four valves" }],
  }));
  const workOrderId = opened.id;
  const pieceId = opened.pieces[0]?.id ?? "";
  const terms = { discount: "5", freight: "42.00", deposit: "30", to: "odalys@brennan.example", readyOn: "2026-03-20" };

  const v1 = await offer(cast, "Tobias", "2026-02-18T15:05", workOrderId, { ...terms, lines: offerLines(s.parts, HERO_LABOR, HERO_SHELF) });
  await answer(cast, v1.estimateId, "2026-02-19T10:42", "Odalys Brennan");
  const deposit = await paidByCard(cast, "2026-02-19T10:47", { workOrderId }, 72310);

  const tag = await bookIn(cast, "Emeka", "2026-02-24T14:30", pieceId, {
    counts: { valves: 4, springs: 4, shims: 4 }, castingNumber: "K7-2201", serial: "A1193", damage: "Nick on the deck edge, exhaust side. Photographed.", missing: "",
  });

  let ops = await operationsOf(cast, pieceId);
  const day = async (from: number, to: number) => {
    for (const [date, who, code, start, end, done] of HERO_BENCH.slice(from, to)) {
      await stretch(cast, who, ops[code] ?? "", `${date}T${start}`, `${date}T${end}`, done);
    }
  };
  await day(0, 2);
  await goHome(cast, "Emeka", "2026-02-25T16:30");
  await goHome(cast, "Hollis", "2026-02-25T16:30");
  await day(2, 4);
  await bothSides(cast, s, "2026-02-26T10:20", tag, "baseline", "on the cleaned original seats");
  await goHome(cast, "Emeka", "2026-02-26T16:30");
  await goHome(cast, "June", "2026-02-26T16:30");

  const finding = must(await recordFinding(cast.as("Hollis", "2026-02-26T15:10"), { pieceId, position: "exhaust", words: "Exhaust guides and valves out of limit: guide bores belled, stems worn at the top.", goOnMeanwhile: true }));
  const v2 = await offer(cast, "Tobias", "2026-02-26T16:40", workOrderId, {
    ...terms, findingIds: [finding.id], message: "Two exhaust guides and two exhaust valves on top of what you agreed. The rest goes on meanwhile.",
    lines: offerLines(s.parts, [...HERO_LABOR, ...HERO_FOUND_LABOR], [...HERO_SHELF, ...HERO_FOUND_SHELF]),
  });
  await answer(cast, v2.estimateId, "2026-02-27T08:05", "Odalys Brennan");
  ops = await operationsOf(cast, pieceId);

  const po = must(await draftPurchaseOrder(counter("2026-02-27T09:00"), {
    supplierId: s.suppliers["Greywater Valve Supply"] ?? "", neededBy: "2026-03-04", notes: "",
    lines: [
      { partId: s.parts["VEX-S250-265"] ?? "", qty: "6", price: "22.00", workOrderId },
      { partId: s.parts["GDE-S250-BRZ"] ?? "", qty: "10", price: "7.80", workOrderId },
    ],
  }));
  must(await sendPurchaseOrder(counter("2026-02-27T09:05"), { id: po.id, version: 1, by: "mail", expectedOn: "2026-03-03" }));
  const poLines = await withShop(cast.shop.id, (tx) => tx.select({ id: purchaseOrderLines.id, qty: purchaseOrderLines.qtyMilli }).from(purchaseOrderLines)
    .where(and(eq(purchaseOrderLines.shopId, cast.shop.id), eq(purchaseOrderLines.purchaseOrderId, po.id))).orderBy(purchaseOrderLines.lineNo));
  must(await receiveGoods(cast.as("Emeka", "2026-03-03T10:15"), { purchaseOrderId: po.id, freight: "15.00", deliveryNote: "GV 88121", lines: poLines.map((l) => ({ lineId: l.id, came: String(l.qty / 1000) })) }), "goods");

  // Anselm's week of 44.25 hours: five days of eight and Saturday morning.
  await arrive(cast, "Anselm", "2026-03-02T08:00");
  await goHome(cast, "Anselm", "2026-03-02T16:00");
  await arrive(cast, "Anselm", "2026-03-03T08:00");
  await goHome(cast, "Anselm", "2026-03-03T16:00");
  await day(4, 5);
  await goHome(cast, "Hollis", "2026-03-03T16:30");
  await day(5, 6);
  await goHome(cast, "Anselm", "2026-03-04T16:00");
  await arrive(cast, "Anselm", "2026-03-05T08:00");
  await goHome(cast, "Anselm", "2026-03-05T16:00");
  await arrive(cast, "Anselm", "2026-03-06T08:00");
  await goHome(cast, "Anselm", "2026-03-06T16:00");
  await arrive(cast, "Anselm", "2026-03-07T08:00");
  await day(6, 7);
  must(await recordEpoxyFill(cast.as("Anselm", "2026-03-07T11:32"), {
    pieceId, operationId: ops.EPX ?? "", partId: s.parts[HERO_EPOXY.sku] ?? "", port: "intake", gramsInPort: "38", gramsWaste: "4", ratio: "100:20", surfacePrepared: true,
    mixedAt: "2026-03-07T11:30", cureHours: "24",
  }), "epoxy");
  await goHome(cast, "Anselm", "2026-03-07T12:15");
  for (const [from, to, who, home] of [[7, 8, "Anselm", "2026-03-09T16:00"], [8, 9, "Rosa", "2026-03-10T16:30"], [9, 10, "Bram", "2026-03-11T16:30"]] as const) {
    await day(from, to);
    await goHome(cast, who, home);
  }
  await day(10, 12);
  await bothSidesAfter();
  await goHome(cast, "Bram", "2026-03-12T16:30");
  await goHome(cast, "Hollis", "2026-03-12T16:30");
  await goHome(cast, "June", "2026-03-12T16:30");

  async function bothSidesAfter() {
    await day(12, 13);
    await bothSides(cast, s, "2026-03-12T11:08", tag, "after", "on fresh seats");
  }

  must(await issueAllReady(cast.as("Emeka", "2026-03-13T07:50"), { workOrderId }), "parts issued");
  await day(13, 16);
  const head = await headOfPiece(cast, pieceId);
  must(await issueComparison(cast.as("June", "2026-03-13T10:20"), { headId: head.id, cylinder: 1 }), "gain issued");
  must(await releasePiece(cast.as("June", "2026-03-13T10:27"), {
    pieceId, version: await versionOf(cast, pieceId), checked: ["identity", "readings", "torque", "clean", "tray", "photos"],
    tray: [{ kind: "valves", fitted: 0, returned: 4, scrapped: 0 }, { kind: "springs", fitted: 0, returned: 4, scrapped: 0 }, { kind: "shims", fitted: 0, returned: 4, scrapped: 0 }],
  }), "release");
  await goHome(cast, "Hollis", "2026-03-13T16:30");
  await goHome(cast, "June", "2026-03-13T16:30");

  const issued = await bill(cast, "Priya", "2026-03-13T14:15", workOrderId);
  const balance = await paidByCard(cast, "2026-03-14T19:22", { invoiceId: issued.invoiceId }, issued.openMinor);
  must(await shipPieces(cast.as("Emeka", "2026-03-16T15:40"), { workOrderId, pieceIds: [pieceId], carrier: "Pell Parcel", service: "ground, insured", tracking: "PP-558120", insured: "3,200.00", cost: "36.40" }), "shipping");
  return { workOrderId, number: opened.number, pieceId, tag, invoiceId: issued.invoiceId, invoiceNumber: issued.number, deposit: deposit.paymentIntent, balance: balance.paymentIntent };
}

/** Parts issued to an order, in value. */
export async function issuedValue(cast: Cast, workOrderId: string): Promise<number> {
  const rows = await withShop(cast.shop.id, (tx) => tx.select({ v: workOrderParts.issuedValueMinor }).from(workOrderParts).where(and(eq(workOrderParts.shopId, cast.shop.id), eq(workOrderParts.workOrderId, workOrderId))));
  return rows.reduce((sum, r) => sum + r.v, 0);
}
