import { beforeAll, describe, expect, it } from "vitest";
import { benchJob, type BenchJob } from "@/tests/support/bench-job";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead } from "./commands/families";
import { markCautionsSeen } from "./commands/job-cautions";
import { cautionsOfOwnHead, cautionsSeenOn, cautionsToShow } from "./queries/job-cautions";

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

describe("cautions on a head of the shop's own", () => {
  it("are shown until a named person confirms them, and again on another day", async () => {
    const headId = must(await addOwnHead(a.as("tech"), { mark: "D-1", family: "Own" })).id;
    const own = (hazards: string[], step = "bench session") => ({ headId, step, hazards });
    const [morning, evening, tomorrow] = ["2026-03-02T16:00:00Z", "2026-03-03T05:30:00Z", "2026-03-03T15:00:00Z"];
    expect(await cautionsOfOwnHead(a.as("tech", morning), own(["noise", "suction"]))).toEqual(["noise", "suction"]);
    expect(must(await markCautionsSeen(a.as("tech", morning), { headId, step: "bench session", hazards: ["noise"] })).kept).toBe(1);
    expect(await cautionsOfOwnHead(a.as("tech", morning), own(["noise", "suction"]))).toEqual(["suction"]);
    // 22:30 of the same day in the shop, although the date in Greenwich is another.
    expect(await cautionsOfOwnHead(a.as("tech", evening), own(["noise"]))).toEqual([]);
    expect(await cautionsOfOwnHead(a.as("tech", tomorrow), own(["noise"]))).toEqual(["noise"]);
    expect(await cautionsOfOwnHead(a.as("lead", morning), own(["noise"]))).toEqual(["noise"]);
    expect(await cautionsOfOwnHead(a.as("tech", morning), own(["noise"], "measurement sheet"))).toEqual(["noise"]);
  });

  it("are confirmed on own heads of this shop only, and on one job at a time", async () => {
    const headId = must(await addOwnHead(a.as("tech"), { mark: "D-2", family: "Own" })).id;
    const input = { headId, step: "bench session", hazards: ["noise" as const] };
    expect(await markCautionsSeen(b.as("owner"), input)).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    expect(await markCautionsSeen(a.system(), input)).toMatchObject({ ok: false, refusal: { code: "PERSON_REQUIRED" } });
    expect(await markCautionsSeen(a.as("tech"), { ...input, workOrderId: job.workOrderId })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
    expect(await markCautionsSeen(a.as("tech"), { step: "bench session", hazards: ["noise"] })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
  });
});
