import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addCamshaft, addOwnHead, changeCamshaft, changeFamily, setUpFamily } from "./commands/families";
import { recordBenchCheck } from "./commands/gear";
import { addCheckPlate, addLiftDevice, changeBench, changeCheckPlate, changeFixture, changeLiftDevice, setUpBench, setUpFixture } from "./commands/gear-set-up";
import { startTest } from "./commands/start-test";
import { benchHistory, gearRoom } from "./queries/gear";

let a: TestShop;
let b: TestShop;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); });

const bench = { name: "North bench", kind: "series_orifice" as const, scale: "percent_linear" as const, ranges: [{ label: "4", fullScaleCfm: "100" }, { label: "5", fullScaleCfm: "200,5" }], waterUnit: "conventional" as const, nominalPressures: "28 10", maxFlow: "400", uPressure: "0,1" };

describe("benches", () => {
  it("are set up from what is typed and changed once a version", async () => {
    const key = requestId();
    const { id } = must(await setUpBench(a.as("lead"), bench, { requestId: key }));
    expect(must(await setUpBench(a.as("lead"), bench, { requestId: key })).id).toBe(id);
    const [view] = (await gearRoom(a.as("tech"))).benches;
    expect(view).toMatchObject({ id, ranges: [{ label: "4", fullScaleCfm: 100 }, { label: "5", fullScaleCfm: 200.5 }], nominalPressuresInH2O: [28, 10], pressureUncertaintyInH2O: 0.1, check: null });
    must(await changeBench(a.as("mgr"), { ...bench, id, version: 1, altitude: "1640" }));
    expect(await changeBench(a.as("lead"), { ...bench, id, version: 1, name: "Late" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect(await changeBench(b.as("owner"), { ...bench, id, version: 2 })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(changeBench(a.as("tech"), { ...bench, id, version: 2 })).rejects.toThrow(NotFound);
    expect(await setUpBench(a.as("lead"), bench)).toMatchObject({ ok: false, refusal: { code: "NAME_TAKEN", field: "name" } });
  });

  it("are refused without a range, a readable number or a head at full scale, each beside its field", async () => {
    const paths = async (input: Parameters<typeof setUpBench>[1]) => {
      const r = await setUpBench(a.as("lead"), input);
      return r.ok ? [] : (r.refusal.fields ?? []).map((f) => f.path);
    };
    expect(await paths({ ...bench, name: "A", ranges: [] })).toEqual(["ranges"]);
    expect(await paths({ ...bench, name: "A", ranges: [{ label: "4", fullScaleCfm: "1.000,5" }] })).toEqual(["ranges.0.fullScaleCfm"]);
    expect(await paths({ ...bench, name: "A", scale: "orifice_head" })).toEqual(["ranges.0.fullScaleHead", "ranges.1.fullScaleHead"]);
    expect(await paths({ ...bench, name: "A", nominalPressures: "28 0", maxFlow: "-4" })).toEqual(["nominalPressures", "maxFlow"]);
    expect(await paths({ ...bench, name: "A", ranges: [bench.ranges[0] ?? { label: "", fullScaleCfm: "" }, { label: "4", fullScaleCfm: "200" }] })).toEqual(["ranges.1.label"]);
  });

  it("keep scale, ranges and bore once a test was read; ranges may be added", async () => {
    const { id } = must(await setUpBench(a.as("lead"), { ...bench, name: "Used bench" }));
    const fixture = must(await setUpFixture(a.as("lead"), { name: "Used 77", bore: "77" })).id;
    const head = must(await addOwnHead(a.as("tech"), { mark: "DEV-1", family: "S250-4V" })).id;
    must(await startTest(a.as("tech"), { headId: head, side: "intake", purpose: "baseline", benchId: id, fixtureId: fixture, nominal: "28", liftUnit: "mm", lifts: ["1", "2"] }));
    expect(await changeBench(a.as("lead"), { ...bench, name: "Used bench", id, version: 1, ranges: [{ label: "4", fullScaleCfm: "110" }] })).toMatchObject({ ok: false, refusal: { code: "BENCH_IN_USE", field: "ranges" } });
    expect(await changeBench(a.as("lead"), { ...bench, name: "Used bench", id, version: 1, scale: "direct" })).toMatchObject({ ok: false, refusal: { code: "BENCH_IN_USE", field: "scale" } });
    must(await changeBench(a.as("lead"), { ...bench, name: "Used bench", id, version: 1, ranges: [...bench.ranges, { label: "6", fullScaleCfm: "300" }] }));
    expect(await changeFixture(a.as("lead"), { id: fixture, version: 1, name: "Used 77", bore: "78" })).toMatchObject({ ok: false, refusal: { code: "FIXTURE_IN_USE", field: "bore" } });
    must(await changeFixture(a.as("lead"), { id: fixture, version: 1, name: "Used 77, long", bore: "77,0", length: "120" }));
  });
});

describe("bench checks", () => {
  it("make the factor from the plates, keep its history, and say drift, age and an overdue plate", async () => {
    const { id } = must(await setUpBench(a.as("lead"), { ...bench, name: "Checked bench", scale: "direct", ranges: [] }));
    for (const [serial, flow, dueOn] of [["P30", "30", "2026-01-01"], ["P60", "60", ""], ["P90", "90", ""]] as const) {
      must(await addCheckPlate(a.as("lead"), { serial, referenceFlow: flow, atPressure: "28", certificate: "C-1", dueOn }));
    }
    // Least squares through zero over three plates, worked by hand: K = 1.011803, worst residual 0.169 %.
    const plates = [["P30", "30", "29,6"], ["P60", "60", "59.4"], ["P90", "90", "88.9"]].map(([serial = "", reference = "", indicated = ""]) => ({ serial, reference, indicated }));
    const first = must(await recordBenchCheck(a.as("tech", "2026-02-18T08:00:00Z"), { benchId: id, plates }));
    expect(first.factor).toBeCloseTo(1.011803, 6);
    expect(first.maxResidualPercent).toBeCloseTo(0.169, 3);
    expect(first).toMatchObject({ driftPercent: null, flags: ["CHECK_PLATE_OVERDUE"] });
    const moved = must(await recordBenchCheck(a.as("tech", "2026-02-18T09:00:00Z"), { benchId: id, plates: [{ serial: "P60", reference: "60", indicated: "58" }], reason: "sensor renewed" }));
    expect(moved.flags).toEqual(["CALIBRATION_DRIFT"]);
    expect(moved.driftPercent).toBeCloseTo(((60 / 58) / first.factor - 1) * 100, 9);
    const soon = await benchHistory(a.as("counter", "2026-02-18T12:00:00Z"), id);
    expect(soon.checks.map((c) => c.factor)).toEqual([moved.factor, first.factor]);
    expect(soon.checks[1]?.plates.map((p) => p.indicatedText)).toEqual(["29,6", "59.4", "88.9"]);
    expect(soon.bench.check).toMatchObject({ ageHours: 3, isOld: false });
    expect((await benchHistory(a.as("counter", "2026-02-18T17:30:00Z"), id)).bench.check).toMatchObject({ isOld: true });
    expect((await gearRoom(a.as("tech"))).plates.find((p) => p.serial === "P30")?.isOverdue).toBe(true);
    await expect(benchHistory(b.as("owner"), id)).rejects.toThrow(NotFound);
    expect(await recordBenchCheck(b.as("owner"), { benchId: id, plates })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
  });

  it("leave earlier checks as they were when a plate is certified anew", async () => {
    const plate = (await gearRoom(a.as("lead"))).plates.find((p) => p.serial === "P60");
    const changed = { id: plate?.id ?? "", version: 1, serial: "P60", referenceFlow: "60,3", atPressure: "28", certificate: "C-2", dueOn: "2027-01-01" };
    must(await changeCheckPlate(a.as("lead"), changed));
    expect(await changeCheckPlate(a.as("lead"), changed)).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    const room = await gearRoom(a.as("lead"));
    expect(room.plates.find((p) => p.serial === "P60")).toMatchObject({ referenceFlowCfm: 60.3, dueOn: "2027-01-01", version: 2 });
    const checked = room.benches.find((x) => x.name === "Checked bench");
    expect((await benchHistory(a.as("lead"), checked?.id ?? "")).checks.at(-1)?.plates[1]?.referenceCfm).toBe(60);
  });
});

describe("lift devices, camshafts and families", () => {
  it("are kept as typed, and a cam's table agrees with its greatest lift", async () => {
    const device = must(await addLiftDevice(a.as("lead"), { name: "Dial 1", resolution: "0,01", uncertainty: "0.02" })).id;
    must(await changeLiftDevice(a.as("lead"), { id: device, version: 1, name: "Dial 1", resolution: "0.01", active: false }));
    expect((await gearRoom(a.as("lead"))).liftDevices).toMatchObject([{ resolutionMm: 0.01, uncertaintyMm: null, active: false }]);
    const synthetic = must(await addCamshaft(a.as("lead"), { label: "Stock", side: "intake", maxLift: ".340 in", duration: "240" }));
    expect(synthetic.points).toBe(0);
    expect(await addCamshaft(a.as("lead"), { label: "Sport", side: "intake", maxLift: "8.6", profile: "0 0\n60 5\n120 9.4\n240 0" })).toMatchObject({ ok: false, refusal: { code: "CAM_LIFT_DIFFERS", field: "maxLift" } });
    const cam = must(await addCamshaft(a.as("lead"), { label: "Sport", side: "intake", maxLift: "9.4", profile: "0 0\n60 5\n120 9,4\n240 0" }));
    expect(await changeCamshaft(a.as("lead"), { id: cam.id, version: 1, label: "Sport", side: "intake", maxLift: "9.4", profile: "0 0\n60 x\n120 9,4" })).toMatchObject({ ok: false, refusal: { code: "CAM_TABLE_NOT_READABLE", field: "profile", data: { row: 2 } } });
    must(await changeCamshaft(a.as("lead"), { id: cam.id, version: 1, label: "Sport", side: "intake", maxLift: "9.4", profile: "0 0\n60 5.1\n120 9,4\n240 0", dataSource: "degree wheel" }));
    expect((await gearRoom(a.as("tech"))).camshafts.find((c) => c.label === "Sport")).toMatchObject({ maxLiftUm: 9400, dataSource: "degree wheel", version: 2 });
    expect(await addCamshaft(a.as("lead"), { label: "Empty", side: "intake", maxLift: "9" })).toMatchObject({ ok: false, refusal: { fields: [{ path: "duration" }] } });
  });

  it("hold two to five valves of unequal size, and a family with heads keeps its name", async () => {
    const five = ([["intake", "left", "23"], ["intake", "centre", "22"], ["intake", "right", "23"], ["exhaust", "left", "24.5"], ["exhaust", "right", "24.5"]] as const).map(([side, position, head]) => ({ side, position, head, stem: "4,5" }));
    const { id } = must(await setUpFamily(a.as("lead"), { name: "Five", cylinders: 4, bore: "67", stroke: "42.5", valves: five, camLiftIntake: "7.5", camLiftExhaust: ".280 in" }));
    expect((await gearRoom(a.as("tech"))).families.find((f) => f.name === "Five")).toMatchObject({ camLiftIntakeUm: 7500, camLiftExhaustUm: 7112, valves: [{ headMm: 23 }, { headMm: 22 }, { headMm: 23 }, { headMm: 24.5 }, { headMm: 24.5 }] });
    must(await addOwnHead(a.as("tech"), { mark: "DEV-5", family: "Five", cylinders: 4 }));
    expect(await changeFamily(a.as("lead"), { id, version: 1, name: "Five valve", cylinders: 4, valves: five })).toMatchObject({ ok: false, refusal: { code: "FAMILY_IN_USE", field: "name" } });
    must(await changeFamily(a.as("lead"), { id, version: 1, name: "Five", cylinders: 4, bore: "67", stroke: "42,5", valves: five.slice(0, 4) }));
    expect(await setUpFamily(a.as("lead"), { name: "Twice", cylinders: 1, valves: [five[0], five[0]].filter((v) => v !== undefined) })).toMatchObject({ ok: false, refusal: { fields: [{ path: "valves.1.position" }] } });
    await expect(setUpFamily(a.as("counter"), { name: "Mine", cylinders: 1 })).rejects.toThrow(NotFound);
    expect((await gearRoom(b.as("owner"))).families).toEqual([]);
  });
});
