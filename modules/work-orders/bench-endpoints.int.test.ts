import { beforeAll, describe, expect, it } from "vitest";
import { handle } from "@/modules/access/api";
import { findCustomersEndpoint } from "@/modules/customers/endpoints";
import type { ClockBoard } from "@/modules/time/board";
import { revokeDevice } from "@/modules/time/commands/devices";
import { peopleAtEndpoint } from "@/modules/time/endpoints";
import { benchJob } from "@/tests/support/bench-job";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { enrolledTablet } from "@/tests/support/tablet";
import { clockBoardEndpoint, pressEndpoint } from "./bench-endpoints";

let a: TestShop;
beforeAll(async () => { a = await testShop("first"); });

describe("a tablet's token at an address that is not a clock's", () => {
  it("is nobody there, and is known at the clock's own until it is revoked", async () => {
    const other = await enrolledTablet(a, "Bench 7");
    const ask = (endpoint: Parameters<typeof handle>[0], path: string) =>
      handle(endpoint)(new Request(`http://localhost:3999${path}`, { headers: { authorization: `Bearer ${other.token}` } }), { params: Promise.resolve(path.includes("/s/") ? { shop: "first" } : undefined) });
    expect((await ask(findCustomersEndpoint, "/api/v1/s/first/customers")).status).toBe(401);
    expect((await ask(peopleAtEndpoint, "/api/v1/s/first/time/now")).status).toBe(401);
    const board = await ask(clockBoardEndpoint, "/api/v1/clock/board");
    expect(board.status).toBe(200);
    const text = await board.text();
    expect((JSON.parse(text) as ClockBoard).people).toHaveLength(8);
    expect(text).not.toMatch(/rate|price|Minor|B-0\d|\$argon2/);
    must(await revokeDevice(a.as("mgr"), { id: other.id }));
    expect((await ask(clockBoardEndpoint, "/api/v1/clock/board")).status).toBe(401);
  });
});

describe("kept presses sent to one address", () => {
  it("arrive each once, in order, however often they are sent", async () => {
    const tablet = await enrolledTablet(a, "Bench 8");
    const job = await benchJob(a, ["intake", "exhaust"]);
    const start = Date.now();
    const minutesAgo = (m: number) => new Date(start - m * 60_000).toISOString();
    const pass = await tablet.pass("rcv", "B-06", minutesAgo(60));
    const item = (press: string, m: number, more: object = {}) => ({ key: requestId(), body: { press, input: { ...pass, deviceAt: minutesAgo(m), offsetMs: 0, ...more } } });
    const kept = [item("doorIn", 60), item("startOperation", 59.5, { operationId: job.op("intake") }), item("switchTo", 59, { operationId: job.op("exhaust") }), item("operationDone", 58.5), item("doorOut", 58)];
    const send = (k: (typeof kept)[number]) => handle(pressEndpoint)(new Request("http://localhost:3999/api/v1/clock/punches", {
      method: "POST", headers: { authorization: `Bearer ${tablet.token}`, "content-type": "application/json", "idempotency-key": k.key }, body: JSON.stringify(k.body),
    }), { params: Promise.resolve(undefined) });
    for (const k of kept) for (const _ of [1, 2]) {
      const response = await send(k);
      expect([response.status, ((await response.json()) as { doubt: string | null }).doubt]).toEqual([200, null]);
    }
    expect(await behindTheCurtain(`select kind from punches where person_id = '${a.people.rcv}' order by seq`)).toEqual(["in", "start", "switch", "done", "out"]);
    expect(await behindTheCurtain(`select clock || ' ' || extract(epoch from ended_at - started_at)::int from time_entries where person_id = '${a.people.rcv}' order by started_at, clock`)).toEqual(["door 120", "bench 30", "bench 30"]);
  });
});
