import { describe, expect, it } from "vitest";
import type { BoardJob, ClockBoard } from "../board";
import { boardAfter, jobsFor } from "./kept-board";

const job = (operationId: string, more: Partial<BoardJob> = {}): BoardJob => ({
  operationId, tag: "T-1", operation: operationId, customer: "O. Brennan", family: "S250-4V", station: "porting", skill: "porting", bookMinutes: 60, doneMinutes: 10, note: "",
  readyAt: null, openBefore: null, waits: null, promisedOn: null, ...more,
});
const board: ClockBoard = {
  shop: { name: "Ninebark", zone: "America/Denver", locale: "en-US" }, device: { id: "d", name: "Bench 2" }, at: "2026-03-04T15:00:00Z", sealKey: "",
  people: [{ id: "p", name: "Anselm", initials: "AQ", skills: ["porting"], hasPin: true, badgeDigest: null, door: "out", doorSince: null, todayMinutes: 0, running: null }],
  jobs: [job("seats", { tag: "T-2", skill: "seat" }), job("intake"), job("exhaust", { openBefore: "intake" }), job("clean", { tag: "T-3", skill: "wash" })],
};
const at = (t: string) => `2026-03-04T${t}Z`;
const after = (...presses: [press: Parameters<typeof boardAfter>[1]["press"], t: string, operationId?: string, work?: string][]) =>
  presses.reduce((b, [press, t, operationId, work]) => boardAfter(b, { press, personId: "p", at: at(t), ...(operationId ? { operationId } : {}), ...(work ? { work } : {}) }), board);
const me = (b: ClockBoard) => b.people[0];

describe("a board without a link", () => {
  it("clocks in with the first start and counts what was switched away from", () => {
    const b = after(["startOperation", "15:00:00", "intake"], ["switchTo", "15:42:00", "exhaust"]);
    expect(me(b)).toMatchObject({ door: "in", doorSince: at("15:00:00"), running: { operationId: "exhaust", since: at("15:42:00") } });
    expect(b.jobs.find((j) => j.operationId === "intake")?.doneMinutes).toBe(52);
  });
  it("ends both clocks going out, and adds the day up", () => {
    const b = after(["doorIn", "15:00:00"], ["startIndirect", "15:10:00", undefined, "clean-up"], ["mealOut", "16:00:00"], ["mealIn", "16:30:00"], ["doorOut", "17:00:00"]);
    expect(me(b)).toMatchObject({ door: "out", todayMinutes: 90, running: null });
  });
  it("takes a finished operation off the list", () => {
    expect(after(["startOperation", "15:00:00", "intake"], ["operationDone", "15:30:00"]).jobs.map((j) => j.operationId)).toEqual(["seats", "exhaust", "clean"]);
  });
  it("leaves the rest alone for somebody it does not know", () => expect(boardAfter(board, { press: "doorIn", personId: "q", at: at("15:00:00") })).toBe(board));
  it("puts one's own skill first, and the head one is on before others", () => {
    const b = after(["startOperation", "15:00:00", "intake"]);
    const p = me(b);
    expect(p && jobsFor(b, p).map((j) => j.operationId)).toEqual(["exhaust", "seats", "clean"]);
  });
});
