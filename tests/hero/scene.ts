import { addBench, addFixture, recordBenchCheck } from "@/modules/flow/commands/gear";
import { addSupplier } from "@/modules/purchasing/commands/suppliers";
import { castOf, must, type Cast } from "@/seed/cast";
import { NINEBARK, NINEBARK_SUPPLIERS } from "@/seed/facts/ninebark";
import type { HeroScene } from "@/seed/story/hero";
import { customersOf, heroShelf, menuOnTheWall } from "@/seed/story/set-up";

/** An empty Ninebark with menu, shelf, bench and the hero as customer. */
export async function heroScene(ownerUrl: string): Promise<{ cast: Cast; scene: HeroScene }> {
  const cast = await castOf(ownerUrl, process.env.VK_PIN_PEPPER ?? "", { ...NINEBARK, numbersFrom: { "WO-2026": 118, "PO-2026": 231, "INV-2026": 318, "TAG-260224": 7 } });
  const at = "2026-02-02T08:00";
  await menuOnTheWall(cast, "Ilse", at);
  const suppliers: Record<string, string> = {};
  for (const s of NINEBARK_SUPPLIERS) suppliers[s.name] = must(await addSupplier(cast.as("Ilse", at), { name: s.name, email: s.email, leadDays: String(s.leadDays) })).id;
  const parts = await heroShelf(cast, "Ilse", at, suppliers);
  const bench = must(await addBench(cast.as("June", at), { name: "Bench 1" }));
  const fixture = must(await addFixture(cast.as("June", at), { name: "Bore 77", boreMm: "77" }));
  for (const day of ["2026-02-26T09:25", "2026-03-12T10:10"]) must(await recordBenchCheck(cast.as("June", day), { benchId: bench.id, isFine: true }));
  const customers = await customersOf(cast, "Tobias", "2026-02-17T11:15", [{ name: "Odalys Brennan", email: "odalys@brennan.example", phone: "555-0142", laborDiscountPercent: "5" }]);
  return { cast, scene: { parts, suppliers, customerId: customers["Odalys Brennan"] ?? "", benchId: bench.id, fixtureId: fixture.id } };
}
