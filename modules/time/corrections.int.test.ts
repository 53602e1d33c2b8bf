import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { benchJob } from "@/tests/support/bench-job";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { acceptCorrection, askCorrection, enterTime, refuseCorrection, setAsideEntry, settlePunch } from "./commands/corrections";
import { doorIn, doorOut } from "./commands/door";
import { addPerson, changePerson, leaveShop, setBadge, setPin, setRate } from "./commands/people";
import { laborOf, minutesByOperation } from "./queries/minutes";
import { peopleAt } from "./queries/people-at";
import { getPerson } from "./queries/settings-lists";
import { toLookAt } from "./queries/to-look-at";
import { weekSheet } from "./queries/week-sheet";
import { withShop } from "@/db/scope";

let a: TestShop;
let b: TestShop;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); });

const code = (r: { ok: boolean }) => (r as { refusal?: { code: string } }).refusal?.code ?? "ok";
const id = (who: string) => a.people[who] ?? "";
const NOW = "2026-03-09T20:00:00Z";
const door = (start: string, end: string, more = {}) => ({ clock: "door" as const, start, end, reason: "Forgot to clock out", ...more });

describe("time entered after the fact", () => {
  it("is a lead's to enter for another, with a reason, and counts on the job", async () => {
    const job = await benchJob(a, ["clean"]);
    const input = { personId: id("rcv"), clock: "bench" as const, operationId: job.op("clean"), start: "2026-02-25T08:10", end: "2026-02-25T08:38", reason: "Tablet was away", isDone: true };
    await expect(enterTime(a.as("tech", NOW), input)).rejects.toThrow(NotFound);
    expect(await enterTime(a.as("lead", NOW), { ...input, reason: " " })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "reason" }] } });
    must(await enterTime(a.as("lead", NOW), input));
    expect(await minutesByOperation(a.as("owner", NOW), job.workOrderId)).toMatchObject([{ minutes: 28, people: ["rcv"] }]);
    expect(await behindTheCurtain(`select done_by::text from operations where id = '${job.op("clean")}'`)).toEqual([id("rcv")]);
    expect(code(await enterTime(a.as("lead", NOW), { ...input, start: "2026-02-25T08:30", end: "2026-02-25T09:00" }))).toBe("TIME_OVERLAPS");
    expect(code(await enterTime(a.as("lead", NOW), { ...input, personId: id("lead") }))).toBe("OWN_TIME");
    expect(code(await enterTime(b.as("lead", NOW), input))).toBe("NOT_FOUND");
    expect(await enterTime(a.as("lead", NOW), { ...input, start: "2026-03-08T02:30", end: "2026-03-08T04:00" })).toMatchObject({ ok: false, refusal: { code: "TIME_DOES_NOT_EXIST", field: "start", data: { before: "01:59", after: "03:00" } } });
  });

  it("needs one kind of work for the bench clock", async () => {
    const r = await enterTime(a.as("lead", NOW), { personId: id("rcv"), clock: "bench", start: "2026-02-26T08:10", end: "2026-02-26T08:38", reason: "Tablet was away" });
    expect(r).toMatchObject({ ok: false, refusal: { fields: [{ path: "indirect" }] } });
  });

  it("keeps the rate of its day for cost", async () => {
    const job = await benchJob(a, ["seats"]);
    must(await setRate(a.as("owner", NOW), { personId: id("insp"), validFrom: "2026-03-05", rate: "36.00" }));
    for (const day of ["04", "05"]) must(await enterTime(a.as("lead", NOW), { personId: id("insp"), clock: "bench", operationId: job.op("seats"), start: `2026-03-${day}T09:00`, end: `2026-03-${day}T10:00`, reason: "Tablet was away" }));
    const shares = await withShop(a.shop.id, (tx) => laborOf({ ...a.as("owner", NOW), tx }, job.workOrderId));
    expect(shares.map((s) => [s.minutes, s.rateMinor, s.costMinor])).toEqual([[60, 3000, 3000], [60, 3600, 3600]]);
  });
});

describe("a correction", () => {
  it("is asked, accepted by another, and leaves both rows to be seen", async () => {
    must(await doorIn(a.as("counter", "2026-03-03T15:00:00Z"), {}));
    must(await doorOut(a.as("counter", "2026-03-04T02:00:00Z"), {}));
    const [old] = await behindTheCurtain(`select id from time_entries where person_id = '${id("counter")}'`);
    const asked = must(await askCorrection(a.as("counter", NOW), door("2026-03-03T08:00", "2026-03-03T16:30", { timeEntryId: old })));
    expect((await toLookAt(a.as("book", NOW))).asked).toMatchObject([{ name: "counter", reason: "Forgot to clock out", replaces: { endedAt: "2026-03-04T02:00:00.000Z" } }]);
    await expect(acceptCorrection(a.as("counter", NOW), { id: asked.id })).rejects.toThrow(NotFound);
    expect(code(await acceptCorrection(b.as("lead", NOW), { id: asked.id }))).toBe("ALREADY_ANSWERED");
    must(await acceptCorrection(a.as("lead", NOW), { id: asked.id }));
    expect(code(await acceptCorrection(a.as("mgr", NOW), { id: asked.id }))).toBe("ALREADY_ANSWERED");
    const day = (await weekSheet(a.as("counter", NOW), { date: "2026-03-03" })).days[1];
    expect(day?.doorMinutes).toBe(510);
    expect(day?.entries.map((e) => [e.minutes, e.isReplaced, e.source])).toEqual([[660, true, "desk"], [510, false, "correction"]]);
    expect(await behindTheCurtain(`select count(*) from punches where person_id = '${id("counter")}' and kind in ('in', 'out')`)).toEqual(["2"]);
  });

  it("is never accepted by the one who asked, lead or not, nor taken twice", async () => {
    const asked = must(await askCorrection(a.as("lead", NOW), door("2026-03-05T08:00", "2026-03-05T16:00")));
    expect(code(await acceptCorrection(a.as("lead", NOW), { id: asked.id }))).toBe("OWN_TIME");
    must(await refuseCorrection(a.as("mgr", NOW), { id: asked.id, reason: "You were away that day" }));
    expect(code(await acceptCorrection(a.as("mgr", NOW), { id: asked.id }))).toBe("ALREADY_ANSWERED");
    expect((await weekSheet(a.as("lead", NOW), { date: "2026-03-05" })).doorMinutes).toBe(0);
  });

  it("is allowed alone, and marked so, where there is nobody else", async () => {
    const alone = await testShop("alone", { people: [{ name: "Uma", shortName: "uma", roles: ["owner"], rateMinor: 3000 }, { name: "Teo", shortName: "teo", roles: ["technician"] }] });
    const asked = must(await askCorrection(alone.as("uma", NOW), door("2026-03-05T08:00", "2026-03-05T16:00")));
    must(await acceptCorrection(alone.as("uma", NOW), { id: asked.id }));
    const sheet = await weekSheet(alone.as("uma", NOW), { date: "2026-03-05" });
    expect(sheet.days[3]?.entries[0]?.reason).toBe("alone: Forgot to clock out");
    expect(sheet.pay).toEqual({ straightMinor: 24_000, premiumMinor: 0, totalMinor: 24_000 });
  });
});

describe("the week", () => {
  it("of 44.25 h at 38.00 forms 4.25 h of overtime, and pay for those who may see it", async () => {
    // The record's week of 2026-03-02: five days of 8 h and 4.25 h on Saturday; 1,762.25 in all.
    for (const [day, to] of [["02", "16:00"], ["03", "16:00"], ["04", "16:00"], ["05", "16:00"], ["06", "16:00"], ["07", "12:15"]] as const) {
      must(await enterTime(a.as("mgr", NOW), { personId: id("tech"), ...door(`2026-03-${day}T08:00`, `2026-03-${day}T${to}`) }));
    }
    const own = await weekSheet(a.as("tech", NOW), { date: "2026-03-04" });
    expect([own.doorMinutes, own.overtimeMinutes, own.pay?.totalMinor, own.pay?.premiumMinor]).toEqual([2655, 255, 176_225, 8_075]);
    expect((await weekSheet(a.as("mgr", NOW), { personId: id("tech"), date: "2026-03-04" })).pay).toBeNull();
    await expect(weekSheet(a.as("tech", NOW), { personId: id("lead") })).rejects.toThrow(NotFound);
    await expect(weekSheet(b.as("owner", NOW), { personId: id("tech") })).rejects.toThrow(NotFound);
    expect(own.days[0]).toMatchObject({ unexplainedMinutes: 480, asks: "what was done" });
  });

  it("says who is in, and puts a forgotten out first", async () => {
    must(await doorIn(a.as("book", "2026-03-06T15:00:00Z"), {}));
    must(await doorIn(a.as("mgr", "2026-03-09T14:00:00Z"), {}));
    const now = await peopleAt(a.as("tech", NOW));
    expect(now.filter((p) => p.isIn).map((p) => [p.shortName, p.isOutMissing, p.todayMinutes > 300])).toEqual([["book", true, true], ["mgr", false, true]]);
    expect((await toLookAt(a.as("mgr", NOW))).open.map((o) => o.name)).toEqual(["book"]);
    await expect(toLookAt(a.as("tech", NOW))).rejects.toThrow(NotFound);
  });

  it("settles a flagged punch once, and sets an entry aside with a reason", async () => {
    must(await doorOut(a.as("owner", "2026-03-06T23:00:00Z"), {}));
    const [flagged] = (await toLookAt(a.as("mgr", NOW))).flagged;
    expect(flagged).toMatchObject({ name: "owner", flag: "in missing" });
    must(await settlePunch(a.as("mgr", NOW), { id: flagged?.id ?? "", note: "Came at eight" }));
    expect((await toLookAt(a.as("mgr", NOW))).flagged).toEqual([]);
    const entry = must(await enterTime(a.as("mgr", NOW), { personId: id("owner"), ...door("2026-03-06T08:00", "2026-03-06T16:00") }));
    must(await setAsideEntry(a.as("mgr", NOW), { id: entry.id, reason: "Was a day off" }));
    expect(code(await setAsideEntry(a.as("mgr", NOW), { id: entry.id, reason: "Was a day off" }))).toBe("NOT_FOUND");
    expect((await weekSheet(a.as("owner", NOW), { date: "2026-03-06" })).doorMinutes).toBe(0);
  });
});

describe("people of the shop", () => {
  it("are the owner's to add and change; badge and PIN the manager's; rates never the manager's to see", async () => {
    await expect(addPerson(a.as("mgr", NOW), { name: "New Hand", shortName: "New", roles: ["technician"] })).rejects.toThrow(NotFound);
    const { id: person } = must(await addPerson(a.as("owner", NOW), { name: "New Hand", shortName: "New", roles: ["technician"], skills: "Porting, seat machine" }));
    must(await changePerson(a.as("owner", NOW), { id: person, version: 1, name: "New Hand", shortName: "Newt", roles: ["technician"] }));
    expect(code(await changePerson(a.as("owner", NOW), { id: person, version: 1, name: "Late", shortName: "Late", roles: ["technician"] }))).toBe("CHANGED_MEANWHILE");
    expect(code(await setBadge(a.as("mgr", NOW), { id: person, badgeCode: "B-03" }))).toBe("BADGE_TAKEN");
    must(await setBadge(a.as("mgr", NOW), { id: person, badgeCode: "B-77" }));
    expect(await setPin(a.as("mgr", NOW), { id: person, pin: "123456" })).toMatchObject({ ok: false, refusal: { fields: [{ path: "pin" }] } });
    must(await setPin(a.as("mgr", NOW), { id: person, pin: "805317" }, { requestId: requestId() }));
    await expect(setRate(a.as("mgr", NOW), { personId: person, validFrom: "2026-03-01", rate: "20" })).rejects.toThrow(NotFound);
    must(await setRate(a.as("owner", NOW), { personId: person, validFrom: "2026-03-01", rate: "20,50" }));
    expect((await getPerson(a.as("mgr", NOW), person)).rates).toBeNull();
    expect((await getPerson(a.as("owner", NOW), person)).rates).toEqual([{ validFrom: "2026-03-01", rateMinor: 2050 }]);
    expect(await behindTheCurtain("select count(*) from audit_log where detail::text ~ '805317|B-77'")).toEqual(["0"]);
    must(await leaveShop(a.as("owner", NOW), { id: person }));
    expect(await getPerson(a.as("owner", NOW), person)).toMatchObject({ hasBadge: false, pin: "none", shortName: "Newt" });
    expect(code(await leaveShop(a.as("owner", NOW), { id: id("owner") }))).toBe("OWN_LEAVING");
    expect(code(await setPin(b.as("owner", NOW), { id: id("tech"), pin: "805317" }))).toBe("NOT_FOUND");
  });
});
