import { beforeAll, describe, expect, it } from "vitest";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { changeTestConditions } from "./commands/change-test";
import { addCamshaft, addOwnHead } from "./commands/families";
import { addLiftDevice, setUpBench, setUpFixture } from "./commands/gear-set-up";
import { postWholeTest } from "./commands/post-test";
import { recordReading } from "./commands/record-reading";
import { startSheet, startTest } from "./commands/start-test";
import { figuresOfTest } from "./domain/test-figures";
import { flowSheetFor, gearOf } from "./queries/sheet";

let a: TestShop;
let b: TestShop;
let session: { benchId: string; fixtureId: string; nominal: string; liftUnit: "mm" };
let countsAir: string;
let device: string;
let cams: { intake: string; exhaust: string };

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  const bench = { name: "Direct", kind: "series_orifice" as const, scale: "direct" as const, ranges: [], waterUnit: "conventional" as const, nominalPressures: "28", maxFlow: "400" };
  session = { benchId: must(await setUpBench(a.as("lead"), bench)).id, fixtureId: must(await setUpFixture(a.as("lead"), { name: "77", bore: "77" })).id, nominal: "28", liftUnit: "mm" };
  countsAir = must(await setUpBench(a.as("lead"), { ...bench, name: "Counts the air", kind: "absolute_meter" })).id;
  device = must(await addLiftDevice(a.as("lead"), { name: "Dial", resolution: "0.01", uncertainty: "0.02" })).id;
  const cam = (side: "intake" | "exhaust", maxLift: string) => addCamshaft(a.as("lead"), { label: "Road", side, maxLift, duration: "240" });
  cams = { intake: must(await cam("intake", "8.6")).id, exhaust: must(await cam("exhaust", "8.2")).id };
});

const head = async (mark: string) => must(await addOwnHead(a.as("tech"), { mark, family: "S250-4V" })).id;
const sheetOf = async (headId: string) => flowSheetFor(a.as("tech"), headId, 1);

describe("gear of a test", () => {
  it("takes cam lift and lift uncertainty from what is named, and can name another while it is a draft", async () => {
    const headId = await head("G-1");
    must(await startSheet(a.as("tech"), { ...session, headId, purpose: "baseline", step: "1", camLiftForLadder: "8.6", liftDeviceId: device, intake: { camshaftId: cams.intake }, exhaust: { camshaftId: cams.exhaust } }));
    const { tests } = await sheetOf(headId);
    expect(tests.map((t) => [t.side, t.camLiftUm, t.camshaft?.id, t.liftDevice?.name, t.known?.liftMm])).toEqual([["intake", 8600, cams.intake, "Dial", 0.02], ["exhaust", 8200, cams.exhaust, "Dial", 0.02]]);
    const intake = tests.find((t) => t.side === "intake");
    must(await changeTestConditions(a.as("tech"), { testId: intake?.id ?? "", version: 1, fixtureId: session.fixtureId, nominal: "28", camLift: "9.1", camshaftId: cams.intake }));
    const changed = (await sheetOf(headId)).tests.find((t) => t.side === "intake");
    expect([changed?.camLiftUm, changed?.liftDevice]).toEqual([9100, null]);
    expect((await gearOf(a.as("tech"))).camshafts.map((c) => [c.side, c.maxLiftUm])).toEqual(expect.arrayContaining([["intake", 8600], ["exhaust", 8200]]));
  });

  it("refuses a camshaft of the other side, gear of another shop, and air that cannot be read, each at its field", async () => {
    const headId = await head("G-2");
    const start = (more: object) => startTest(a.as("tech"), { ...session, headId, side: "intake", purpose: "baseline", lifts: ["1"], ...more });
    expect(await start({ camshaftId: cams.exhaust })).toMatchObject({ ok: false, refusal: { code: "CAM_OF_OTHER_SIDE", field: "camshaftId" } });
    expect(await start({ roomTemperature: "banana" })).toMatchObject({ ok: false, refusal: { code: "UNIT_KIND_MISMATCH", field: "roomTemperature" } });
    expect(await start({ roomPressure: "99999" })).toMatchObject({ ok: false, refusal: { field: "roomPressure" } });
    const theirs = must(await addLiftDevice(b.as("lead"), { name: "Theirs", resolution: "0.01" })).id;
    expect(await start({ liftDeviceId: theirs })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND", field: "liftDeviceId" } });
    expect(await startSheet(a.as("tech"), { ...session, headId, purpose: "baseline", step: "1", camLiftForLadder: "3", intake: { camshaftId: cams.exhaust } })).toMatchObject({ ok: false, refusal: { field: "intake.camshaftId" } });
    expect((await sheetOf(headId)).tests).toEqual([]);
  });
});

describe("a bench that counts the air as it is", () => {
  it("does not start without the room's air", async () => {
    const headId = await head("G-3");
    expect(await startTest(a.as("tech"), { ...session, benchId: countsAir, headId, side: "intake", purpose: "baseline", lifts: ["1"], roomTemperature: "20 °C" })).toMatchObject({ ok: false, refusal: { code: "DENSITY_REQUIRED", field: "roomPressure" } });
  });

  // CIPM-2007 printed value: 10 °C, 730 mmHg, 40 % -> 1.19569 kg/m3; 100 x sqrt(1.19569/1.2041) = 99.65.
  it("states readings in reference air, on the sheet as through the API", async () => {
    const headId = await head("G-4");
    must(await postWholeTest(a.as("tech"), { ...session, benchId: countsAir, headId, side: "intake", purpose: "baseline", roomTemperature: "10 °C", roomPressure: "730 mmHg", roomHumidity: "40 %", readings: [{ lift: "1", value: "100" }, { lift: "2", value: "150" }] }));
    const [test] = (await sheetOf(headId)).tests;
    if (!test) throw new Error("no test");
    const [first, second] = figuresOfTest(test).readings.map((r) => r.flowCfm);
    expect(first).toBeCloseTo(99.65, 2);
    expect((second ?? 0) / (first ?? 1)).toBeCloseTo(1.5, 6);
  });
});

describe("air warmed between port and orifice", () => {
  it("is kept with its reading and corrected for; one temperature alone is refused", async () => {
    const headId = await head("G-5");
    const { testId } = must(await startTest(a.as("tech"), { ...session, headId, side: "intake", purpose: "baseline", lifts: ["1"] }));
    const reading = { testId, lift: "1", liftUnit: "mm" as const, value: "100" };
    expect(await recordReading(a.as("tech"), { ...reading, portTemperature: "45 °C" })).toMatchObject({ ok: false, refusal: { code: "TEMPERATURE_PAIR", field: "orificeTemperature" } });
    const saved = must(await recordReading(a.as("tech"), { ...reading, portTemperature: "318.15 K", orificeTemperature: "296.15 K" }));
    expect(saved.flowCfm).toBeCloseTo(103.648, 3);
    expect(saved.flags).toContain("TEMPERATURE_CORRECTED");
    expect((await sheetOf(headId)).tests[0]?.cells[0]).toMatchObject({ portTemperatureText: "318.15 K", orificeTemperatureText: "296.15 K" });
  });
});
