import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { ENDPOINTS } from "@/app/api/v1/openapi.json/endpoints";
import { handle } from "@/modules/access/api";
import { NotFound, settingsOf } from "@/modules/access/context";
import { openApiDocument } from "@/modules/access/openapi";
import { addDevice, freshEnrolCode, makeEnrolCode } from "@/modules/time/commands/devices";
import { enrolTablet } from "@/modules/time/identity/enrol";
import checks from "@/tests/checks/flow.json";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { enrolledTablet } from "@/tests/support/tablet";
import { showFlowEstimates } from "./commands/show-estimates";
import { POWER_ESTIMATE_WORDS } from "./domain/power-estimate";
import { WORKINGS } from "./workings/registry";
import { runWorkingEndpoint, workingsEndpoint } from "./workings-endpoints";
import { workingsShop } from "./workings-queries";

let a: TestShop;
let token: string;
beforeAll(async () => {
  a = await testShop("first");
  const mgr = { ...a.as("mgr"), now: new Date() };
  const { id } = must(await addDevice(mgr, { name: "Bench computer", kind: "bench" }));
  const code = freshEnrolCode();
  must(await makeEnrolCode(mgr, { id, code }));
  token = must(await enrolTablet(code.toLowerCase(), { ip: "bench", agent: "test" })).token;
});

/** Asks as a bench computer does, over the address. */
async function post(name: string, body: unknown, bearer = token): Promise<{ status: number; body: Record<string, unknown> }> {
  const answer = await handle(runWorkingEndpoint)(
    new Request(`http://localhost:3999/api/v1/s/first/flow/workings/${name}`, { method: "POST", headers: { authorization: `Bearer ${bearer}`, "idempotency-key": randomUUID(), "content-type": "application/json" }, body: JSON.stringify(body) }),
    { params: Promise.resolve({ shop: "first", function: name }) },
  );
  return { status: answer.status, body: (await answer.json()) as Record<string, unknown> };
}

describe("workings by program", () => {
  it("answer with figures, doubts in words, source and caution", async () => {
    // Bernoulli: 121 x sqrt(2.8).
    const made = await post("convert_test_pressure", { inputs: { flow_cfm: 121, from_inH2O: 10, to_inH2O: 28 } });
    expect(made.status).toBe(200);
    expect((made.body.values as { flow_cfm: number }).flow_cfm).toBeCloseTo(121 * Math.sqrt(2.8), 9);
    expect(made.body.flags).toEqual([expect.objectContaining({ code: "CONVERTED_PRESSURE", words: "Converted from another test pressure." }), expect.objectContaining({ code: "PRESSURE_RATIO_LARGE" })]);
    expect(made.body.source).toMatch(/Bernoulli/);
    expect((await post("retainer_to_seal", { inputs: { distance_closed_mm: 9, lift_mm: 8.6, minimum_mm: 1 } })).body).toMatchObject({ flags: [{ code: "RETAINER_TO_SEAL_BELOW_MINIMUM" }], caution: expect.stringContaining("service manual") as string });
  });
  it("refuse with a code, the input and words, and no number", async () => {
    const cases = [
      ["flow_from_range_percent", { inputs: { range_cfm: 60, percent: 103 } }, { code: "READING_OUT_OF_RANGE", field: "inputs.percent" }],
      ["flow_from_range_percent", { inputs: { range_cfm: 60, percent: "50" } }, { code: "INPUT_NOT_ACCEPTED", fields: [{ path: "inputs.percent", message: "Here stands a number." }] }],
      ["flow_from_range_percent", { inputs: { range_cfm: 60 } }, { code: "INPUT_NOT_ACCEPTED", fields: [{ path: "inputs.percent", message: "Needed: a number." }] }],
      ["flow_from_range_percent", { inputs: { range_cfm: 60, percent: 50, lift: 3 } }, { code: "INPUT_NOT_ACCEPTED", fields: [{ path: "inputs", message: "flow_from_range_percent takes no lift. It takes range_cfm, percent, calibration_factor." }] }],
      ["flow_from_range_percent", { range_cfm: 60, percent: 50 }, { status: 422 }],
      ["no_such_function", { inputs: {} }, { status: 422, fields: [{ path: "function", message: expect.stringContaining("no function of this name") as string }] }],
    ] as const;
    for (const [name, body, problem] of cases) {
      const refused = await post(name, body);
      expect(refused.status, name).toBe(422);
      expect(refused.body, JSON.stringify(body)).toMatchObject(problem);
      expect(refused.body).not.toHaveProperty("values");
    }
  });
  it("give what the published cases say, over the address too", async () => {
    for (const c of checks.cases.filter((x) => !WORKINGS.find((w) => w.name === x.function)?.isEstimate)) {
      const made = await post(c.function, { inputs: c.inputs });
      if ("error" in c.expected) expect(made.body, c.id).toMatchObject({ code: c.expected.error });
      else expect(made.status, `${c.id} ${JSON.stringify(made.body)}`).toBe(200);
    }
  });
  it("are listed with inputs, outputs and whether they are switched on, and stand in the document", async () => {
    const listed = must(await workingsEndpoint.run(a.as("counter"), {}, null));
    expect(listed.groups.flatMap((g) => g.functions.map((f) => f.name))).toEqual(WORKINGS.map((w) => w.name));
    const paths = openApiDocument(ENDPOINTS, "http://localhost").paths as Record<string, Record<string, { parameters: { name: string; schema: { enum?: string[] } }[]; requestBody?: unknown }>>;
    const run = paths["/api/v1/s/{shop}/flow/workings/{function}"]?.post;
    expect(run?.parameters.find((p) => p.name === "function")?.schema.enum).toEqual(WORKINGS.map((w) => w.name));
    expect(JSON.stringify(run?.requestBody)).toContain('"range_cfm"');
    expect(paths["/api/v1/s/{shop}/flow/workings"]?.get).toBeDefined();
  });
  it("are closed to a tablet of the clock, and to whoever may not see flow", async () => {
    const clock = await enrolledTablet(a, "Door");
    expect((await post("swept_volume", { inputs: { bore_mm: 72, stroke_mm: 61.2 } }, clock.token)).status).toBe(404);
    expect((await post("swept_volume", { inputs: {} }, "x".repeat(43))).status).toBe(401);
    const nobody = { ...a.as("owner"), actor: { kind: "person" as const, id: randomUUID(), name: "Somebody", roles: [], sessionId: null } };
    await expect(workingsShop(nobody)).rejects.toThrow(NotFound);
  });
});

describe("estimates by program", () => {
  const sent = { inputs: { max_flow_cfm: 126.8, dp_inH2O: 28, cylinders: 1 } };
  it("are refused in words until the owner switches them on", async () => {
    const off = await post("power_rule_of_thumb", sent);
    expect(off).toMatchObject({ status: 422, body: { code: "ESTIMATES_OFF", title: expect.stringContaining(POWER_ESTIMATE_WORDS) as string } });
    expect(await workingsShop(a.as("tech"))).toEqual({ estimatesOn: false });
    const { version } = await settingsOf(a.as("owner"));
    must(await showFlowEstimates(a.as("owner"), { show: true, version }));
    // Common practice: 0.257 hp per CFM, by hand 126.8 x 0.257.
    const on = await post("power_rule_of_thumb", sent);
    expect(on).toMatchObject({ status: 200, body: { caution: POWER_ESTIMATE_WORDS, values: { label: "estimate" } } });
    expect((on.body.values as { hp: number }).hp).toBeCloseTo(32.5876, 4);
  });
});
