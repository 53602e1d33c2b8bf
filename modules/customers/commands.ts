import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { customers } from "@/db/schema";
import { ableTo } from "@/modules/access/context";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ok, refuse } from "@/modules/kernel/result";
import { parseDecimal } from "@/modules/kernel/money";
import { nameKey, phoneDigits } from "./domain/search-key";
import { customerEditInput, customerInput } from "./input";

/** Discounts on labor above this ask for the manager. */
const DISCOUNT_LIMIT_BP = 500;

function basisPoints(percent: string): number {
  const p = parseDecimal((percent || "0").replace(",", "."));
  return p ? Number((p.units * 100n) / 10n ** BigInt(p.scale)) : 0;
}

const columnsOf = (c: { kind: string; name: string; email: string; phone: string; address: string; terms: string; laborDiscountPercent: string; notes: string }) => ({
  kind: c.kind, name: c.name, nameKey: nameKey(c.name), email: c.email || null, phone: c.phone || null, phoneDigits: phoneDigits(c.phone),
  address: c.address, terms: c.terms, laborDiscountBasisPoints: basisPoints(c.laborDiscountPercent), notes: c.notes,
});

const tooMuch = () => refuse("DISCOUNT_TOO_LARGE", "A discount above 5 % is the manager's to give.", { field: "laborDiscountPercent" });

export const addCustomer = defineCommand({
  name: "customers.add",
  act: "customers.write",
  input: customerInput,
  async run(ctx, input) {
    const values = columnsOf(input);
    if (values.laborDiscountBasisPoints > DISCOUNT_LIMIT_BP && !ableTo(ctx, "discount.large")) return tooMuch();
    const id = randomUUID();
    await ctx.tx.insert(customers).values({ shopId: ctx.shop.id, id, ...values });
    return ok({ id, name: input.name });
  },
  subject: (_, value) => ({ kind: "customer", id: value.id }),
});

export const changeCustomer = defineCommand({
  name: "customers.change",
  act: "customers.write",
  input: customerEditInput,
  subject: (input) => ({ kind: "customer", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const values = columnsOf(input);
    if (values.laborDiscountBasisPoints > DISCOUNT_LIMIT_BP && !ableTo(ctx, "discount.large")) return tooMuch();
    const at = and(eq(customers.shopId, ctx.shop.id), eq(customers.id, id));
    const changed = await ctx.tx.update(customers).set({ ...values, version: sql`${customers.version} + 1` }).where(and(at, eq(customers.version, version))).returning({ version: customers.version });
    if (changed[0]) return ok({ id, version: changed[0].version });
    const there = await ctx.tx.select({ id: customers.id }).from(customers).where(at);
    return there.length ? changedMeanwhile("This customer") : refuse("NOT_FOUND", "This customer is not here any more.");
  },
});
