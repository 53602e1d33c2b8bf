import "server-only";
import { sql } from "drizzle-orm";
import { connections, type Tx } from "./client";
import { transact } from "./transaction";

export type { Tx } from "./client";

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

/** Opens the room of one shop: a transaction in which row security shows that shop and no other. */
export function withShop<T>(shopId: string, fn: (tx: Tx) => Promise<T>): Promise<T> {
  if (!UUID.test(shopId)) throw new TypeError("not a shop id");
  return transact(connections(), async (tx) => {
    await tx.execute(sql`select set_config('app.shop_id', ${shopId}, true)`);
    return fn(tx);
  });
}

/** Memberships of one signed-in user, over the shops. */
export function withUser<T>(userId: string, fn: (tx: Tx) => Promise<T>): Promise<T> {
  return transact(connections(), async (tx) => {
    await tx.execute(sql`select set_config('app.user_id', ${userId}, true)`);
    return fn(tx);
  });
}

/** The one row whose secret the caller already holds: a customer link, a tablet, a payment session. */
export function withSecret<T>(
  secret: { linkHash: string } | { deviceHash: string } | { providerSession: string },
  fn: (tx: Tx) => Promise<T>,
): Promise<T> {
  const [name, value] =
    "linkHash" in secret ? ["app.link_hash", secret.linkHash]
    : "deviceHash" in secret ? ["app.device_hash", secret.deviceHash]
    : ["app.provider_session", secret.providerSession];
  return transact(connections(), async (tx) => {
    await tx.execute(sql`select set_config(${name}, ${value}, true)`);
    return fn(tx);
  });
}

/** Tables that belong to no shop (users, sessions, tries, raw provider events). `reason` says why, for the reader. */
export function withSystem<T>(reason: string, fn: (tx: Tx) => Promise<T>): Promise<T> {
  if (!reason) throw new TypeError("withSystem needs a reason");
  return transact(connections(), fn);
}
