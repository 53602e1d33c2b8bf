import "server-only";
import { notFound, redirect } from "next/navigation";
import type { ReactNode } from "react";
import { can, type Act } from "./roles";
import { NotFound, type ShopContext } from "./context";
import { shopContextOrNull } from "./session";

/** For pages: the shop's context, or sign-in, or "not found". The data layer asks again. */
export async function shopPage(params: Promise<{ shop: string }>, act?: Act): Promise<ShopContext> {
  const { shop } = await params;
  let ctx: ShopContext | null;
  try {
    ctx = await shopContextOrNull(shop);
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
  if (!ctx) redirect(`/sign-in?next=${encodeURIComponent(`/s/${shop}`)}`);
  if (act && !can(ctx.actor, act)) notFound();
  return ctx;
}

/**
 * A layout that asks for the role before the loading file beside it begins the answer: once shapes have been sent, the
 * answer is 200 and can say "not found" in words only. The page and the data layer ask again.
 */
export const guardedBy = (act: Act) =>
  async function Guarded({ children, params }: { children: ReactNode; params: Promise<{ shop: string }> }) {
    await shopPage(params, act);
    return children;
  };

/** Turns the data layer's "not found" into the page's. */
export async function orNotFound<T>(work: Promise<T>): Promise<T> {
  try {
    return await work;
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}
