import { addDays } from "@/modules/kernel/instant";
import { startOperation } from "@/modules/work-orders/commands/bench-clock";
import { handOver } from "@/modules/work-orders/commands/hand-over";
import { issueAllReady } from "@/modules/work-orders/commands/parts";
import { openOrder } from "@/modules/work-orders/commands/open-order";
import { releasePiece } from "@/modules/work-orders/commands/release-piece";
import { must, type Cast } from "../cast";
import { BENCH_STORIES, ORDINARY, type BenchStory } from "../facts/bench-stories";
import { goHome, operationsOf, stretch } from "./bench-day";
import { flowHead, noteWork, type Pass } from "./flowed";
import type { BenchRoom } from "./gear";
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
  /** Of the head; a bench story of this job names its own. */
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
export interface Gear { parts: Readonly<Record<string, string>>; room: BenchRoom; hands?: Readonly<Record<string, string>>; counter: string; receiver: string; books: string; inspector: string }

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

  const story = BENCH_STORIES[salt] ?? { ...ORDINARY, family: plan.family };
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
      const pass = passAfter(code, story);
      if (pass) await flowHead(cast, gear.room, gear.inspector, day(n, clock(minute + takes - 2)), { tag: tags[i] ?? "" }, pass, story, salt + i * 100);
      const done = code === "FLF" ? story : code === "SEA" && !codes.includes("FLF") ? SEATS_ONLY : null;
      if (done) await noteWork(cast, gear.inspector, day(n, clock(minute + takes - 1)), pieceId, done);
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

const SEATS_ONLY: Pick<BenchStory, "work" | "words"> = { work: ["seat"], words: "Seats cut and lapped, ports untouched." };

/** The pass that is flowed when an operation is done; null = the bench is not asked. */
function passAfter(code: string, story: BenchStory): Pass | null {
  if (code === "FLB") return { purpose: "baseline", share: 0 };
  if (code === "FLF") return { purpose: "after", share: 1 };
  const share = story.passes[code];
  return share === undefined ? null : { purpose: "interim", share };
}
