import "server-only";
import { eq } from "drizzle-orm";
import { devices, shops } from "@/db/schema";
import { withSecret } from "@/db/scope";
import { now } from "@/modules/access/clock";
import { allowed } from "@/modules/access/rate-limit";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { enrolDevice, newDeviceToken } from "../commands/devices";
import { enrolCodeHash } from "./enrol-code";

const over = () => refuse("CODE_OVER", "This code is not good (any more). Ask the manager for a new one; it works for ten minutes.", { field: "code" });

/** What a tablet does with the code typed into it: finds its shop by the code alone, and gets its token. */
export async function enrolTablet(code: string, from: { ip: string; agent: string }): Promise<Result<{ token: string; name: string; kind: string }>> {
  if (!(await allowed(`enrol:${from.ip}`, 10, 60)) || !(await allowed("enrol", 200, 60))) return refuse("TOO_MANY_TRIES", "Too many tries. Wait a minute and type the code again.", { field: "code" });
  const codeHash = enrolCodeHash(code);
  const found = await withSecret({ deviceHash: codeHash }, async (tx) => {
    const [row] = await tx.select({ id: devices.id, name: devices.name, shop: shops }).from(devices).innerJoin(shops, eq(shops.id, devices.shopId)).where(eq(devices.enrolCodeHash, codeHash));
    return row;
  });
  if (!found) return over();
  const { createdAt: _, ...shop } = found.shop;
  const { token, tokenHash } = newDeviceToken();
  const ctx = { shop, actor: { kind: "device" as const, id: found.id, name: found.name, acts: ["clock.use" as const] }, now: now(), request: from };
  const done = await enrolDevice(ctx, { codeHash, tokenHash });
  return done.ok ? ok({ token, name: done.value.name, kind: done.value.kind }) : over();
}
