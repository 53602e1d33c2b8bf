import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead, changeFamily } from "./commands/families";
import { addFamily } from "./commands/gear";
import { saveMeasurements, setMeasurementLimit } from "./commands/measurements";
import { gearRoom } from "./queries/gear";
import { flowSheetFor } from "./queries/sheet";
import { measurementSheet } from "./queries/measurements";

let a: TestShop;
let b: TestShop;
let head: string;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  must(await addFamily(a.as("lead"), { name: "S250-4V", cylinders: 2, valves: (["left", "right"] as const).flatMap((position) => [{ side: "intake" as const, position, headMm: 31 }, { side: "exhaust" as const, position, headMm: 26.5 }]) }));
  head = must(await addOwnHead(a.as("tech"), { mark: "M-1", family: "S250-4V", cylinders: 2 })).id;
});
const valve = (kind: string, value: string, more: object = {}) => ({ cylinder: 1, side: "intake" as const, position: "left" as const, kind, value, unit: "mm", ...more });
const save = (rows: Parameters<typeof saveMeasurements>[1]["rows"], who = "tech", shop = a) => saveMeasurements(shop.as(who), { headId: head, stage: "before", instrument: "dial 2", rows });

describe("the measurement sheet", () => {
  it("keeps each line by itself: a refused one stops none of the others", async () => {
    const key = requestId();
    const rows = [valve("spring-installed", "33,5"), valve("spring-seat-load", "46 lbf", { unit: "N" }), valve("lash-measured", "thin"), valve("spring-solid", ".898"), valve("spring-free", "40", { position: "" }), valve("deck-flat-1", "0.03", { side: "", position: "" })];
    const first = must(await saveMeasurements(a.as("tech"), { headId: head, stage: "before", instrument: "dial 2", rows }, { requestId: key }));
    expect(first.saved.map((x) => x.key)).toEqual(["1/intake/left/spring-installed", "1/intake/left/spring-seat-load", "1///deck-flat-1"]);
    expect(first.saved[1]?.base).toBeCloseTo(204.618, 3);
    expect(first.refused.map((x) => [x.key.split("/").at(-1), x.code, x.asks])).toEqual([["lash-measured", "NUMBER_NOT_FINITE", false], ["spring-solid", "INCH_OR_MM", true], ["spring-free", "NO_SUCH_LINE", false]]);
    expect(must(await saveMeasurements(a.as("tech"), { headId: head, stage: "before", instrument: "dial 2", rows }, { requestId: key }))).toEqual(first);
    const sheet = await measurementSheet(a.as("counter"), head);
    expect(sheet.valves).toHaveLength(4);
    expect(sheet.cells.find((c) => c.kind === "spring-installed")).toMatchObject({ valueText: "33,5", unit: "mm", base: 33.5, revision: 1, by: "tech", instrument: "dial 2", stage: "before" });
  });

  it("tells the flow sheet the smallest section of each port, newest revision of each stage", async () => {
    const port = (kind: string, value: string, more: object = {}) => valve(kind, value, { side: "", position: "", unit: "mm²", ...more });
    expect(must(await save([port("section-intake", "560"), port("section-exhaust", "0.8 in2")])).refused).toEqual([]);
    must(await save([port("section-intake", "566", { revisionSeen: 1 })]));
    const { sections } = await flowSheetFor(a.as("tech"), head, 1);
    expect(sections.find((x) => x.side === "intake")).toEqual({ side: "intake", stage: "before", mm2: 566 });
    // 1 in2 is 25.4 x 25.4 mm2.
    expect(sections.find((x) => x.side === "exhaust")?.mm2).toBeCloseTo(516.128, 6);
    must(await save([port("section-intake", "", { revisionSeen: 2 })]));
    expect((await flowSheetFor(a.as("tech"), head, 1)).sections.map((x) => x.side)).toEqual(["exhaust"]);
  });

  it("keeps a doubtful value when it is confirmed, and every revision for ever", async () => {
    must(await save([valve("spring-solid", ".898", { confirmed: true })]));
    const changed = must(await save([valve("spring-solid", ".898 in", { revisionSeen: 1 })]));
    expect(changed.saved[0]).toMatchObject({ revision: 2, unit: "in" });
    expect(changed.saved[0]?.base).toBeCloseTo(22.8092, 4);
    expect(must(await save([valve("spring-solid", "22.9", { revisionSeen: 1 })])).refused[0]).toMatchObject({ code: "CHANGED_MEANWHILE" });
    expect(must(await save([valve("spring-solid", "", { revisionSeen: 2 })])).saved[0]).toMatchObject({ revision: 3, valueText: "" });
    expect(await behindTheCurtain(`select value_text || ' ' || unit from measurements where head_id = '${head}' and kind = 'spring-solid' order by revision`)).toEqual([".898 mm", ".898 in", " in"]);
    await expect(behindTheCurtain(`update measurements set value_text = 'x'`)).rejects.toThrow(/never changed/);
  });

  it("says what stands where somebody else wrote meanwhile, so that one of the two can be chosen", async () => {
    must(await save([valve("spring-rate", "41", { unit: "N/mm" })]));
    const [refused] = must(await save([valve("spring-rate", "42", { unit: "N/mm" })], "insp")).refused;
    expect(refused).toMatchObject({ code: "CHANGED_MEANWHILE", asks: false, theirs: { revision: 1, valueText: "41", unit: "N/mm" } });
    expect(must(await save([valve("spring-rate", "x", { unit: "N/mm", revisionSeen: 1 })])).refused[0]?.theirs).toBeNull();
  });

  it("takes the cam lift its head does not state from the family", async () => {
    must(await addFamily(a.as("lead"), { name: "Late lift", valves: [{ side: "intake", position: "single", headMm: 31 }] }));
    // Booked in before the shop knew the family's cam.
    const early = must(await addOwnHead(a.as("tech"), { mark: "M-2", family: "Late lift" })).id;
    expect((await measurementSheet(a.as("tech"), early)).head).toMatchObject({ camLiftIntakeUm: null, camLiftExhaustUm: null, boreMm: null });
    const family = (await gearRoom(a.as("lead"))).families.find((f) => f.name === "Late lift");
    must(await changeFamily(a.as("lead"), { id: family?.id ?? "", version: 1, name: "Late lift", bore: "77", camLiftIntake: "8.64" }));
    expect((await measurementSheet(a.as("tech"), early)).head).toMatchObject({ camLiftIntakeUm: 8640, camLiftExhaustUm: null, boreMm: 77 });
    // A head that states its own keeps it.
    await behindTheCurtain(`update heads set cam_lift_intake_um = 9000 where id = '${early}'`);
    expect((await measurementSheet(a.as("tech"), early)).head.camLiftIntakeUm).toBe(9000);
  });

  it("takes a line kept on a device from nobody but who typed it", async () => {
    const kept = { headId: head, stage: "after" as const, rows: [valve("spring-free", "40")], by: a.people.tech ?? "" };
    expect(await saveMeasurements(a.as("insp"), kept)).toMatchObject({ ok: false, refusal: { code: "OTHER_PERSON" } });
    expect(must(await saveMeasurements(a.as("tech"), kept)).saved).toHaveLength(1);
  });

  it("keeps before and after apart", async () => {
    must(await saveMeasurements(a.as("tech"), { headId: head, stage: "after", rows: [valve("spring-installed", "33.9")] }));
    const cells = (await measurementSheet(a.as("tech"), head)).cells.filter((c) => c.kind === "spring-installed");
    expect(cells.map((c) => [c.stage, c.valueText])).toEqual([["after", "33.9"], ["before", "33,5"]]);
  });

  it("belongs to its shop and to those who record", async () => {
    expect(await save([valve("spring-rate", "41")], "owner", b)).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(measurementSheet(b.as("owner"), head)).rejects.toThrow(NotFound);
    await expect(save([valve("spring-rate", "41")], "counter")).rejects.toThrow(NotFound);
    expect(must(await save([{ ...valve("spring-rate", "41", { unit: "N/mm" }), cylinder: 3 }])).refused[0]?.code).toBe("NO_SUCH_LINE");
  });
});

describe("limits", () => {
  const lash = { family: "S250-4V", kind: "lash-measured", side: "intake" as const, min: "0,10", max: "0.15", unit: "mm", source: "service manual 4-12", version: 0 };
  it("are the shop's, with their source, replaced once a version", async () => {
    must(await setMeasurementLimit(a.as("lead"), lash));
    expect(await setMeasurementLimit(a.as("lead"), lash)).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    must(await setMeasurementLimit(a.as("insp"), { ...lash, min: ".004", max: ".006", unit: "in", version: 1 }));
    const [limit] = (await measurementSheet(a.as("tech"), head)).limits;
    expect(limit).toMatchObject({ kind: "lash-measured", side: "intake", minText: ".004", unit: "in", source: "service manual 4-12", version: 2 });
    expect(limit?.min).toBeCloseTo(0.1016, 9);
  });
  it("are refused without a source, crossed, in a foreign unit or for an unknown line", async () => {
    const code = async (more: object) => { const r = await setMeasurementLimit(a.as("lead"), { ...lash, kind: "seat-width", ...more }); return r.ok ? "ok" : (r.refusal.fields?.[0]?.path ?? r.refusal.code); };
    expect(await code({ source: "" })).toBe("source");
    expect(await code({ min: "", max: "" })).toBe("min");
    expect(await code({ min: "2", max: "1" })).toBe("LIMITS_CROSSED");
    expect(await code({ unit: "N" })).toBe("UNIT_KIND_MISMATCH");
    expect(await code({ kind: "colour" })).toBe("NO_SUCH_LINE");
    await expect(setMeasurementLimit(a.as("tech"), lash)).rejects.toThrow(NotFound);
    expect(await behindTheCurtain(`select count(*)::text from measurement_limits where shop_id = '${b.shop.id}'`)).toEqual(["0"]);
  });
});
