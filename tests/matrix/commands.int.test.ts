import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { NotFound, type ShopContext } from "@/modules/access/context";
import { can, ROLES, rolesFor, type Act, type Role } from "@/modules/access/roles";
import { COMMAND_CASES, NAMES_NOTHING, type Case } from "./command-cases";
import { allCommands, idPaths, pathsOf } from "./enumerate";
import { CANARY, inRole, NOW, positions, twoShops, type World } from "./world";

const commands = await allCommands();
let world: World;
beforeAll(async () => {
  world = await twoShops();
  await world.all.query("insert into provider_events (id, type, body, shop_ref, parked_reason) values ('evt_of_b', 'charge.refunded', '{}', $1, 'set aside')", [world.b.shop.id]);
}, 120_000);
afterAll(() => world.close());

/** Who of A asks, for a case; `whose` matter a customer's link names. */
async function asker(one: Case, whose: "theirs" | "nobody"): Promise<ShopContext> {
  if (one.as === "tablet") return world.a.tablet.at(NOW);
  const owner = world.a.as("owner", NOW);
  if (one.as !== "customer") return owner;
  const matter = whose === "theirs" ? world.b.estimateId : randomUUID();
  const link = whose === "theirs" ? (world.theirs.links?.[0]?.id ?? "") : randomUUID();
  return { ...owner, actor: { kind: "customer", id: whose === "theirs" ? world.b.hero.customerId : randomUUID(), name: "Somebody", linkId: link, purpose: "estimate", subjectId: matter } };
}

async function outcome(call: () => Promise<unknown>): Promise<unknown> {
  try {
    return await call();
  } catch (error) {
    if (error instanceof NotFound) return "not found";
    throw error;
  }
}
const isRefused = (answer: unknown) => answer === "not found" || (answer as { ok: boolean }).ok === false;
const cases = commands.flatMap((c) => { const one = COMMAND_CASES[c.value.spec.name]; return one ? [{ ...c, title: c.value.spec.name, one }] : []; });

describe("the list of cases", () => {
  it("finds the commands", () => expect(commands.length).toBeGreaterThan(70));
  it("has a case for every command that takes an id, and none too many", () => {
    const names = commands.map((c) => c.value.spec.name);
    expect([...new Set(names)].sort(), "two commands of one name").toEqual([...names].sort());
    const without = commands.filter((c) => !COMMAND_CASES[c.value.spec.name] && !NAMES_NOTHING.includes(c.value.spec.name)).map((c) => `${c.value.spec.name} in ${c.file}`);
    expect(without, "write a case in tests/matrix/command-cases.ts").toEqual([]);
    expect([...Object.keys(COMMAND_CASES), ...NAMES_NOTHING].filter((n) => !names.includes(n)), "cases of commands that are gone").toEqual([]);
  });
  it.each(commands.filter((c) => NAMES_NOTHING.includes(c.value.spec.name)).map((c) => [c.value.spec.name, c.value] as const))("%s indeed takes no id", (_, command) => expect(idPaths(command.spec.input)).toEqual([]));
  it.each(cases.map((c) => [c.title, c] as const))("%s puts an id at every place of its input", (_, { value, one }) => {
    const filled = [one.input, ...(one.also ?? [])].flatMap((make) => {
      const { at, seen } = positions(world, "theirs", null);
      const input = make(at, world);
      expect(value.spec.input.safeParse(input), "the input must reach the command").toMatchObject({ success: true });
      return pathsOf(input, new Set(seen().map((s) => s.id)));
    });
    expect([...new Set([...filled, ...(one.ownMade ?? [])])].sort()).toEqual(expect.arrayContaining(idPaths(value.spec.input)));
  });
});

describe("A's people with B's ids", () => {
  it.each(cases.map((c) => [c.title, c] as const))("%s finds nothing, changes nothing, and answers as for an id that never was", async (_, { value, one }) => {
    const before = await world.digestOfB();
    for (const make of [one.input, ...(one.also ?? [])]) {
      const ask = async (whose: "theirs" | "nobody", only: number | null) => {
        const { at, seen } = positions(world, whose, only);
        const input = make(at, world);
        const ctx = await asker(one, whose);
        return { answer: await outcome(() => value(ctx, input)), places: seen().length };
      };
      const theirs = await ask("theirs", null);
      const nobody = await ask("nobody", null);
      expect(isRefused(theirs.answer), JSON.stringify(theirs.answer)).toBe(true);
      expect(theirs.answer).toEqual(nobody.answer);
      expect(JSON.stringify(theirs.answer)).not.toContain(CANARY);
      // Each place alone, with ids of A's own at the others, so that an earlier look-up cannot hide a later one.
      for (let only = 0; theirs.places > 1 && only < theirs.places; only++) {
        const [t, n] = [await ask("theirs", only), await ask("nobody", only)];
        const ids = /[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/g;
        const plain = (answer: unknown) => JSON.stringify(answer).replace(ids, "id");
        expect(plain(t.answer), `place ${only}`).toBe(plain(n.answer));
        expect(plain(t.answer)).not.toContain(CANARY);
      }
    }
    expect(await world.digestOfB()).toEqual(before);
  });
});

describe("roles", () => {
  const rows = commands.map((c) => [c.value.spec.name, c.value] as const);
  it.each(rows)("%s does not exist for a role that is not listed for its act", async (_, command) => {
    const allowed: readonly Role[] = rolesFor(command.spec.act);
    const before = await world.digestOfB();
    for (const role of ROLES) {
      const ctx = inRole(world.a, role);
      expect(can(ctx.actor, command.spec.act)).toBe(allowed.includes(role));
      if (allowed.includes(role)) continue;
      expect(await outcome(() => command(ctx, {})), role).toBe("not found");
    }
    expect(await world.digestOfB()).toEqual(before);
  });
  it.each(rows)("%s does not exist for a tablet or a customer, unless it is theirs", async (_, command) => {
    const act: Act = command.spec.act;
    const tablet = await world.a.tablet.at(NOW);
    if (!["clock.use", "clock.punch"].includes(act)) expect(await outcome(() => command(tablet, {}))).toBe("not found");
    else expect(can(tablet.actor, act)).toBe(true);
    const customer = await asker({ as: "customer", input: () => ({}) }, "nobody");
    if (!["customer.approve", "customer.pay"].includes(act)) expect(await outcome(() => command(customer, {}))).toBe("not found");
    else expect(can(customer.actor, act)).toBe(true);
  });
});
