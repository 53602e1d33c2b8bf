import { recordBenchCheck } from "@/modules/flow/commands/gear";
import { postWholeTest } from "@/modules/flow/commands/post-test";
import { addDays } from "@/modules/kernel/instant";

import { startOperation } from "@/modules/work-orders/commands/bench-clock";
import { handOver } from "@/modules/work-orders/commands/hand-over";
import { issueAllReady } from "@/modules/work-orders/commands/parts";
import { openOrder } from "@/modules/work-orders/commands/open-order";
import { releasePiece } from "@/modules/work-orders/commands/release-piece";
import { must, type Cast } from "../cast";
import { bench } from "./bench-curves";
import { goHome, operationsOf, stretch } from "./bench-day";
import { offerLines } from "./hero";
import { answer, bill, bookIn, offer, paidByCard, versionOf } from "./orders";

/** How far a demo job has come. */
const REACHED = ["asked", "sent", "agreed", "booked in", "in work", "released", "invoiced", "paid", "gone"] as const;
export type Reached = (typeof REACHED)[number];

/** Who does what in the demo, by operation. */
const HANDS: Record<string, string> = {
  CLN: "Emeka", TDN: "Hollis", PRT: "Emeka", GDE: "Hollis", SER: "Hollis", FLB: "June", EPX: "Anselm", PIN: "Anselm", PEX: "Rosa", SEA: "Bram", LAP: "Bram", SPR: "Hollis", LSH: "Hollis", FLF: "June", ASM: "Hollis", INS: "June",
};

export interface JobPlan {
  customerId: string;
  mail: string;
  customer: string;
  family: string;
  opened: string;
  promised?: string;
  labor: readonly (readonly [string, string])[];
  shelf: readonly (readonly [string, string])[];
  to: Reached;
  pieces?: number;
  /** Operations finished on the first piece when it stops "in work". */
  done?: number;
  wants?: string;
}
export interface Gear { parts: Readonly<Record<string, string>>; benchId: string; fixtureId: string; hands?: Readonly<Record<string, string>>; counter: string; receiver: string; books: string; inspector: string }

/** Tells one job as far as it has come. Days follow the opening; figures follow from the plan, not from chance. */
export async function tellJob(cast: Cast, gear: Gear, plan: JobPlan, salt: number): Promise<{ number: string; workOrderId: string; pieceIds: string[] }> {
  const day = (n: number, time: string) => `${addDays(plan.opened, n)}T${time}`;
  const reached = (r: Reached) => REACHED.indexOf(plan.to) >= REACHED.indexOf(r);
  const count = plan.pieces ?? 1;
  const order = must(await openOrder(cast.as(gear.counter, day(0, "09:20")), {
    customerId: plan.customerId, use: salt % 3 === 0 ? "road" : "closed_course", wants: plan.wants ?? "As on the estimate.", promisedOn: plan.promised ?? "",
    pieces: Array.from({ length: count }, (_, i) => ({ family: plan.family, castingNumber: `${plan.family.slice(0, 2)}-${2000 + salt}`, serial: `${1000 + salt * 7 + i}`, declaredValue: String(900 + (salt % 9) * 250) })),
  }), "order");
  const out = { number: order.number, workOrderId: order.id, pieceIds: order.pieces.map((p) => p.id) };
  if (!reached("sent")) return out;

  const lines = out.pieceIds.flatMap((_, i) => offerLines(gear.parts, plan.labor, plan.shelf, i + 1));
  const { estimateId } = await offer(cast, gear.counter, day(0, "10:10"), order.id, { lines, discount: "0", freight: "0", deposit: "30", to: plan.mail });
  if (!reached("agreed")) return out;
  await answer(cast, estimateId, day(0, "11:40"), plan.customer);
  if (!reached("booked in")) return out;

  const tags: string[] = [];
  for (const id of out.pieceIds) tags.push(await bookIn(cast, gear.receiver, day(1, "09:30"), id, { counts: {} }));
  if (!reached("in work")) return out;

  for (const [i, pieceId] of out.pieceIds.entries()) {
    const ops = await operationsOf(cast, pieceId);
    const codes = plan.labor.map(([c]) => c);
    const upTo = reached("released") ? codes.length : i === 0 ? (plan.done ?? 0) : 0;
    let n = 2 + i;
    let minute = 8 * 60 + 5;
    const home = new Map<string, string>();
    for (const [k, code] of codes.slice(0, upTo).entries()) {
      const who = gear.hands?.[code] ?? HANDS[code] ?? "Hollis";
      const takes = 25 + ((salt * 13 + k * 29) % 70);
      if (minute + takes > 16 * 60) { n += 1; minute = 8 * 60 + 5; }
      const clock = (m: number) => `${String(Math.floor(m / 60)).padStart(2, "0")}:${String(m % 60).padStart(2, "0")}`;
      await stretch(cast, who, ops[code] ?? "", day(n, clock(minute)), day(n, clock(minute + takes)), true);
      if (code === "FLB" || code === "FLF") await flowed(cast, gear, day(n, clock(minute + takes - 2)), tags[i] ?? "", code === "FLB" ? "baseline" : "after", salt);
      home.set(who, day(n, clock(minute + takes + 1)));
      await goHome(cast, who, day(n, clock(minute + takes + 1)));
      minute += takes + 5;
    }
    if (reached("released")) {
      await issueAllReady(cast.as(gear.receiver, day(n, "16:05")), { workOrderId: order.id });
      must(await releasePiece(cast.as(gear.inspector, day(n, "16:20")), { pieceId, version: await versionOf(cast, pieceId), checked: ["identity", "readings", "torque", "clean", "tray", "photos"], tray: [] }), "release");
    }
  }
  if (!reached("invoiced")) return out;
  const n = 7 + out.pieceIds.length;
  const invoice = await bill(cast, gear.books, day(n, "09:15"), order.id, false);
  if (!reached("paid")) return out;
  await paidByCard(cast, day(n, "18:40"), { invoiceId: invoice.invoiceId }, invoice.openMinor);
  if (!reached("gone")) return out;
  must(await handOver(cast.as(gear.counter, day(n + 1, "10:00")), { workOrderId: order.id, pieceIds: out.pieceIds, to: plan.customer }), "hand-over");
  return out;
}

/** The clock runs on an operation from then on, as the floor shows it. */
export async function runsSince(cast: Cast, who: string, pieceId: string, code: string, at: string): Promise<void> {
  const ops = await operationsOf(cast, pieceId);
  must(await startOperation(cast.as(who, at), { operationId: ops[code] ?? "", doorIn: true, outOfOrderReason: "order of the day" }), `${who} on ${code}`);
}

async function flowed(cast: Cast, gear: Gear, at: string, tag: string, purpose: "baseline" | "after", salt: number): Promise<void> {
  must(await recordBenchCheck(cast.as(gear.inspector, at), { benchId: gear.benchId, isFine: true }), "bench check");
  for (const side of ["intake", "exhaust"] as const) {
    must(await postWholeTest(cast.as(gear.inspector, at), {
      tag, side, purpose, benchId: gear.benchId, fixtureId: gear.fixtureId, nominal: "28", camLift: "0.340", complete: true, liftUnit: "in", seatNote: purpose === "baseline" ? "on the cleaned original seats" : "on fresh seats",
      readings: bench(side, purpose, salt),
    }), `flow ${purpose}`);
  }
}

