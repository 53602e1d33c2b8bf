import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { menuOperations } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ok, refuse } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { menuEditInput, menuInput } from "../input";

const columnsOf = (m: z.output<typeof menuInput>) => ({
  code: m.code, name: m.name, customerWords: m.customerWords, station: m.station, skill: m.skill, sequence: m.sequence, bookMinutes: m.bookHours,
  priceMinor: m.price, billing: m.billing, needsBefore: m.needsBefore, mustRecord: m.mustRecord, hazards: m.hazards,
});

/** A new operation on the priced menu. */
export const addMenuOperation = defineCommand({
  name: "menu.add",
  act: "menu.write",
  input: menuInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(menuOperations).values({ shopId: ctx.shop.id, id, ...columnsOf(input) });
    return ok({ id, code: input.code });
  },
  subject: (_, value) => ({ kind: "menu-operation", id: value.id }),
});

/** Changes price, hours or words for estimates written from now on. Agreed lines keep what was agreed. The code stays. */
export const changeMenuOperation = defineCommand({
  name: "menu.change",
  act: "menu.write",
  input: menuEditInput,
  async run(ctx, { id, version, active, ...input }) {
    const at = and(eq(menuOperations.shopId, ctx.shop.id), eq(menuOperations.id, id));
    const [before] = await ctx.tx.select({ code: menuOperations.code }).from(menuOperations).where(at);
    if (!before) return refuse("NOT_FOUND", "This operation is not on the menu any more.");
    if (before.code !== input.code) return refuse("CODE_FIXED", "The code of an operation stays, because orders refer to it. Add a new one and retire this.", { field: "code" });
    const [row] = await ctx.tx.update(menuOperations).set({ ...columnsOf(input), active, version: sql`${menuOperations.version} + 1` })
      .where(and(at, eq(menuOperations.version, version))).returning({ version: menuOperations.version });
    return row ? ok({ id, version: row.version }) : changedMeanwhile("This operation");
  },
  subject: (input) => ({ kind: "menu-operation", id: input.id }),
});
