import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead, setUpFamily } from "./commands/families";
import { addFixture, recordBenchCheck } from "./commands/gear";
import { changeBench, setUpBench } from "./commands/gear-set-up";
import { recordReading } from "./commands/record-reading";
import { startTest } from "./commands/start-test";
import { strikeBenchCheck } from "./commands/strike-check";
import { benchHistory, gearRoom } from "./queries/gear";
import { gearOf } from "./queries/sheet";

let a: TestShop;
let b: TestShop;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); });

const bench = { kind: "series_orifice" as const, waterUnit: "conventional" as const, nominalPressures: "28", maxFlow: "400" };
const newBench = async (name: string, more: Partial<Parameters<typeof setUpBench>[1]> = {}) => must(await setUpBench(a.as("lead"), { ...bench, name, scale: "direct", ranges: [], ...more })).id;
const plate = (indicated: string, more: object = {}) => ({ serial: "P58", reference: "58", indicated, ...more });
const at = (time: string) => a.as("tech", `2026-02-18T${time}:00Z`);

describe("a doubtful bench check", () => {
  it("is asked about in words and kept with a reason only, which stays with it", async () => {
    const id = await newBench("Doubted");
    // 58 typed as 580 on a bench never checked.
    const slip = await recordBenchCheck(at("08:00"), { benchId: id, plates: [plate("580")] });
    expect(slip).toMatchObject({ ok: false, refusal: { code: "PLATE_MISTYPED", field: "reason", data: { askReason: true } } });
    expect(slip.ok ? "" : slip.refusal.message).toContain("Plate P58 shows 580 CFM where about 58");
    expect((await benchHistory(a.as("tech"), id)).checks).toEqual([]);
    must(await recordBenchCheck(at("08:01"), { benchId: id, plates: [plate("57.9")] }));
    expect(await recordBenchCheck(at("08:02"), { benchId: id, plates: [plate("57")] })).toMatchObject({ ok: false, refusal: { code: "FACTOR_MOVED" } });
    expect(await recordBenchCheck(at("08:02"), { benchId: id, plates: [plate("58"), { serial: "P30", reference: "30", indicated: "27.5" }] })).toMatchObject({ ok: false, refusal: { code: "PLATE_OFF" } });
    must(await recordBenchCheck(at("08:03"), { benchId: id, plates: [plate("57")], reason: "sensor renewed" }));
    must(await recordBenchCheck(at("08:04"), { benchId: id, plates: [plate("57.1")], reason: "not asked for, so not kept" }));
    expect((await benchHistory(a.as("tech"), id)).checks.map((c) => c.reason)).toEqual([null, "sensor renewed", null]);
  });
});

describe("a wrong bench check", () => {
  it("is put out of use by a row beside it: the one before counts, open tests take its factor, finished ones and the history stay", async () => {
    const id = await newBench("Struck");
    const fixture = must(await addFixture(a.as("lead"), { name: "Bore 77 s", boreMm: "77" })).id;
    const good = must(await recordBenchCheck(at("08:00"), { benchId: id, plates: [plate("57.9")] }));
    const wrong = must(await recordBenchCheck(at("09:00"), { benchId: id, plates: [plate("580")], reason: "I thought it right" }));
    const head = must(await addOwnHead(a.as("tech"), { mark: "ST-1", family: "Any" })).id;
    const session = { headId: head, benchId: id, fixtureId: fixture, nominal: "28", liftUnit: "mm" as const, lifts: ["1", "2"], purpose: "baseline" as const };
    const { testId } = must(await startTest(at("09:10"), { ...session, side: "intake" }));
    const read = must(await recordReading(at("09:11"), { testId, lift: "1", liftUnit: "mm", value: "20" }));
    expect(read.flowCfm).toBeCloseTo(20 * wrong.factor, 9);
    const done = must(await startTest(at("09:20"), { ...session, side: "exhaust" })).testId;
    await behindTheCurtain(`update flow_tests set state = 'complete' where id = '${done}'`);

    const key = requestId();
    const lead = a.as("lead", "2026-02-18T10:00:00Z");
    const struck = must(await strikeBenchCheck(lead, { checkId: wrong.id, reason: "P58 typed as 580" }, { requestId: key }));
    expect(struck).toMatchObject({ benchId: id, factor: good.factor, openTests: 1, finishedTests: 1 });
    expect(must(await strikeBenchCheck(lead, { checkId: wrong.id, reason: "P58 typed as 580" }, { requestId: key }))).toEqual(struck);
    expect(await strikeBenchCheck(lead, { checkId: wrong.id, reason: "once more" })).toMatchObject({ ok: false, refusal: { code: "ALREADY_STRUCK" } });
    expect(await strikeBenchCheck(lead, { checkId: struck.id, reason: "strike the strike" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });

    const history = await benchHistory(a.as("counter", "2026-02-18T10:05:00Z"), id);
    expect(history.bench.check).toMatchObject({ factor: good.factor, at: "2026-02-18T08:00:00.000Z" });
    expect(history.checks.map((c) => [c.id, c.struck?.reason ?? null, c.struck?.by ?? null])).toEqual([[wrong.id, "P58 typed as 580", "lead"], [good.id, null, null]]);
    expect((await gearOf(a.as("tech"))).benches.find((x) => x.id === id)?.factor).toBe(good.factor);
    expect(await behindTheCurtain(`select state || ' ' || round(bench_factor::numeric, 6) from flow_tests where id in ('${testId}', '${done}') order by state`)).toEqual([`complete ${wrong.factor.toFixed(6)}`, `draft ${good.factor.toFixed(6)}`]);
    expect(await behindTheCurtain(`select count(*)::text from bench_checks where bench_id = '${id}'`)).toEqual(["3"]);
    // The next check is measured against the one that counts.
    expect(must(await recordBenchCheck(at("11:00"), { benchId: id, plates: [plate("57.9")] })).driftPercent).toBeCloseTo(0, 9);
  });

  it("is out of reach of another shop and of those who only read or record", async () => {
    const id = await newBench("Reach");
    const check = must(await recordBenchCheck(at("08:00"), { benchId: id, plates: [plate("58")] }));
    expect(await strikeBenchCheck(b.as("owner"), { checkId: check.id, reason: "because" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(strikeBenchCheck(a.as("tech"), { checkId: check.id, reason: "because" })).rejects.toThrow(NotFound);
    expect(await strikeBenchCheck(a.as("lead"), { checkId: check.id, reason: "" })).toMatchObject({ ok: false, refusal: { fields: [{ path: "reason" }] } });
    expect((await benchHistory(a.as("tech"), id)).checks[0]?.struck).toBeNull();
    // No check left: the bench is as never checked.
    must(await strikeBenchCheck(a.as("lead"), { checkId: check.id, reason: "wrong bench" }));
    expect((await gearRoom(a.as("tech"))).benches.find((x) => x.id === id)?.check).toBeNull();
  });
});

describe("plates on the bench's own scale", () => {
  it("are kept as typed with their range, and turned into flow without a factor", async () => {
    const percent = await newBench("Percent", { scale: "percent_linear", ranges: [{ label: "3", fullScaleCfm: "100" }] });
    const { factor } = must(await recordBenchCheck(at("08:00"), { benchId: percent, plates: [plate("57,5", { range: "3" })] }));
    expect(factor).toBeCloseTo(58 / 57.5, 9);
    const [check] = (await benchHistory(a.as("tech"), percent)).checks;
    expect(check?.plates).toEqual([{ serial: "P58", referenceCfm: 58, indicatedText: "57,5", rangeLabel: "3", indicatedCfm: 57.5 }]);
    const head = await newBench("Manometer", { scale: "orifice_head", ranges: [{ label: "1", fullScaleCfm: "100", fullScaleHead: "16" }] });
    // 100 x sqrt(6.25/16) = 62.5 (ISO 5167-1: flow goes as the root of the differential pressure).
    expect(must(await recordBenchCheck(at("08:00"), { benchId: head, plates: [{ serial: "P62", reference: "62.5", indicated: "6.25", range: "1" }] })).factor).toBeCloseTo(1, 9);
    const refused = async (indicated: string, range: string) => { const r = await recordBenchCheck(at("08:05"), { benchId: percent, plates: [plate("58", { range: "3" }), plate(indicated, { range })] }); return r.ok ? "ok" : r.refusal.field; };
    expect(await refused("101", "3")).toBe("plates.1.indicated");
    expect(await refused("50", "9")).toBe("plates.1.range");
  });
});

describe("a bench read by percent", () => {
  it("is asked for no head at full scale and keeps none, also where one was kept before", async () => {
    const id = await newBench("No head", { scale: "percent_linear", ranges: [{ label: "1", fullScaleCfm: "100", fullScaleHead: "16" }] });
    expect((await gearRoom(a.as("tech"))).benches.find((x) => x.id === id)?.ranges).toEqual([{ label: "1", fullScaleCfm: 100 }]);
    await behindTheCurtain(`update benches set ranges = '[{"label":"1","fullScaleCfm":100,"fullScaleHead":16}]' where id = '${id}'`);
    const fixture = must(await addFixture(a.as("lead"), { name: "Bore 77 n", boreMm: "77" })).id;
    const head = must(await addOwnHead(a.as("tech"), { mark: "NH-1", family: "Any" })).id;
    must(await startTest(a.as("tech"), { headId: head, side: "intake", purpose: "baseline", benchId: id, fixtureId: fixture, nominal: "28", lifts: ["0.1"] }));
    must(await changeBench(a.as("lead"), { ...bench, name: "No head", scale: "percent_linear", ranges: [{ label: "1", fullScaleCfm: "100" }, { label: "2", fullScaleCfm: "200" }], id, version: 1 }));
  });
});

describe("an own head", () => {
  it("carries a mark no other head of the shop has, also when two are added at once", async () => {
    must(await addOwnHead(a.as("tech"), { mark: "DEV-9", family: "Any" }));
    expect(await addOwnHead(a.as("tech"), { mark: "dev-9", family: "Any" })).toMatchObject({ ok: false, refusal: { code: "MARK_TAKEN", field: "mark" } });
    must(await addOwnHead(b.as("tech"), { mark: "DEV-9", family: "Any" }));
    const both = await Promise.all([1, 2].map(() => addOwnHead(a.as("tech"), { mark: "DEV-10", family: "Any" })));
    expect(both.map((r) => (r.ok ? "ok" : r.refusal.code)).sort()).toEqual(["MARK_TAKEN", "ok"]);
  });
  it("has its family's cylinders where none are said", async () => {
    must(await setUpFamily(a.as("lead"), { name: "Twin", cylinders: "2" }));
    const cylinders = async (mark: string, more: object) => { const { id } = must(await addOwnHead(a.as("tech"), { mark, family: "Twin", ...more })); return behindTheCurtain(`select cylinders::text from heads where id = '${id}'`); };
    expect(await cylinders("TW-1", {})).toEqual(["2"]);
    expect(await cylinders("TW-2", { cylinders: "1" })).toEqual(["1"]);
  });
});
