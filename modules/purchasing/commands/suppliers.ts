import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { suppliers } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ok, refuse } from "@/modules/kernel/result";
import { supplierEditInput, supplierInput } from "../input";

const columnsOf = (s: { name: string; email: string; phone: string; address: string; terms: string; leadDays: string }) =>
  ({ name: s.name, email: s.email, phone: s.phone, address: s.address, terms: s.terms, leadDays: s.leadDays === "" ? null : Number(s.leadDays) });

export const addSupplier = defineCommand({
  name: "purchasing.addSupplier",
  act: "purchase.write",
  input: supplierInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(suppliers).values({ shopId: ctx.shop.id, id, ...columnsOf(input) });
    return ok({ id, name: input.name });
  },
  subject: (_, value) => ({ kind: "supplier", id: value.id }),
});

export const changeSupplier = defineCommand({
  name: "purchasing.changeSupplier",
  act: "purchase.write",
  input: supplierEditInput,
  async run(ctx, input) {
    const at = and(eq(suppliers.shopId, ctx.shop.id), eq(suppliers.id, input.id));
    const [changed] = await ctx.tx.update(suppliers).set({ ...columnsOf(input), active: input.active, version: sql`${suppliers.version} + 1` }).where(and(at, eq(suppliers.version, input.version))).returning({ version: suppliers.version });
    if (changed) return ok({ id: input.id, version: changed.version });
    const there = await ctx.tx.select({ id: suppliers.id }).from(suppliers).where(at);
    return there.length ? changedMeanwhile("This supplier") : refuse("NOT_FOUND", "This supplier is not here any more.");
  },
  subject: (input) => ({ kind: "supplier", id: input.id }),
});
