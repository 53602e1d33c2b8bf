import "server-only";
import { sql, type SQL } from "drizzle-orm";

/** Days ahead in which a lot's expiry is worth a word. Common practice, no source. */
export const EXPIRING_DAYS = 30;

/**
 * Figures of every part of a shop, derived from the facts: on hand, reserved, expired, free, short, on order, next
 * arrival. A subquery to join or filter; `day` is today on the shop's calendar, `soon` the last day that counts as soon.
 */
export const partFigures = (shopId: string, day: string, soon: string): SQL => sql`
  select p.id as part_id, coalesce(b.on_hand_milli, 0) as on_hand, coalesce(b.value_minor, 0) as value, coalesce(b.reserved_milli, 0) as reserved,
    coalesce(l.expired, 0) as expired, l.next_expiry, coalesce(l.expiring, 0) as expiring,
    coalesce(b.on_hand_milli, 0) - coalesce(b.reserved_milli, 0) - coalesce(l.expired, 0) - coalesce(w.short, 0) as free,
    coalesce(w.short, 0) as short, coalesce(w.needed, 0) as promised, w.orders as short_orders, coalesce(o.on_order, 0) as on_order, o.next_arrival
  from parts p
  left join stock_balances b on b.shop_id = p.shop_id and b.part_id = p.id
  left join (
    select part_id, sum(on_hand_milli) filter (where expires_on < ${day}) as expired, min(expires_on) as next_expiry,
      sum(on_hand_milli) filter (where expires_on <= ${soon}) as expiring
    from lots where shop_id = ${shopId} and on_hand_milli > 0 group by part_id
  ) l on l.part_id = p.id
  left join (
    select n.part_id, sum(n.needed_milli - n.issued_milli) as needed, sum(n.needed_milli - n.issued_milli - n.reserved_milli) as short,
      string_agg(distinct o.number, ', ' order by o.number) filter (where n.needed_milli - n.issued_milli - n.reserved_milli > 0) as orders
    from work_order_parts n join work_orders o on o.shop_id = n.shop_id and o.id = n.work_order_id
    where n.shop_id = ${shopId} and n.removed_at is null and o.closed_at is null and o.cancelled_at is null and n.needed_milli > n.issued_milli group by n.part_id
  ) w on w.part_id = p.id
  left join (
    select x.part_id, sum(x.qty_milli - x.received_milli) as on_order, min(q.expected_on) as next_arrival
    from purchase_order_lines x join purchase_orders q on q.shop_id = x.shop_id and q.id = x.purchase_order_id
    where x.shop_id = ${shopId} and q.state = 'sent' and x.qty_milli > x.received_milli group by x.part_id
  ) o on o.part_id = p.id
  where p.shop_id = ${shopId}`;

/** One row of the subquery, as the driver gives it. */
export interface FigureRow extends Record<string, unknown> {
  part_id: string; on_hand: string; value: string; reserved: string; expired: string; next_expiry: string | null; expiring: string;
  free: string; short: string; promised: string; short_orders: string | null; on_order: string; next_arrival: string | null;
}
