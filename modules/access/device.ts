import "server-only";
import { eq } from "drizzle-orm";
import { devices, shops } from "@/db/schema";
import { withSecret } from "@/db/scope";
import { now } from "./clock";
import type { ShopContext } from "./context";
import { isDeviceKind, type DeviceKind } from "./device-kinds";
import type { Act } from "./roles";
import { hashToken } from "./secret-token";

/** What an enrolled thing may do by itself; a person's acts on it need that person's badge or PIN. */
const ACTS: Record<DeviceKind, readonly Act[]> = {
  clock: ["clock.use", "clock.punch"],
  bench: ["flow.record", "flow.see"],
};
/** Put out of use, a clock may still hand over the times it kept; they are looked at before they count. */
const ACTS_REVOKED: Partial<Record<DeviceKind, readonly Act[]>> = { clock: ["clock.punch"] };
/** Where a tablet's token lives: out of reach of scripts, of this site only. */
export const DEVICE_COOKIE = "__Host-vk-device";

/** The token in a request's Cookie header, or null. */
export const deviceCookie = (header: string | null): string | null => new RegExp(`(?:^|;\\s*)${DEVICE_COOKIE}=([\\w-]{20,200})(?:;|$)`).exec(header ?? "")?.[1] ?? null;

/**
 * The context of an enrolled device, from the token it holds; null when unknown, revoked or of another shop.
 * With `revokedToo` a revoked one is known as well, with what it may still do.
 */
export async function deviceContext(token: string, slug?: string, options: { revokedToo?: boolean } = {}): Promise<ShopContext | null> {
  const deviceHash = hashToken(token);
  const found = await withSecret({ deviceHash }, async (tx) => {
    const [row] = await tx.select({ device: devices, shop: shops }).from(devices).innerJoin(shops, eq(shops.id, devices.shopId))
      .where(eq(devices.tokenHash, deviceHash));
    return row;
  });
  if (!found || (slug && found.shop.slug !== slug)) return null;
  const { revokedAt, kind } = found.device;
  if (revokedAt && !options.revokedToo) return null;
  const { createdAt: _, ...shop } = found.shop;
  return {
    shop,
    actor: { kind: "device", id: found.device.id, name: found.device.name, acts: isDeviceKind(kind) ? ((revokedAt ? ACTS_REVOKED : ACTS)[kind] ?? []) : [] },
    now: now(),
    request: { ip: "", agent: "" },
  };
}

