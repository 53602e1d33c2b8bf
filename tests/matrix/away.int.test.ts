import { randomUUID } from "node:crypto";
import net from "node:net";
import { sql } from "drizzle-orm";
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from "vitest";
import { closeDatabase, connections } from "@/db/client";
import { awayOf, RecordsAway, type Outcome } from "@/db/outage";
import { withShop, withSystem } from "@/db/scope";
import { secretAction } from "@/modules/access/action";
import { handle, type Endpoint } from "@/modules/access/api";
import { defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { isHealthy } from "@/modules/access/health";
import { addCustomer } from "@/modules/customers/commands";
import { AWAY_WORDS, RECORDS_AWAY } from "@/modules/kernel/away";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { behindTheCurtain, currentDatabase } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { enrolledTablet, type Tablet } from "@/tests/support/tablet";

vi.mock("next/headers", () => ({ headers: () => Promise.resolve(new Headers({ host: "localhost:3999", origin: "http://localhost:3999" })) }));

let a: TestShop, tablet: Tablet, direct: string;
beforeAll(async () => {
  a = await testShop();
  tablet = await enrolledTablet(a);
  direct = currentDatabase().appUrl;
});
// The log of faults is not what is looked at here.
beforeEach(() => { vi.spyOn(console, "error").mockImplementation(() => undefined); });
afterEach(async () => {
  process.env.VK_DATABASE_URL = direct;
  await closeDatabase();
});
const stop: (() => Promise<unknown>)[] = [];
afterAll(async () => { for (const s of stop) await s(); });

/** A port nobody listens on: one that was just given back. */
async function closedPort(): Promise<number> {
  const server = net.createServer();
  await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
  const { port } = server.address() as net.AddressInfo;
  await new Promise((done) => server.close(done));
  return port;
}
const atPort = (port: number): string => { const url = new URL(direct); url.hostname = "127.0.0.1"; url.port = String(port); return url.href; };

/** A line to the database that breaks when the server has carried out a COMMIT, before the client hears of it. */
async function lineThatBreaksAtCommit(): Promise<{ url: string; arm: () => void }> {
  const { hostname, port } = new URL(direct);
  let isArmed = false;
  const server = net.createServer((client) => {
    const up = net.connect(Number(port), hostname);
    let isCutting = false;
    client.on("data", (bytes) => {
      if (isArmed && bytes.includes("commit")) { isArmed = false; isCutting = true; }
      up.write(bytes);
    });
    up.on("data", (bytes) => { if (isCutting) { client.destroy(); up.end(); } else client.write(bytes); });
    for (const [one, other] of [[client, up], [up, client]] as const) {
      one.on("error", () => other.destroy());
      one.on("close", () => other.destroy());
    }
  });
  await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
  stop.push(() => new Promise((done) => server.close(done)));
  return { url: atPort((server.address() as net.AddressInfo).port), arm: () => { isArmed = true; } };
}

const dropOwnConnection = (tx: TxContext["tx"]) => tx.execute(sql`select pg_terminate_backend(pg_backend_pid()), pg_sleep(1)`);

/** Adds a customer, and on the way loses the database in the manner asked for. */
const addInTrouble = defineCommand({
  name: "test.addInTrouble", act: "customers.write", input: z.strictObject({ name: z.string(), trouble: z.enum(["none", "terminated", "refused, then terminated"]) }),
  run: async (ctx, { name, trouble }): Promise<Result<{ id: string }>> => {
    const added = await addCustomer(ctx, { name, phone: "5550100" });
    if (trouble === "terminated") await dropOwnConnection(ctx.tx);
    if (trouble === "refused, then terminated") {
      await dropOwnConnection(ctx.tx).catch(() => undefined);
      return refuse("NOT_THIS_ONE", "This one is refused.");
    }
    return added.ok ? ok({ id: added.value.id }) : added;
  },
});
const endpoint: Endpoint<typeof addInTrouble.spec.input, { id: string }> = {
  method: "POST", path: "/api/v1/test/add", summary: "", input: addInTrouble.spec.input, by: ["device"],
  run: (_, input, requestId) => addInTrouble(a.as("counter"), input, requestId ? { requestId } : {}),
};
const post = (input: object, key: string = randomUUID()): Promise<Response> => handle(endpoint)(
  new Request("http://localhost:3999/api/v1/test/add", { method: "POST", body: JSON.stringify(input), headers: { authorization: `Bearer ${tablet.token}`, "idempotency-key": key } }),
  { params: Promise.resolve({}) },
);
const action = secretAction(addInTrouble, () => Promise.resolve(a.as("counter")));
const counted = (name: string) => behindTheCurtain(`select count(*) from customers where name = '${name}'`);

async function expectAway(response: Response, outcome: Outcome): Promise<void> {
  expect(response.status).toBe(503);
  expect(Number(response.headers.get("retry-after"))).toBeGreaterThan(0);
  expect(await response.json()).toMatchObject({ status: 503, code: "TRY_AGAIN", title: AWAY_WORDS[outcome] });
}

describe("a connection terminated in the middle of a command", () => {
  it("answers 503 with Retry-After; nothing is written, and the same request goes through afterwards", async () => {
    const key = randomUUID();
    await expectAway(await post({ name: "Mid Command", trouble: "terminated" }, key), "nothing");
    expect(await counted("Mid Command")).toEqual(["0"]);
    const again = await post({ name: "Mid Command", trouble: "none" }, key);
    expect(again.status).toBe(200);
    expect(await counted("Mid Command")).toEqual(["1"]);
  });
  it("is told to a person in words", async () => {
    expect(await action("secret", { requestId: randomUUID(), input: { name: "By Hand", trouble: "terminated" } }))
      .toEqual({ status: "refused", code: "TRY_AGAIN", message: AWAY_WORDS.nothing });
  });
  it("carries the digest that a page reads, and the first cause", async () => {
    const error: unknown = await withShop(a.shop.id, dropOwnConnection).catch((e: unknown) => e);
    expect(error).toBeInstanceOf(RecordsAway);
    expect(error).toMatchObject({ digest: RECORDS_AWAY, outcome: "nothing" });
    expect(JSON.stringify((error as Error).cause, ["code", "cause"])).toContain("57P01");
  });
  it("does not turn a refusal into a fault", async () => {
    const response = await post({ name: "Refused", trouble: "refused, then terminated" });
    expect(response.status).toBe(422);
    expect(await response.json()).toMatchObject({ code: "NOT_THIS_ONE" });
  });
  it("gives every connection back, whatever step it broke at", async () => {
    const pool = connections();
    const most = pool.options.max;
    // Lent out, cut while nobody speaks on it, and given back into use: the next BEGIN fails.
    for (let i = 0; i < most + 3; i++) {
      const held = await pool.connect();
      const { rows: [me] } = await held.query<{ pid: number }>("select pg_backend_pid() as pid");
      held.release();
      await behindTheCurtain(`select pg_terminate_backend(${me?.pid ?? 0})`);
      await withSystem("a BEGIN on a cut connection", (tx) => tx.execute(sql`select 1`)).catch((error: unknown) => expect(awayOf(error)).toBe("nothing"));
      await withShop(a.shop.id, dropOwnConnection).catch((error: unknown) => expect(awayOf(error)).toBe("nothing"));
    }
    expect(pool.totalCount - pool.idleCount).toBe(0);
    expect(await isHealthy()).toBe(true);
  });
  it("does not end the process when the connection breaks while it is lent out and silent", async () => {
    const heard = vi.fn();
    process.on("uncaughtException", heard);
    const error: unknown = await withShop(a.shop.id, async (tx) => {
      const { rows: [me] } = await tx.execute<{ pid: number }>(sql`select pg_backend_pid() as pid`);
      await behindTheCurtain(`select pg_terminate_backend(${me?.pid ?? 0})`);
      await new Promise((done) => setTimeout(done, 100));
      return tx.execute(sql`select 1`);
    }).catch((e: unknown) => e);
    process.off("uncaughtException", heard);
    expect(awayOf(error)).toBe("nothing");
    expect(heard).not.toHaveBeenCalled();
  });
});

describe("a COMMIT whose answer never came", () => {
  it("answers 503 and says that a repeat is safe; the repeat gets the first answer and writes nothing twice", async () => {
    const line = await lineThatBreaksAtCommit();
    await closeDatabase();
    process.env.VK_DATABASE_URL = line.url;
    const key = randomUUID();
    // The tablet is looked up in a transaction of its own first; the line breaks at the command's.
    const endsInTrouble: typeof endpoint = { ...endpoint, run: (...args) => { line.arm(); return endpoint.run(...args); } };
    const response = await handle(endsInTrouble)(
      new Request("http://localhost:3999/api/v1/test/add", { method: "POST", body: JSON.stringify({ name: "Half Told", trouble: "none" }), headers: { authorization: `Bearer ${tablet.token}`, "idempotency-key": key } }),
      { params: Promise.resolve({}) },
    );
    await expectAway(response, "unknown");
    expect(await counted("Half Told")).toEqual(["1"]);
    const again = await post({ name: "Half Told", trouble: "none" }, key);
    expect(again.status).toBe(200);
    const { id } = (await again.json()) as { id: string };
    expect(await behindTheCurtain("select id from customers where name = 'Half Told'")).toEqual([id]);
  });
  it("is told to a person in the same words", async () => {
    const line = await lineThatBreaksAtCommit();
    await closeDatabase();
    process.env.VK_DATABASE_URL = line.url;
    line.arm();
    expect(await action("secret", { requestId: randomUUID(), input: { name: "Half Told by Hand", trouble: "none" } }))
      .toEqual({ status: "refused", code: "TRY_AGAIN", message: AWAY_WORDS.unknown });
  });
  it("is not claimed when the COMMIT was refused in words", async () => {
    await behindTheCurtain(`
      create function refuse_at_commit() returns trigger language plpgsql as $$ begin if new.name = 'Refused At Commit' then raise exception 'no' using errcode = '23514'; end if; return null; end $$;
      create constraint trigger refuse_at_commit after insert on customers deferrable initially deferred for each row execute function refuse_at_commit();`);
    const error: unknown = await withShop(a.shop.id, async (tx) => must(await addCustomer({ ...a.as("counter"), tx }, { name: "Refused At Commit", phone: "5550101" }))).catch((e: unknown) => e);
    expect(awayOf(error)).toBeNull();
    expect(await counted("Refused At Commit")).toEqual(["0"]);
    expect(await isHealthy()).toBe(true);
  });
});

describe("a database that is not there", () => {
  it("answers 503 already where the caller is looked up, outside any command", async () => {
    await closeDatabase();
    process.env.VK_DATABASE_URL = atPort(await closedPort());
    await expectAway(await post({ name: "Nobody Home", trouble: "none" }), "nothing");
    expect(await isHealthy()).toBe(false);
    expect(await action("secret", { requestId: randomUUID(), input: { name: "Nobody Home", trouble: "none" } })).toMatchObject({ code: "TRY_AGAIN" });
  });
  it("is told from one that has no room left for a connection", async () => {
    await closeDatabase();
    await behindTheCurtain(`alter database ${currentDatabase().name} connection limit 0`);
    const error: unknown = await withSystem("no room", (tx) => tx.execute(sql`select 1`)).catch((e: unknown) => e);
    await behindTheCurtain(`alter database ${currentDatabase().name} connection limit -1`);
    expect(awayOf(error)).toBe("nothing");
    expect(JSON.stringify((error as Error).cause, ["code", "cause"])).toContain("53300");
  });
});

describe("a statement that ran into its limit", () => {
  it("answers 503, and its connection goes on", async () => {
    const error: unknown = await withShop(a.shop.id, async (tx) => {
      await tx.execute(sql`set local statement_timeout = 20`);
      await tx.execute(sql`select pg_sleep(1)`);
    }).catch((e: unknown) => e);
    expect(awayOf(error)).toBe("nothing");
    expect(connections().idleCount).toBe(1);
  });
});
