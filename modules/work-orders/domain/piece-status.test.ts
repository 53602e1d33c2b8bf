import { describe, expect, it } from "vitest";
import { orderStatus, pieceStatus, type PieceStatusFacts } from "./piece-status";

const NOW = "2026-03-08T17:00:00Z";
const TODAY = "2026-03-08";
const op = (sequence: number, station: "Tear-down" | "Porting" | "Assembly", state: "open" | "running" | "done" | "skipped", notBefore: string | null = null) => ({ sequence, station, state, notBefore });
const base: PieceStatusFacts = {
  isBookedIn: true, isReleased: false, isGone: false, isApproved: true, waitingSince: null, hasDraft: false, operations: [op(1, "Tear-down", "done"), op(2, "Porting", "open")],
  running: null, hold: null, shortOf: null, isPaid: false, promisedOn: "2026-03-20", bookedInAt: "2026-02-24T17:00:00Z", releasedAt: null,
};
const said = (more: Partial<PieceStatusFacts>) => { const s = pieceStatus({ ...base, ...more }, TODAY, NOW); return [s.station, s.dial, s.word]; };

describe("what a piece is doing", () => {
  it.each<[string, Partial<PieceStatusFacts>, unknown[]]>([
    ["next at the station of its next operation", {}, ["Porting", "queue", "Next"]],
    ["at the counter until work begins", { operations: [op(1, "Tear-down", "open")] }, ["Counter in", "queue", "Just in"]],
    ["under somebody's hands", { operations: [op(1, "Tear-down", "done"), op(2, "Porting", "running")], running: { person: "Anselm", since: NOW } }, ["Porting", "work", "Anselm"]],
    ["held before short, short before due", { hold: { reason: "machine", since: NOW }, shortOf: "Guide", promisedOn: TODAY }, ["Porting", "hold", "Held, machine"]],
    ["short of a part", { shortOf: "Guide", promisedOn: TODAY }, ["Porting", "short", "Guide short"]],
    ["curing until the resin is ready", { operations: [op(1, "Tear-down", "done"), op(2, "Porting", "open", "2026-03-08T18:30:00Z")] }, ["Porting", "wait", "Cures"]],
    ["no longer curing at that very instant", { operations: [op(1, "Tear-down", "done"), op(2, "Porting", "open", NOW)] }, ["Porting", "queue", "Next"]],
    ["due today", { promisedOn: TODAY }, ["Porting", "late", "Due today"]],
    ["late", { promisedOn: "2026-03-07" }, ["Porting", "late", "Late"]],
    ["waiting for an answer at the counter", { isApproved: false, waitingSince: NOW, operations: [] }, ["Counter in", "wait", "Approval"]],
    ["not in the house yet", { isBookedIn: false, operations: [op(1, "Tear-down", "open")] }, [null, "queue", "On its way in"]],
    ["to inspect when all is done", { operations: [op(1, "Assembly", "done")] }, ["Counter out", "queue", "To inspect"]],
    ["ready, and no longer late", { isReleased: true, isPaid: true, promisedOn: "2026-03-01", operations: [op(1, "Assembly", "done")] }, ["Counter out", "ready", "Ready, paid"]],
    ["gone", { isGone: true, isReleased: true }, [null, "out", "Gone"]],
  ])("is %s", (_, facts, expected) => expect(said(facts)).toEqual(expected));

  it("lets the piece with the most to say speak for the order", () => {
    const ready = pieceStatus({ ...base, isReleased: true }, TODAY, NOW);
    const late = pieceStatus({ ...base, promisedOn: "2026-03-01" }, TODAY, NOW);
    expect(orderStatus([ready, late])?.word).toBe("Late");
    expect(orderStatus([])).toBeNull();
  });
});
