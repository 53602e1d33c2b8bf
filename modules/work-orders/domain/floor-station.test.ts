import { describe, expect, it } from "vitest";
import { OPERATION_CODES, STATION_OF_OPERATION, stationOf, STATIONS, type OperationCode, type OperationState } from "./floor-station";

const route = (...ops: [OperationCode, OperationState][]) =>
  ops.map(([code, state], i) => ({ sequence: (i + 1) * 10, station: STATION_OF_OPERATION[code], state }));
const inHouse = { isBookedIn: true, isGone: false, isApproved: true };

describe("stations of the floor", () => {
  it("every operation has a station, and every station between the counters has an operation", () => {
    const used = new Set<string>(OPERATION_CODES.map((c) => STATION_OF_OPERATION[c]));
    expect([...used].sort()).toEqual(STATIONS.filter((s) => !s.startsWith("Counter")).sort());
  });

  it("a head walks from counter to counter as its operations are done", () => {
    const codes: OperationCode[] = ["CLN", "FLB", "PIN", "SEA", "FLF", "ASM"];
    const seen = Array.from({ length: codes.length + 1 }, (_, done) =>
      stationOf({ ...inHouse, operations: route(...codes.map((c, i): [OperationCode, OperationState] => [c, i < done ? "done" : "open"])) }),
    );
    expect(["Counter in", ...seen]).toEqual(STATIONS);
    expect(stationOf({ ...inHouse, operations: [] })).toBe("Counter in");
  });

  it.each([
    ["what runs comes before what is next", route(["CLN", "open"], ["PEX", "running"]), "Porting"],
    ["skipped operations are passed over", route(["CLN", "done"], ["FLB", "skipped"], ["SEA", "open"]), "Seats"],
    ["sequence decides, not the order of rows", route(["CLN", "open"], ["PEX", "open"]).reverse(), "Tear-down"],
  ] as const)("%s", (_title, operations, station) => expect(stationOf({ ...inHouse, operations })).toBe(station));

  it("stands nowhere when it is not in the house, and at the counter until agreed", () => {
    const operations = route(["CLN", "open"]);
    expect(stationOf({ ...inHouse, isBookedIn: false, operations })).toBeNull();
    expect(stationOf({ ...inHouse, isGone: true, operations })).toBeNull();
    expect(stationOf({ ...inHouse, isApproved: false, operations })).toBe("Counter in");
  });
});
