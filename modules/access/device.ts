import "server-only";
import { and, eq, isNull } from "drizzle-orm";
import { devices, shops } from "@/db/schema";
import { withSecret } from "@/db/scope";
import { now } from "./clock";
import type { ShopContext } from "./context";
import type { Act } from "./roles";
import { hashToken } from "./secret-token";

/** What an enrolled thing may do by itself; a person's acts on it need that person's badge or PIN. */
const ACTS: Record<string, readonly Act[]> = {
  clock: ["clock.use"],
  bench: ["flow.record", "flow.see"],
};
export const DEVICE_KINDS = ["clock", "bench"] as const;

/** The context of an enrolled device, from the token it holds; null when unknown, revoked or of another shop. */
export async function deviceContext(token: string, slug?: string): Promise<ShopContext | null> {
  const deviceHash = hashToken(token);
  const found = await withSecret({ deviceHash }, async (tx) => {
    const [row] = await tx.select({ device: devices, shop: shops }).from(devices).innerJoin(shops, eq(shops.id, devices.shopId))
      .where(and(eq(devices.tokenHash, deviceHash), isNull(devices.revokedAt)));
    return row;
  });
  if (!found || (slug && found.shop.slug !== slug)) return null;
  const { createdAt: _, ...shop } = found.shop;
  return {
    shop,
    actor: { kind: "device", id: found.device.id, name: found.device.name, acts: ACTS[found.device.kind] ?? [] },
    now: now(),
    request: { ip: "", agent: "" },
  };
}

