import { bigint, customType, date, timestamp, uuid } from "drizzle-orm/pg-core";

/** An instant, UTC inside; the shop's zone stands beside it where it is shown. */
export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: "date" });
/** A day on the shop's calendar, `YYYY-MM-DD`. */
export const businessDate = (name: string) => date(name, { mode: "string" });
/** Whole minor units of the shop's currency. */
export const minorUnits = (name: string) => bigint(name, { mode: "number" });
/** Whole thousandths of a stock unit. */
export const thousandths = (name: string) => bigint(name, { mode: "number" });
export const shopId = () => uuid("shop_id").notNull();
export const id = () => uuid("id").notNull();
export const createdAt = () => instant("created_at").notNull().defaultNow();
/** Counts accepted edits; a stale one is refused. */
export const version = () => bigint("version", { mode: "number" }).notNull().default(1);
export const timeRange = customType<{ data: string }>({ dataType: () => "tstzrange" });
