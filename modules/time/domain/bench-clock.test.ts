import { describe, expect, it } from "vitest";
import { punchBench, type BenchPunch, type BenchState, type BenchWork } from "./bench-clock";

const at = (hhmm: string) => new Date(`2026-03-10T${hhmm}:00Z`);
const NOW = at("12:00");
const op = (operationId: string, more: Partial<Extract<BenchWork, { kind: "operation" }>> = {}): BenchWork => ({
  kind: "operation", operationId, label: `Operation ${operationId}`, ...more,
});
const idle: BenchState = { isIn: true, open: null };
const running: BenchState = { isIn: true, open: { work: op("PEX"), startedAt: at("08:05") } };
const start = (work: BenchWork, t = "08:05", more: { leadReason?: string; outOfOrderReason?: string } = {}): BenchPunch => ({ kind: "start", at: at(t), work, ...more });

describe("bench clock", () => {
  it("starts, switches in the same second and is done", () => {
    const started = punchBench(idle, start(op("PEX")), NOW);
    expect(started).toEqual({ ok: true, value: { closed: null, open: { work: op("PEX"), startedAt: at("08:05") }, flags: [] } });

    const switched = punchBench(running, { kind: "switch", at: at("11:20"), work: op("SEA") }, NOW);
    expect(switched).toMatchObject({
      ok: true,
      value: { closed: { minutes: 195, endedAt: at("11:20"), isOperationDone: false }, open: { startedAt: at("11:20"), work: { operationId: "SEA" } } },
    });

    expect(punchBench(running, { kind: "done", at: at("11:20") }, NOW)).toMatchObject({ ok: true, value: { closed: { minutes: 195, isOperationDone: true }, open: null } });
    expect(punchBench(running, { kind: "stop", at: at("11:20") }, NOW)).toMatchObject({ ok: true, value: { closed: { isOperationDone: false }, open: null } });
  });

  it("says since when the same operation is running", () => {
    expect(punchBench(running, start(op("PEX"), "09:00"), NOW)).toMatchObject({
      ok: false, refusal: { code: "ALREADY_RUNNING", data: { since: "2026-03-10T08:05:00.000Z" } },
    });
    const waiting: BenchState = { isIn: true, open: { work: { kind: "indirect", work: "waiting for parts" }, startedAt: at("08:00") } };
    expect(punchBench(waiting, { kind: "switch", at: at("09:00"), work: { kind: "indirect", work: "waiting for parts" } }, NOW)).toMatchObject({ refusal: { code: "ALREADY_RUNNING" } });
    expect(punchBench(waiting, { kind: "switch", at: at("09:00"), work: op("PEX") }, NOW)).toMatchObject({ ok: true });
  });

  it("offers the door when the person is out, and the switch when something else runs", () => {
    expect(punchBench({ isIn: false, open: null }, start(op("PEX")), NOW)).toMatchObject({ refusal: { code: "NOT_IN", data: { offersClockIn: true } } });
    expect(punchBench(running, start(op("SEA"), "09:00"), NOW)).toMatchObject({ refusal: { code: "OTHER_RUNNING", data: { offersSwitch: true } } });
  });

  it("can be stopped after the person went out at the door", () => {
    expect(punchBench({ ...running, isIn: false }, { kind: "stop", at: at("11:00") }, NOW)).toMatchObject({ ok: true, value: { closed: { minutes: 175 } } });
  });

  it.each([["stop"], ["done"]] as const)("has nothing to %s when idle", (kind) => {
    expect(punchBench(idle, { kind, at: at("09:00") }, NOW)).toMatchObject({ refusal: { code: "NOTHING_RUNNING" } });
  });

  it("has nothing to switch from when idle, and no done for indirect work", () => {
    expect(punchBench(idle, { kind: "switch", at: at("09:00"), work: op("PEX") }, NOW)).toMatchObject({ refusal: { code: "NOTHING_RUNNING" } });
    const cleaning: BenchState = { isIn: true, open: { work: { kind: "indirect", work: "clean-up" }, startedAt: at("08:00") } };
    expect(punchBench(cleaning, { kind: "done", at: at("09:00") }, NOW)).toMatchObject({ refusal: { code: "NOT_AN_OPERATION" } });
  });

  it("waits for the cure unless a lead gives a reason", () => {
    const filled = op("PIN", { readyAt: at("09:30") });
    expect(punchBench(idle, start(filled), NOW)).toMatchObject({ refusal: { code: "CURE_NOT_OVER", field: "leadReason", data: { minutesLeft: 85 } } });
    expect(punchBench(idle, start(filled, "08:05", { leadReason: "  " }), NOW)).toMatchObject({ ok: false });
    expect(punchBench(idle, start(filled, "08:05", { leadReason: "test coupon is hard" }), NOW)).toMatchObject({ ok: true, value: { flags: ["cure overridden"] } });
    expect(punchBench(idle, start(filled, "09:30"), NOW)).toMatchObject({ ok: true, value: { flags: [] } });
  });

  it("asks why when an operation before this one is open", () => {
    const early = op("PEX", { openBefore: "Baseline flow" });
    expect(punchBench(idle, start(early), NOW)).toMatchObject({ refusal: { code: "OUT_OF_ORDER", field: "outOfOrderReason" } });
    expect(punchBench(idle, start(early, "08:05", { outOfOrderReason: "bench is down" }), NOW)).toMatchObject({ ok: true, value: { flags: ["out of order"] } });
  });

  it("takes no time on a piece that is gone or an operation that is done", () => {
    expect(punchBench(idle, start(op("PEX", { isPieceGone: true })), NOW)).toMatchObject({ refusal: { code: "PIECE_GONE", data: { offersClaim: true } } });
    expect(punchBench(idle, start(op("PEX", { isDone: true })), NOW)).toMatchObject({ refusal: { code: "OPERATION_DONE" } });
  });

  it("believes a device two minutes ahead, not three, and no time before the start", () => {
    expect(punchBench(idle, start(op("PEX"), "12:02"), NOW)).toMatchObject({ ok: true });
    expect(punchBench(idle, start(op("PEX"), "12:03"), NOW)).toMatchObject({ refusal: { code: "FUTURE_TIME", field: "at" } });
    expect(punchBench(running, { kind: "stop", at: at("08:00") }, NOW)).toMatchObject({ refusal: { code: "BEFORE_LAST_PUNCH", field: "at" } });
  });

  it("flags an entry of more than sixteen hours and still closes it", () => {
    const forgotten: BenchState = { isIn: true, open: { work: op("PEX"), startedAt: new Date("2026-03-09T15:00:00Z") } };
    expect(punchBench(forgotten, { kind: "stop", at: at("08:00") }, NOW)).toMatchObject({ ok: true, value: { closed: { minutes: 1020 }, flags: ["longer than 16 h"] } });
    expect(punchBench(forgotten, { kind: "stop", at: at("07:00") }, NOW)).toMatchObject({ ok: true, value: { flags: [] } });
  });
});
