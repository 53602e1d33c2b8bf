/** Fills the flow library of the benchmark's shop with BENCH_TESTS tests of 24 lifts. */
import { and, eq, isNull } from "drizzle-orm";
import pg from "pg";
import { closeDatabase } from "@/db/client";
import { people, shops } from "@/db/schema";
import { withShop, withSystem } from "@/db/scope";
import { loadFlow } from "@/seed/factories/flow-load";

const TESTS = Number(process.env.BENCH_TESTS);
if (!Number.isInteger(TESTS) || TESTS < 1) throw new Error("BENCH_TESTS is a whole number above 0.");
// At least ten heads a family, so that the picture of "the last ten" draws the same with a hundred tests as with ten thousand.
const FAMILIES = Math.max(1, Math.min(8, Math.floor(TESTS / 4 / 12)));
const [shop] = await withSystem("the shop of the benchmark", (tx) => tx.select({ id: shops.id }).from(shops).where(eq(shops.slug, process.env.BENCH_SHOP ?? "ninebark")));
if (!shop) throw new Error("The demo has no such shop.");
const [operator] = await withShop(shop.id, (tx) => tx.select({ id: people.id }).from(people).where(and(eq(people.shopId, shop.id), isNull(people.leftAt))).limit(1));
if (!operator) throw new Error("Nobody works in the demo shop.");
const made = await loadFlow(shop.id, { operatorId: operator.id, tests: TESTS, now: new Date(), mark: `L${TESTS}-`, families: FAMILIES });
// What the database does by itself after a while: a shop fills over years, not in a minute.
const owner = new pg.Client({ connectionString: process.env.VK_OWNER_URL });
await owner.connect();
await owner.query("analyze heads, flow_tests, flow_readings, flow_test_summaries");
await owner.end();
await closeDatabase();
console.log(JSON.stringify({ tests: made.tests }));
