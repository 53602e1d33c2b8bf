import { and, eq } from "drizzle-orm";
import { beforeAll, describe, expect, it } from "vitest";
import { findings, operations, timeEntries } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { doorIn, doorOut } from "@/modules/time/commands/door";
import { startIndirect, stopClock } from "@/modules/time/commands/indirect";
import { hoursText } from "@/modules/time/domain/elapsed";
import { laborOf, minutesByOperation, minutesByPerson } from "@/modules/time/queries/minutes";
import type { NewPerson } from "@/seed/found-shop";
import { benchJob, type BenchJob } from "@/tests/support/bench-job";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { operationDone, reopenOperation, startOperation, switchTo } from "./commands/bench-clock";

let a: TestShop;
let b: TestShop;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); });

const code = (r: { ok: boolean }) => (r as { refusal?: { code: string } }).refusal?.code ?? "ok";

describe("the bench clock", () => {
  it("runs only while in at the door, and offers to clock in", async () => {
    const job = await benchJob(a, ["intake"]);
    const at = a.as("tech", "2026-03-02T15:00:00Z");
    const refused = await startOperation(at, { operationId: job.op("intake") });
    expect(refused).toMatchObject({ ok: false, refusal: { code: "NOT_IN", data: { offersClockIn: true } } });
    must(await startOperation(at, { operationId: job.op("intake"), doorIn: true }));
    must(await doorOut(a.as("tech", "2026-03-02T16:00:30Z"), {}));
    expect(await minutesByOperation(a.as("lead"), job.workOrderId)).toMatchObject([{ operationId: job.op("intake"), minutes: 60, people: ["tech"], running: [] }]);
  });

  it("says since when for a double start, asks to switch, and switches in the same second", async () => {
    const job = await benchJob(a, ["intake", "exhaust"]);
    const day = (t: string) => a.as("insp", `2026-03-02T${t}Z`);
    must(await doorIn(day("15:00:00"), {}));
    must(await startOperation(day("15:12:00"), { operationId: job.op("intake") }));
    expect(await startOperation(day("15:20:00"), { operationId: job.op("intake") })).toMatchObject({ ok: false, refusal: { code: "ALREADY_RUNNING", data: { since: "2026-03-02T15:12:00.000Z" } } });
    expect(code(await startOperation(day("15:20:00"), { operationId: job.op("exhaust") }))).toBe("OTHER_RUNNING");
    must(await switchTo(day("15:30:40"), { operationId: job.op("exhaust") }));
    must(await startIndirect(day("15:45:10"), { work: "break" }));
    must(await stopClock(day("16:00:00"), {}));
    const rows = await withShop(a.shop.id, (tx) => tx.select({ s: timeEntries.startedAt, e: timeEntries.endedAt }).from(timeEntries)
      .where(and(eq(timeEntries.personId, a.people.insp ?? ""), eq(timeEntries.clock, "bench"))).orderBy(timeEntries.startedAt));
    expect(rows.map((r) => [r.s.toISOString().slice(11, 19), r.e?.toISOString().slice(11, 19)])).toEqual([["15:12:00", "15:30:40"], ["15:30:40", "15:45:10"], ["15:45:10", "16:00:00"]]);
    expect(code(await stopClock(day("16:01:00"), {}))).toBe("NOTHING_RUNNING");
  });

  it("takes two taps of one press as one", async () => {
    const job = await benchJob(a, ["intake"]);
    must(await doorIn(a.as("rcv", "2026-03-02T15:00:00Z"), {}));
    const key = requestId();
    const tap = () => startOperation(a.as("rcv", "2026-03-02T15:05:00Z"), { operationId: job.op("intake") }, { requestId: key });
    const taps = await Promise.all(Array.from({ length: 20 }, tap));
    expect(taps.every((t) => t.ok)).toBe(true);
    expect(await behindTheCurtain(`select count(*) from time_entries where operation_id = '${job.op("intake")}'`)).toEqual(["1"]);
    expect(await behindTheCurtain(`select count(*) from punches where operation_id = '${job.op("intake")}'`)).toEqual(["1"]);
  });

  it("waits for a cure, and lets only a lead override it with a reason", async () => {
    const job = await benchJob(a, [{ code: "intake-finish", notBefore: new Date("2026-03-03T18:30:00Z") }]);
    const at = "2026-03-03T18:10:00Z";
    must(await doorIn(a.as("lead", "2026-03-03T15:00:00Z"), {}));
    must(await doorIn(a.as("tech", "2026-03-03T15:00:00Z"), {}));
    const asked = { operationId: job.op("intake-finish") };
    expect(await startOperation(a.as("tech", at), asked)).toMatchObject({ ok: false, refusal: { code: "CURE_NOT_OVER", data: { minutesLeft: 20 } } });
    expect(code(await startOperation(a.as("tech", at), { ...asked, leadReason: "feels hard" }))).toBe("LEAD_ONLY");
    expect(must(await startOperation(a.as("lead", at), { ...asked, leadReason: "Test cup is through" })).flags).toEqual(["cure overridden"]);
    must(await startOperation(a.as("tech", "2026-03-03T18:30:00Z"), asked));
  });

  it("warns of an open predecessor and goes ahead with a reason", async () => {
    const job = await benchJob(a, ["clean", { code: "pressure-test", needsBefore: ["clean"] }]);
    must(await doorIn(a.as("mgr", "2026-03-03T15:00:00Z"), {}));
    const asked = { operationId: job.op("pressure-test") };
    expect(await startOperation(a.as("mgr", "2026-03-03T15:10:00Z"), asked)).toMatchObject({ ok: false, refusal: { code: "OUT_OF_ORDER", field: "outOfOrderReason" } });
    expect(must(await startOperation(a.as("mgr", "2026-03-03T15:10:00Z"), { ...asked, outOfOrderReason: "Washer is down" })).flags).toEqual(["out of order"]);
  });

  it("does not start while a finding that stops the work is unanswered", async () => {
    const job = await benchJob(a, ["intake"]);
    await withShop(a.shop.id, (tx) => tx.insert(findings).values({
      shopId: a.shop.id, id: requestId(), pieceId: job.pieceId, workOrderId: job.workOrderId, words: "Crack at the plug", foundAt: new Date("2026-03-03T15:00:00Z"), goOnMeanwhile: false,
    }));
    expect(code(await startOperation(a.as("mgr", "2026-03-03T16:10:00Z"), { operationId: job.op("intake") }))).toBe("NOT_AGREED");
  });

  it("is done once, and what a lead reopens is rework", async () => {
    const job = await benchJob(a, ["seats"]);
    const day = (who: string, t: string) => a.as(who, `2026-03-04T${t}Z`);
    must(await doorIn(day("owner", "15:00:00"), {}));
    must(await startOperation(day("owner", "15:10:00"), { operationId: job.op("seats") }));
    must(await operationDone(day("owner", "15:40:00"), {}));
    const [op] = await withShop(a.shop.id, (tx) => tx.select().from(operations).where(eq(operations.id, job.op("seats"))));
    expect([op?.startedAt?.toISOString(), op?.doneAt?.toISOString(), op?.doneBy]).toEqual(["2026-03-04T15:10:00.000Z", "2026-03-04T15:40:00.000Z", a.people.owner]);
    expect(code(await startOperation(day("owner", "15:50:00"), { operationId: job.op("seats") }))).toBe("OPERATION_DONE");
    await expect(reopenOperation(day("tech", "15:55:00"), { operationId: job.op("seats"), reason: "Run-out" })).rejects.toThrow(NotFound);
    must(await reopenOperation(day("mgr", "15:55:00"), { operationId: job.op("seats"), reason: "Run-out on seat 2" }));
    must(await startOperation(day("owner", "16:00:00"), { operationId: job.op("seats") }));
    must(await operationDone(day("owner", "16:07:00"), {}));
    expect(await minutesByOperation(a.as("lead"), job.workOrderId)).toMatchObject([{ minutes: 37, reworkMinutes: 7 }]);
  });

  it("knows nothing of another shop's operation", async () => {
    const job = await benchJob(a, ["intake"]);
    must(await doorIn(b.as("tech", "2026-03-04T15:00:00Z"), {}));
    expect(code(await startOperation(b.as("tech", "2026-03-04T15:10:00Z"), { operationId: job.op("intake") }))).toBe("NOT_FOUND");
    expect(await minutesByOperation(b.as("owner"), job.workOrderId)).toEqual([]);
    expect(await behindTheCurtain(`select count(*) from time_entries where operation_id = '${job.op("intake")}'`)).toEqual(["0"]);
  });
});

/** Bench times of docs/hero-job.md: day, person, operation, from, to (wall clock in America/Denver). */
const HERO: [day: string, who: string, op: string, from: string, to: string, isDone?: boolean][] = [
  ["02-25", "Emeka", "clean", "08:10", "08:38", true], ["02-25", "Hollis", "teardown", "09:05", "10:12", true],
  ["02-26", "Emeka", "pressure-test", "08:20", "08:58", true], ["02-26", "June", "baseline-flow", "09:30", "10:26", true],
  ["03-03", "Hollis", "guides", "13:15", "14:07", true], ["03-04", "Anselm", "intake", "08:00", "11:05"],
  ["03-07", "Anselm", "epoxy", "10:25", "11:30", true], ["03-09", "Anselm", "intake", "08:15", "09:50", true],
  ["03-10", "Rosa", "exhaust", "08:05", "11:20", true], ["03-11", "Bram", "seats", "08:00", "09:48", true],
  ["03-12", "Bram", "lap", "08:10", "08:52", true], ["03-12", "Hollis", "springs", "09:00", "09:45", true], ["03-12", "June", "final-flow", "10:15", "11:12", true],
  ["03-13", "Hollis", "lash", "08:05", "08:43", true], ["03-13", "Hollis", "assembly", "08:45", "09:36", true], ["03-13", "June", "inspection", "10:00", "10:27", true],
];
const RATES = { Emeka: 1900, Hollis: 2950, June: 3000, Anselm: 3800, Rosa: 3100, Bram: 2800 };

describe("the hero job's bench time", () => {
  let shop: TestShop;
  let job: BenchJob;
  // Denver is UTC-7 until 2026-03-08 02:00, then UTC-6.
  const utc = (day: string, t: string) => new Date(`2026-${day}T${t}:00${day < "03-08" ? "-07:00" : "-06:00"}`).toISOString();

  beforeAll(async () => {
    const people: NewPerson[] = Object.entries(RATES).map(([name, rateMinor]) => ({ name, shortName: name, roles: ["technician"], rateMinor }));
    shop = await testShop("hero", { people: [...people, { name: "Olive", shortName: "owner", roles: ["owner"] }] });
    job = await benchJob(shop, [...new Set(HERO.map((h) => h[2]))], "260224-07");
    for (const [day, who, op, from, to, isDone] of HERO) {
      const operationId = job.op(op);
      must(await startOperation(shop.as(who, utc(day, from)), { operationId, doorIn: true }));
      if (op === "epoxy") {
        // Cure of 24 h from the end of mixing, across the night the clocks go forward.
        const ready = new Date("2026-03-08T18:30:00Z");
        await withShop(shop.shop.id, (tx) => tx.update(operations).set({ notBefore: ready }).where(and(eq(operations.shopId, shop.shop.id), eq(operations.id, job.op("intake")))));
      }
      must(isDone ? await operationDone(shop.as(who, utc(day, to)), {}) : await stopClock(shop.as(who, utc(day, to)), {}));
      if (op === "epoxy") {
        expect(await startOperation(shop.as("Anselm", "2026-03-08T18:29:00Z"), { operationId: job.op("intake") })).toMatchObject({ ok: false, refusal: { code: "CURE_NOT_OVER", data: { minutesLeft: 1 } } });
      }
    }
  });

  it("comes to 1,149 minutes, 19.15 h", async () => {
    const all = await minutesByOperation(shop.as("owner", "2026-03-13T20:00:00Z"), job.workOrderId);
    const sum = all.reduce((n, o) => n + o.minutes, 0);
    expect(sum).toBe(1149);
    expect(hoursText(sum)).toBe("19.15");
    const of = (c: string) => all.find((o) => o.operationId === job.op(c))?.minutes;
    expect([of("clean"), of("teardown"), of("intake"), of("epoxy"), of("exhaust"), of("assembly")]).toEqual([28, 67, 280, 65, 195, 51]);
  });

  it("is shared by person as the record says, and costs 604.54 before burden", async () => {
    const shares = await withShop(shop.shop.id, (tx) => laborOf({ ...shop.as("owner", "2026-03-13T20:00:00Z"), tx }, job.workOrderId));
    expect(Object.fromEntries(shares.map((s) => [s.shortName, [s.minutes, s.costMinor]]))).toEqual({
      Emeka: [66, 2090], Hollis: [253, 12439], June: [140, 7000], Anselm: [345, 21850], Rosa: [195, 10075], Bram: [150, 7000],
    });
    expect(shares.reduce((n, s) => n + s.costMinor, 0)).toBe(60454);
  });

  it("shows rates to the owner and to nobody at the bench", async () => {
    const seen = await minutesByPerson(shop.as("Anselm", "2026-03-13T20:00:00Z"), job.workOrderId);
    expect(seen.find((s) => s.name === "Anselm")).toEqual({ personId: shop.people.Anselm, name: "Anselm", minutes: 345 });
    expect((await minutesByPerson(shop.as("owner", "2026-03-13T20:00:00Z"), job.workOrderId)).find((s) => s.name === "Anselm")?.rateMinor).toBe(3800);
  });
});
