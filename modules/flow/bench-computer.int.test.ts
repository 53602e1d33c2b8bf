import { beforeAll, describe, expect, it } from "vitest";
import { ENDPOINTS } from "@/app/api/v1/openapi.json/endpoints";
import { GET as gearRoute } from "@/app/api/v1/s/[shop]/flow/gear/route";
import { POST as measurementsRoute } from "@/app/api/v1/s/[shop]/flow/measurements/route";
import { POST as readingsRoute } from "@/app/api/v1/s/[shop]/flow/readings/route";
import { GET as sheetRoute } from "@/app/api/v1/s/[shop]/flow/sheet/route";
import { POST as testsRoute } from "@/app/api/v1/s/[shop]/flow/tests/route";
import { GET as invoicesRoute } from "@/app/api/v1/s/[shop]/invoices/route";
import { openApiDocument } from "@/modules/access/openapi";
import { addDevice, makeBenchToken, revokeDevice } from "@/modules/time/commands/devices";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead } from "./commands/families";
import { addBench, addFixture } from "./commands/gear";
import { startTest } from "./commands/start-test";
import { benchExamples, type ExampleFacts } from "./domain/bench-examples";

const ROUTES: Record<string, typeof gearRoute> = { "/flow/gear": gearRoute, "/flow/sheet": sheetRoute, "/flow/readings": readingsRoute, "/flow/tests": testsRoute, "/flow/measurements": measurementsRoute, "/invoices": invoicesRoute };
const ORIGIN = "https://shop.example";

let a: TestShop;
let b: TestShop;
let facts: ExampleFacts;
const newToken = () => Buffer.from(crypto.getRandomValues(new Uint8Array(32))).toString("base64url");
/** A bench computer the way a manager makes one. */
async function computer(shop: TestShop, name: string) {
  const { id } = must(await addDevice(shop.as("mgr"), { name, kind: "bench" }));
  const token = newToken();
  must(await makeBenchToken(shop.as("mgr"), { id, token }, { requestId: requestId() }));
  return { id, token };
}
/** Calls the route of an address as it stands in the tree. */
function call(method: string, url: string, headers: Record<string, string>, body?: string): Promise<Response> {
  const [, shop = "", rest = ""] = /\/api\/v1\/s\/([^/]+)(\/[^?]*)/.exec(url) ?? [];
  const route = ROUTES[rest];
  if (!route) throw new Error(`no route ${rest}`);
  return route(new Request(url, { method, headers, ...(body === undefined ? {} : { body }) }), { params: Promise.resolve({ shop }) });
}
/** Runs a curl command the way a shell would: address, headers and body out of its text, nothing added. */
function run(command: string, token: string): Promise<Response> {
  const method = /-X (\w+)/.exec(command)?.[1] ?? "GET";
  const url = /'(https:[^']*)'/.exec(command)?.[1] ?? "";
  const headers = Object.fromEntries([...command.matchAll(/-H "([\w-]+): ([^"]*)"/g)].map(([, name = "", value = ""]) => [name, value.replace("$BENCH_TOKEN", token).replace("$(uuidgen | tr A-Z a-z)", requestId())]));
  return call(method, url, headers, /-d '(.*)'$/s.exec(command)?.[1]?.replaceAll("'\\''", "'"));
}

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  const benchId = must(await addBench(a.as("lead"), { name: "Bench 1" })).id;
  const fixtureId = must(await addFixture(a.as("lead"), { name: "Bore 77", boreMm: "77" })).id;
  const tag = "o'BEN-1";
  const headId = must(await addOwnHead(a.as("tech"), { mark: tag, family: "S250-4V" })).id;
  const { testId } = must(await startTest(a.as("tech"), { headId, side: "intake", purpose: "baseline", benchId, fixtureId, nominal: "28", lifts: ["0.050", "0.100", "0.150"] }));
  facts = { origin: ORIGIN, slug: "first", benchId, fixtureId, operatorId: a.people.tech ?? "", tag, testId };
});

describe("a bench computer", () => {
  it("reads the gear and a sheet, writes one reading and a whole test with the commands the shop's screen shows, as they stand", async () => {
    const { token } = await computer(a, "Bench PC 1");
    const [gear, sheet, reading, whole] = benchExamples(facts).map((e) => e.command);
    const ids = (await (await run(gear ?? "", token)).json()) as { benches: { id: string }[]; operators: { id: string }[] };
    expect(ids.benches.map((x) => x.id)).toContain(facts.benchId);
    const before = (await (await run(sheet ?? "", token)).json()) as { tests: { id: string; side: string; state: string }[] };
    expect(before.tests).toMatchObject([{ id: facts.testId, side: "intake", state: "draft" }]);
    const wrote = await run(reading ?? "", token);
    expect([wrote.status, await wrote.json()]).toMatchObject([200, { revision: 1, valueText: "48.9" }]);
    const test = await run(whole ?? "", token);
    expect(test.status).toBe(200);
    const after = (await (await run(sheet ?? "", token)).json()) as { tests: { side: string; state: string; cells: { valueText: string }[] }[] };
    expect(after.tests.map((t) => [t.side, t.state, t.cells.map((c) => c.valueText)]).sort()).toEqual([["exhaust", "complete", ["20.1", "39.4", "57.2", "71.8"]], ["intake", "draft", ["48.9"]]]);
  });

  it("does a repeated request once", async () => {
    const { token } = await computer(a, "Bench PC 2");
    const headers = { authorization: `Bearer ${token}`, "content-type": "application/json", "idempotency-key": requestId() };
    const body = JSON.stringify({ testId: facts.testId, lift: "0.050", value: "24.6", revisionSeen: 0 });
    const send = async () => { const r = await call("POST", `${ORIGIN}/api/v1/s/first/flow/readings`, headers, body); return [r.status, ((await r.json()) as { revision: number }).revision]; };
    expect([await send(), await send()]).toEqual([[200, 1], [200, 1]]);
  });

  it("reaches nothing but the bench: no invoices, no measurements, no other shop, and no sheet without its token", async () => {
    const { token } = await computer(a, "Bench PC 3");
    const bearer = { authorization: `Bearer ${token}` };
    const ask = async (path: string, headers: Record<string, string> = bearer) => (await call("GET", `${ORIGIN}/api/v1/s${path}`, headers)).status;
    expect(await ask("/first/flow/gear")).toBe(200);
    expect(await ask("/first/invoices")).toBe(401);
    expect(await ask("/second/flow/gear")).toBe(401);
    expect(await ask(`/second/flow/sheet?tag=${encodeURIComponent(facts.tag)}`)).toBe(401);
    const foreign = await computer(b, "Bench PC b");
    expect(await ask(`/second/flow/sheet?tag=${encodeURIComponent(facts.tag)}`, { authorization: `Bearer ${foreign.token}` })).toBe(404);
    expect(await ask("/first/flow/gear", { authorization: `Bearer ${foreign.token}` })).toBe(401);
    const write = (headers: Record<string, string>, path = "/first/flow/measurements") => call("POST", `${ORIGIN}/api/v1/s${path}`, { "content-type": "application/json", "idempotency-key": requestId(), ...headers }, JSON.stringify({ testId: facts.testId, lift: "0.150", value: "70" }));
    expect((await write(bearer)).status).toBe(401);
    const stored = await behindTheCurtain(`select token_hash from devices where name = 'Bench PC 3'`);
    for (const wrong of [`Bearer ${newToken()}`, "Bearer", "Bearer short", `Bearer ${token} `.replace(token, `${token}!`), `Bearer ${stored[0] ?? ""}`]) {
      const r = await write({ authorization: wrong }, "/first/flow/readings");
      expect([wrong, r.status, r.headers.get("www-authenticate")]).toEqual([wrong, 401, "Bearer"]);
    }
  });

  it("needs no origin with its token, and a write by cookie still does", async () => {
    const { token } = await computer(a, "Bench PC 4");
    const body = JSON.stringify({ testId: facts.testId, lift: "0.150", value: "70", revisionSeen: 0 });
    const send = (headers: Record<string, string>) => call("POST", `${ORIGIN}/api/v1/s/first/flow/readings`, { "content-type": "application/json", "idempotency-key": requestId(), ...headers }, body);
    for (const origin of [[], [["origin", "https://elsewhere.example"]]]) expect((await send({ ...Object.fromEntries(origin) as Record<string, string>, cookie: `__Host-vk-device=${token}` })).status).toBe(403);
    expect((await send({ authorization: `Bearer ${token}`, origin: "https://elsewhere.example" })).status).toBe(200);
  });

  it("is put out of use at once, and a new token ends the one before", async () => {
    const pc = await computer(a, "Bench PC 5");
    const status = async (token: string) => (await call("GET", `${ORIGIN}/api/v1/s/first/flow/gear`, { authorization: `Bearer ${token}` })).status;
    const second = newToken();
    must(await makeBenchToken(a.as("owner"), { id: pc.id, token: second }));
    expect([await status(pc.token), await status(second)]).toEqual([401, 200]);
    must(await revokeDevice(a.as("mgr"), { id: pc.id }));
    expect(await status(second)).toBe(401);
    expect(await makeBenchToken(a.as("mgr"), { id: pc.id, token: newToken() })).toMatchObject({ ok: false, refusal: { code: "NOT_A_BENCH" } });
  });
});

describe("the token", () => {
  it("is kept as its hash only: neither device, trail nor answered requests hold it", async () => {
    const { id, token } = await computer(a, "Bench PC 6");
    expect(await behindTheCurtain(`select length(token_hash)::text from devices where id = '${id}'`)).toEqual(["64"]);
    const tables = await behindTheCurtain("select table_name from information_schema.tables where table_schema = 'public' and table_type = 'BASE TABLE' order by 1");
    expect(tables).toEqual(expect.arrayContaining(["audit_log", "command_log", "devices"]));
    const holding = (what: string) => behindTheCurtain(tables.map((t) => `select '${t}' from "${t}" t where t::text like '%${what}%'`).join(" union "));
    expect(await holding(token)).toEqual([]);
    // The question can be answered: the name of the device is found where it stands.
    expect(await holding("Bench PC 6")).toEqual(expect.arrayContaining(["audit_log", "command_log", "devices"]));
  });

  it("is made by those who may set devices up, for a bench computer of their own shop", async () => {
    const { id } = must(await addDevice(a.as("mgr"), { name: "Bench PC 7", kind: "bench" }));
    const clock = must(await addDevice(a.as("mgr"), { name: "Clock 7" })).id;
    await expect(makeBenchToken(a.as("tech"), { id, token: newToken() })).rejects.toThrow();
    expect(await makeBenchToken(b.as("owner"), { id, token: newToken() })).toMatchObject({ ok: false, refusal: { code: "NOT_A_BENCH" } });
    expect(await makeBenchToken(a.as("mgr"), { id: clock, token: newToken() })).toMatchObject({ ok: false, refusal: { code: "NOT_A_BENCH" } });
    expect(await makeBenchToken(a.as("mgr"), { id, token: "short" })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
    expect(await behindTheCurtain(`select count(*)::text from devices where id in ('${id}', '${clock}') and token_hash is not null`)).toEqual(["0"]);
  });

  it("stands in the API's document as a bearer, at each address that takes it", () => {
    const { components, paths } = openApiDocument(ENDPOINTS, ORIGIN);
    expect(components.securitySchemes.device).toMatchObject({ type: "http", scheme: "bearer" });
    for (const [path, method] of [["readings", "post"], ["tests", "post"], ["sheet", "get"], ["gear", "get"]] as const) {
      expect(paths[`/api/v1/s/{shop}/flow/${path}`]?.[method]).toMatchObject({ security: [{ person: [] }, { device: [] }] });
    }
    expect(paths["/api/v1/s/{shop}/invoices"]?.get).toMatchObject({ security: [{ person: [] }] });
  });
});
