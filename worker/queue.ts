import "server-only";
import { sql } from "drizzle-orm";
import { withShop, withSystem } from "@/db/scope";
import { now } from "@/modules/access/clock";
import { NotFound, type Shop, type ShopContext } from "@/modules/access/context";
import { logFault } from "@/modules/access/fault";

export interface Job { shopId: string; id: string; task: string; payload: Record<string, unknown>; tries: number }
export type Handler = (ctx: ShopContext, payload: Record<string, unknown>) => Promise<void>;

const LEASE_SECONDS = 60;
/** After so many tries a job is parked with its reason, for a person to look at. */
const TRIES_MAX = 8;

/**
 * Leases the next ready job. Of the shops that wait, the one whose turn is longest ago comes first, so that one shop's
 * ten thousand jobs do not keep another's waiting. A lease that runs out (a killed worker) frees the job again.
 */
export function leaseJob(): Promise<Job | null> {
  return withSystem("the worker looks over all shops", async (tx) => {
    const { rows } = await tx.execute<{ shop_id: string; id: string; task: string; payload: Record<string, unknown>; tries: number }>(sql`
      with turn as (
        select j.shop_id, min(j.run_at) as first,
               (select max(d.done_at) from jobs d where d.shop_id = j.shop_id and d.done_at is not null) as last_done
        from jobs j where j.done_at is null and j.parked_at is null and j.run_at <= now() and (j.lease_until is null or j.lease_until < now())
        group by j.shop_id order by last_done asc nulls first, first limit 20
      ), next as (
        select j.shop_id, j.id from jobs j join turn t using (shop_id)
        where j.done_at is null and j.parked_at is null and j.run_at <= now() and (j.lease_until is null or j.lease_until < now())
        order by t.last_done asc nulls first, j.run_at limit 1 for update of j skip locked
      )
      update jobs set lease_until = now() + make_interval(secs => ${LEASE_SECONDS}), tries = jobs.tries + 1
      from next where jobs.shop_id = next.shop_id and jobs.id = next.id
      returning jobs.shop_id, jobs.id, jobs.task, jobs.payload, jobs.tries`);
    const row = rows[0];
    return row ? { shopId: row.shop_id, id: row.id, task: row.task, payload: row.payload, tries: row.tries } : null;
  });
}

async function shopOf(shopId: string): Promise<Shop> {
  return withSystem("the shop of a job", async (tx) => {
    const { rows } = await tx.execute<Shop & Record<string, unknown>>(sql`select id, slug, name, zone, currency, locale from shops where id = ${shopId}`);
    const shop = rows[0];
    if (!shop) throw new NotFound("shop");
    return { id: shop.id, slug: shop.slug, name: shop.name, zone: shop.zone, currency: shop.currency, locale: shop.locale };
  });
}

/** Runs one job to its end: done, to be tried again later, or parked. */
export async function runJob(job: Job, handlers: Readonly<Record<string, Handler>>): Promise<"done" | "again" | "parked"> {
  const finish = (set: ReturnType<typeof sql>) => withShop(job.shopId, (tx) => tx.execute(sql`update jobs set ${set} where shop_id = ${job.shopId} and id = ${job.id}`));
  try {
    const handler = handlers[job.task];
    if (!handler) throw new Error(`no handler for ${job.task}`);
    const ctx: ShopContext = { shop: await shopOf(job.shopId), actor: { kind: "system", id: job.task, name: "Valvekeeper" }, now: now(), request: { ip: "", agent: "worker" } };
    await handler(ctx, job.payload);
    await finish(sql`done_at = now(), lease_until = null, last_error = null`);
    return "done";
  } catch (error) {
    const reference = logFault(`job ${job.task}`, error, { job: job.id, shop: job.shopId, tries: job.tries });
    const said = `${reference}: ${(error instanceof Error ? error.message : String(error)).slice(0, 500)}`;
    if (job.tries >= TRIES_MAX) {
      await finish(sql`parked_at = now(), lease_until = null, last_error = ${said}`);
      return "parked";
    }
    const wait = Math.min(600, 2 ** job.tries);
    await finish(sql`lease_until = null, last_error = ${said}, run_at = now() + make_interval(secs => ${wait})`);
    return "again";
  }
}

/** Runs every job that is ready now, and those they leave behind. For tests and the demo. */
export async function drain(handlers: Readonly<Record<string, Handler>>, most = 10_000): Promise<number> {
  let n = 0;
  for (; n < most; n++) {
    const job = await leaseJob();
    if (!job) break;
    await runJob(job, handlers);
  }
  return n;
}
