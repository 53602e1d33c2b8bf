import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { withShop } from "@/db/scope";
import { NotFound, type ShopContext } from "@/modules/access/context";
import { ROLES, rolesFor, type Role } from "@/modules/access/roles";
import { allCommands, allEndpoints, allQueries, idPaths } from "./enumerate";
import { ENDPOINT_CASES, QUERY_CASES, READS_NOTHING, type QueryCase } from "./query-cases";
import { CANARY, inRole, NOW, positions, twoShops, type World } from "./world";

const keyOf = (file: string, name: string) => `${file.replace(/^modules\//, "").replace(/\.ts$/, "")} ${name}`;
const queries = (await allQueries()).map((query) => ({ ...query, key: keyOf(query.file, query.name) }));
const endpoints = (await allEndpoints()).map((e) => ({ ...e, key: `${e.value.method} ${e.value.path}` }));
const commandInputs = new Set((await allCommands()).map((c) => c.value.spec.input));

let world: World;
beforeAll(async () => { world = await twoShops(); }, 120_000);
afterAll(() => world.close());

type Fn = Parameters<QueryCase["call"]>[0];

function customerOf(whose: "theirs" | "nobody"): ShopContext {
  const b = whose === "theirs";
  return { ...world.a.as("owner", NOW), actor: { kind: "customer", id: b ? world.b.hero.customerId : randomUUID(), name: "Somebody", linkId: b ? (world.theirs.links?.[0]?.id ?? "") : randomUUID(), purpose: "estimate", subjectId: b ? world.b.estimateId : randomUUID() } };
}

/** What comes back, as the other side would read it; maps and dates too. */
const readable = (value: unknown): unknown => JSON.parse(JSON.stringify(value ?? null, (_, v: unknown) => (v instanceof Map ? [...v] : typeof v === "bigint" ? String(v) : Buffer.isBuffer(v) ? v.toString("latin1") : v))) as unknown;

async function ask(fn: Fn, one: QueryCase, ctx: ShopContext, at: Parameters<QueryCase["call"]>[2]): Promise<unknown> {
  try {
    return readable(await withShop(ctx.shop.id, async (tx) => one.call(fn, { ...ctx, tx }, at)));
  } catch (error) {
    if (error instanceof NotFound) return "not found";
    throw error;
  }
}
const uuids = /[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/g;
const alike = (answer: unknown) => JSON.stringify(answer).replace(uuids, "id");
const rows = queries.flatMap((query) => { const one = QUERY_CASES[query.key]; return one ? [[query.key, query.value as unknown as Fn, one] as const] : []; });

describe("the list of queries", () => {
  it("has a case for every exported query and endpoint with ids, and none too many", () => {
    expect(queries.length).toBeGreaterThan(40);
    expect(queries.map((query) => query.key).filter((k) => !QUERY_CASES[k] && !READS_NOTHING[k]), "write a case in tests/matrix/query-cases.ts").toEqual([]);
    expect([...Object.keys(QUERY_CASES), ...Object.keys(READS_NOTHING)].filter((k) => !queries.some((query) => query.key === k)), "cases of queries that are gone").toEqual([]);
    const needing = endpoints.filter((e) => !commandInputs.has(e.value.input) && idPaths(e.value.input).length > 0).map((e) => e.key);
    expect(needing.filter((k) => !ENDPOINT_CASES[k]), "write a case for the endpoint in tests/matrix/query-cases.ts").toEqual([]);
    expect(Object.keys(ENDPOINT_CASES).filter((k) => !endpoints.some((e) => e.key === k)), "cases of endpoints that are gone").toEqual([]);
  });
});

describe("A's people looking for what is B's", () => {
  it.each(rows)("%s finds nothing of B, and answers as for an id that never was", async (_, fn, one) => {
    const call = async (whose: "theirs" | "nobody") => ask(fn, one, one.as === "customer" ? customerOf(whose) : world.a.as("owner", NOW), positions(world, whose, null).at);
    const theirs = await call("theirs");
    expect(JSON.stringify(theirs)).not.toContain(CANARY);
    expect(alike(theirs)).toBe(alike(await call("nobody")));
  });
  it.each(endpoints.filter((e) => !commandInputs.has(e.value.input)).map((e) => [e.key, e.value] as const))("%s finds nothing of B", async (key, endpoint) => {
    const ctx = endpoint.by.includes("person") ? world.a.as("owner", NOW) : await world.a.tablet.at(NOW);
    const call = async (whose: "theirs" | "nobody") => {
      const raw = ENDPOINT_CASES[key]?.(positions(world, whose, null).at) ?? {};
      const searched = endpoint.input.safeParse({ ...raw, q: CANARY });
      const parsed = searched.success ? searched : endpoint.input.safeParse(raw);
      if (!parsed.success) throw new Error(`${key} needs a case in tests/matrix/query-cases.ts: ${parsed.error.message}`);
      try {
        return readable(await endpoint.run(ctx, parsed.data, null));
      } catch (error) {
        if (error instanceof NotFound) return "not found";
        throw error;
      }
    };
    const theirs = await call("theirs");
    expect(JSON.stringify(theirs)).not.toContain(CANARY);
    expect(alike(theirs)).toBe(alike(await call("nobody")));
  });
  it("would be noticed: B itself finds its canary", async () => {
    const found = await Promise.all(["customers/queries findCustomers", "work-orders/queries/find findAnything", "work-orders/queries/order-page orderPage", "stock/queries/get-part getPart", "purchasing/queries/suppliers findSuppliers"].map(async (key) => {
      const row = rows.find(([k]) => k === key);
      if (!row) throw new Error(key);
      return JSON.stringify(await ask(row[1], row[2], world.b.as("owner", NOW), positions(world, "theirs", null).at)).includes(CANARY);
    }));
    expect(found).toEqual(found.map(() => true));
  });
});

/** What a role may not read; each word as it could stand in a name. */
const COST_KEYS = /cost|margin|profit|burden|averageMinor|^valueMinor|issuedValue|landed|priceValue|freightShare/i;
const SECRET_KEYS = /pinHash|passwordHash|tokenHash|enrolCode|^rateMinor|payRate|wage/i;

/** Whoever writes purchase orders types the supplier's prices, so they see what was typed and what came of it. */
const OWN_WRITING: Record<string, readonly Role[]> = { "purchasing/queries/orders getOrder": ["counter"] };

/** Keys with something in them: a key that is null tells nothing. */
function keysOf(value: unknown, into = new Set<string>()): Set<string> {
  if (Array.isArray(value)) for (const v of value) keysOf(v, into);
  else if (typeof value === "object" && value !== null) {
    for (const [k, v] of Object.entries(value)) {
      if (v !== null && v !== undefined && typeof v !== "object") into.add(k);
      keysOf(v, into);
    }
  }
  return into;
}

describe("roles at the queries", () => {
  const guarded = rows.filter(([, , one]) => one.act !== null);
  it.each(guarded)("%s does not exist for a role that is not listed for its act", async (_, fn, one) => {
    const allowed: readonly Role[] = one.act ? rolesFor(one.act) : [];
    for (const role of ROLES.filter((r) => !allowed.includes(r))) expect(await ask(fn, one, inRole(world.a, role), positions(world, "nobody", null).at), role).toBe("not found");
    expect(allowed.length).toBeGreaterThan(0);
  });
  it.each(guarded)("%s shows no cost, margin, pay or secret to counter and technician", async (key, fn, one) => {
    // In B, where every table has a row and every name leads somewhere, so that there is something to leave out.
    for (const role of ["counter", "technician"] as const) {
      const answer = await ask(fn, one, inRole(world.b, role), positions(world, "theirs", null).at);
      const keys = [...keysOf(answer)];
      const told = keys.filter((k) => COST_KEYS.test(k) || SECRET_KEYS.test(k));
      expect(told, role).toEqual(OWN_WRITING[key]?.includes(role) ? expect.not.arrayContaining(["averageMinor", "rateMinor"]) : []);
    }
    for (const role of ROLES) expect([...keysOf(await ask(fn, one, inRole(world.b, role), positions(world, "theirs", null).at))].filter((k) => /hash$|enrolCode/i.test(k) && k !== "documentHash"), role).toEqual([]);
  });
  it("would be noticed: the owner does see cost", async () => {
    const seen = new Set<string>();
    for (const [, fn, one] of guarded) for (const k of keysOf(await ask(fn, one, world.b.as("owner", NOW), positions(world, "theirs", null).at))) if (COST_KEYS.test(k) || SECRET_KEYS.test(k)) seen.add(k);
    expect([...seen].sort().length).toBeGreaterThan(2);
  });
});
