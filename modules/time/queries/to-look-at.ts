import "server-only";
import { and, asc, desc, eq, gt, isNotNull, isNull } from "drizzle-orm";
import { correctionRequests, operations, people, punches, timeEntries } from "@/db/schema";
import { inShop, mustBeAble, personIdOf, type ShopContext } from "@/modules/access/context";
import { isOutMissing } from "../domain/missing-out";

/** Flags that only tell; the others ask for somebody. */
const TELLS_ONLY = ["out of order", "cure overridden", "tablet clock off"];

export interface ToLookAt {
  /** People whose attendance is still open from an earlier day. */
  readonly open: readonly { readonly personId: string; readonly name: string; readonly since: string }[];
  readonly flagged: readonly { readonly id: string; readonly personId: string; readonly name: string; readonly kind: string; readonly at: string; readonly flag: string; readonly note: string; readonly isOwn: boolean }[];
  readonly asked: readonly {
    readonly id: string; readonly personId: string; readonly name: string; readonly clock: string; readonly words: string; readonly startedAt: string; readonly endedAt: string;
    readonly replaces: { readonly startedAt: string; readonly endedAt: string | null } | null; readonly reason: string; readonly askedAt: string; readonly isOwn: boolean;
  }[];
}

/** Exceptions first: what blocks a true week, with names. Looks thirty days back. */
export async function toLookAt(ctx: ShopContext): Promise<ToLookAt> {
  mustBeAble(ctx, "time.see-all");
  const self = personIdOf(ctx);
  const from = new Date(ctx.now.getTime() - 30 * 86_400_000);
  return inShop(ctx, async (tx) => {
    const open = await tx.select({ personId: people.id, name: people.shortName, startedAt: timeEntries.startedAt }).from(timeEntries)
      .innerJoin(people, and(eq(people.shopId, timeEntries.shopId), eq(people.id, timeEntries.personId)))
      .where(and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.clock, "door"), isNull(timeEntries.endedAt), isNull(timeEntries.voidedAt))).orderBy(asc(timeEntries.startedAt));
    const settled = await tx.select({ note: punches.note }).from(punches).where(and(eq(punches.shopId, ctx.shop.id), eq(punches.kind, "settled"), gt(punches.receivedAt, from)));
    const done = new Set(settled.map((s) => s.note.slice(0, 36)));
    const flagged = await tx.select({ id: punches.id, personId: people.id, name: people.shortName, kind: punches.kind, at: punches.at, flag: punches.flag, note: punches.note }).from(punches)
      .innerJoin(people, and(eq(people.shopId, punches.shopId), eq(people.id, punches.personId)))
      .where(and(eq(punches.shopId, ctx.shop.id), isNotNull(punches.flag), gt(punches.receivedAt, from))).orderBy(desc(punches.at)).limit(200);
    const asked = await tx.select({ r: correctionRequests, name: people.shortName, operation: operations.name, oldStart: timeEntries.startedAt, oldEnd: timeEntries.endedAt }).from(correctionRequests)
      .innerJoin(people, and(eq(people.shopId, correctionRequests.shopId), eq(people.id, correctionRequests.personId)))
      .leftJoin(operations, and(eq(operations.shopId, correctionRequests.shopId), eq(operations.id, correctionRequests.operationId)))
      .leftJoin(timeEntries, and(eq(timeEntries.shopId, correctionRequests.shopId), eq(timeEntries.id, correctionRequests.timeEntryId)))
      .where(and(eq(correctionRequests.shopId, ctx.shop.id), isNull(correctionRequests.answer))).orderBy(asc(correctionRequests.askedAt));
    return {
      open: open.filter((o) => isOutMissing(o.startedAt, ctx.now, ctx.shop.zone)).map((o) => ({ personId: o.personId, name: o.name, since: o.startedAt.toISOString() })),
      flagged: flagged.filter((f) => !done.has(f.id) && (f.flag ?? "").split("; ").some((x) => !TELLS_ONLY.includes(x)))
        .map((f) => ({ ...f, at: f.at.toISOString(), flag: f.flag ?? "", isOwn: f.personId === self })),
      asked: asked.map(({ r, name, operation, oldStart, oldEnd }) => ({
        id: r.id, personId: r.personId, name, clock: r.clock, words: r.clock === "door" ? "At the door" : (operation ?? r.indirectCode ?? ""), startedAt: r.startedAt.toISOString(), endedAt: r.endedAt.toISOString(),
        replaces: oldStart ? { startedAt: oldStart.toISOString(), endedAt: oldEnd?.toISOString() ?? null } : null, reason: r.reason, askedAt: r.askedAt.toISOString(), isOwn: r.personId === self,
      })),
    };
  });
}
