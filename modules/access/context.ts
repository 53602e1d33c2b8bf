import "server-only";
import { eq } from "drizzle-orm";
import { shopSettings } from "@/db/schema";
import { withShop, type Tx } from "@/db/scope";
import { can, type Act, type Actor } from "./roles";

/** Public facts of the shop a request is in. */
export interface Shop {
  readonly id: string;
  readonly slug: string;
  readonly name: string;
  readonly zone: string;
  readonly currency: string;
  readonly locale: string;
}

/** Who acts, in which shop, when. Handed to every command and query; there is no ambient shop. */
export interface ShopContext {
  readonly shop: Shop;
  readonly actor: Actor;
  readonly now: Date;
  readonly request: { readonly ip: string; readonly agent: string };
  /** The open transaction; a query or command called with it joins. */
  readonly tx?: Tx;
}
export type TxContext = ShopContext & { readonly tx: Tx };

/** Id of the person who acts, or null when it is not a person of the shop. */
export const personIdOf = (ctx: ShopContext): string | null => (ctx.actor.kind === "person" ? ctx.actor.id : null);

/** Missing, foreign and forbidden look alike to the caller. */
export class NotFound extends Error {
  constructor(what = "not found") {
    super(what);
    this.name = "NotFound";
  }
}

/** @throws NotFound when the actor may not: an address a role may not see does not exist for it. */
export function mustBeAble(ctx: ShopContext, act: Act): void {
  if (!can(ctx.actor, act)) throw new NotFound();
}

export const ableTo = (ctx: ShopContext, act: Act): boolean => can(ctx.actor, act);

/** Runs in the shop's transaction: the open one, or one of its own. */
export function inShop<T>(ctx: ShopContext, fn: (tx: Tx) => Promise<T>): Promise<T> {
  return ctx.tx ? fn(ctx.tx) : withShop(ctx.shop.id, fn);
}

/** The shop's settings row. @throws NotFound */
export async function settingsOf(ctx: ShopContext) {
  const [row] = await inShop(ctx, (tx) => tx.select().from(shopSettings).where(eq(shopSettings.shopId, ctx.shop.id)));
  if (!row) throw new NotFound("shop settings");
  return row;
}
