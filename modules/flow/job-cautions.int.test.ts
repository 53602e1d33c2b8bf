import { beforeAll, describe, expect, it } from "vitest";
import { benchJob, type BenchJob } from "@/tests/support/bench-job";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { markCautionsSeen } from "./commands/job-cautions";
import { cautionsSeenOn, cautionsToShow } from "./queries/job-cautions";

let a: TestShop;
let b: TestShop;
let job: BenchJob;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  job = await benchJob(a, ["PIN"]);
});
const ask = (hazards: string[], step = "PIN") => ({ workOrderId: job.workOrderId, step, hazards });

describe("cautions of a job", () => {
  it("are shown until a named person confirms them, once a step and job", async () => {
    expect(await cautionsToShow(a.as("tech"), ask(["grinding", "noise"]))).toEqual(["noise", "metal dust", "cutters", "fume"]);
    const key = requestId();
    const input = { workOrderId: job.workOrderId, step: "PIN", hazards: ["metal dust", "cutters", "fume"] as const };
    const first = must(await markCautionsSeen(a.as("tech"), { ...input, hazards: [...input.hazards] }, { requestId: key }));
    expect(must(await markCautionsSeen(a.as("tech"), { ...input, hazards: [...input.hazards] }, { requestId: key }))).toEqual(first);
    expect(must(await markCautionsSeen(a.as("tech"), { ...input, hazards: ["cutters"] })).kept).toBe(0);
    expect(await cautionsToShow(a.as("tech"), ask(["grinding", "noise"]))).toEqual(["noise"]);
    // Another person, another step: shown again.
    expect(await cautionsToShow(a.as("lead"), ask(["grinding"]))).toEqual(["metal dust", "cutters", "fume"]);
    expect(await cautionsToShow(a.as("tech"), ask(["grinding"], "PEX"))).toEqual(["metal dust", "cutters", "fume"]);
    expect(await cautionsSeenOn(a.as("mgr"), job.workOrderId)).toMatchObject([
      { hazard: "cutters", step: "PIN", person: "Tess Technician" }, { hazard: "fume" }, { hazard: "metal dust" },
    ]);
  });

  it("are confirmed by nobody nameless, and not on another shop's job", async () => {
    const input = { workOrderId: job.workOrderId, step: "PIN", hazards: ["noise" as const] };
    expect(await markCautionsSeen(a.system(), input)).toMatchObject({ ok: false, refusal: { code: "PERSON_REQUIRED" } });
    expect(await markCautionsSeen(b.as("owner"), input)).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await cautionsSeenOn(b.as("owner"), job.workOrderId)).toEqual([]);
    expect(await markCautionsSeen(a.as("tech"), { ...input, hazards: [] })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
  });
});
