import { addBench, addFixture, recordBenchCheck } from "@/modules/flow/commands/gear";
import { addSupplier } from "@/modules/purchasing/commands/suppliers";
import { openOrder } from "@/modules/work-orders/commands/open-order";
import { castOf, must, type Cast } from "@/seed/cast";
import { NINEBARK, NINEBARK_SUPPLIERS } from "@/seed/facts/ninebark";
import { HERO_LABOR, HERO_SHELF } from "@/seed/facts/hero";
import { offerLines } from "@/seed/story/hero";
import { answer, bill, bookIn, offer } from "@/seed/story/orders";
import { customersOf, heroShelf, menuOnTheWall } from "@/seed/story/set-up";
import type { Founded } from "./founded";

/** Number of the other customer's invoice, one before the hero's; the terminal's 412.50 of the payout belongs to it. */
export const OTHERS_INVOICE = "INV-2026-00317";

/** Another customer's bill, open on the day the hero job begins. */
async function othersBill(cast: Cast, customerId: string): Promise<void> {
  const order = must(await openOrder(cast.as("Tobias", "2026-02-10T09:00"), { customerId, use: "other", wants: "Seats only.", pieces: [{ family: "S450-4V", serial: "B771" }] }));
  const sent = await offer(cast, "Tobias", "2026-02-10T09:20", order.id, {
    lines: [{ kind: "labor", pieceNo: 1, operationCode: "SEA", description: "Seat cutting, each", qty: "8", unitPrice: "55.00" }], discount: "0", freight: "0", deposit: "0", to: "wendela@pellforks.example",
  });
  await answer(cast, sent.estimateId, "2026-02-10T11:00", "Wendela Forks");
  await bill(cast, "Ilse", "2026-02-16T16:00", order.id, false);
}

/**
 * An empty Ninebark Headworks under its own address, so that it stands beside the demo: people, menu, shelf, suppliers and
 * a checked bench. Not one hero order, customer, estimate or piece is in it; those are the journeys' work.
 */
export const foundForJourneys = async (ownerUrl: string, pinPepper: string, slug: string): Promise<Founded> => (await foundCast(ownerUrl, pinPepper, slug)).founded;

async function foundCast(ownerUrl: string, pinPepper: string, slug: string): Promise<{ founded: Founded; cast: Cast; parts: Readonly<Record<string, string>> }> {
  const facts = {
    ...NINEBARK, slug,
    people: NINEBARK.people.map((p) => (p.email ? { ...p, email: p.email.replace("@ninebark.", `@${slug}.`) } : p)),
    numbersFrom: { "WO-2026": 117, "PO-2026": 231, "INV-2026": 317, "TAG-260224": 7 },
  };
  const cast = await castOf(ownerUrl, pinPepper, facts);
  const at = "2026-02-02T08:00";
  await menuOnTheWall(cast, "Ilse", at);
  const suppliers: Record<string, string> = {};
  for (const s of NINEBARK_SUPPLIERS) suppliers[s.name] = must(await addSupplier(cast.as("Ilse", at), { name: s.name, email: s.email, leadDays: String(s.leadDays) })).id;
  const parts = await heroShelf(cast, "Ilse", at, suppliers);
  const bench = must(await addBench(cast.as("June", at), { name: "Bench 1" }));
  must(await addFixture(cast.as("June", at), { name: "Bore 77", boreMm: "77" }));
  for (const day of ["2026-02-26T09:25", "2026-03-12T10:10"]) must(await recordBenchCheck(cast.as("June", day), { benchId: bench.id, isFine: true }));
  const customers = await customersOf(cast, "Tobias", at, [{ name: "Pell Forks Powersports", email: "wendela@pellforks.example", phone: "555-0177" }]);
  await othersBill(cast, customers["Pell Forks Powersports"] ?? "");
  return { founded: { slug, shopId: cast.shop.id, people: { ...cast.people } }, cast, parts };
}

/** The same shop a few days on: one head of the hero's kind is agreed and booked in, so that there is something to do wrong. */
export async function foundWithWork(ownerUrl: string, pinPepper: string, slug: string): Promise<Founded & { order: string; tag: string }> {
  const { founded, cast, parts } = await foundCast(ownerUrl, pinPepper, slug);
  const customers = await customersOf(cast, "Tobias", "2026-02-17T11:15", [{ name: "Odalys Brennan", email: "odalys@brennan.example", phone: "555-0142" }]);
  const order = must(await openOrder(cast.as("Tobias", "2026-02-17T11:20"), { customerId: customers["Odalys Brennan"] ?? "", use: "closed_course", wants: "Full port.", pieces: [{ family: "S250-4V", castingNumber: "K7-2201", serial: "A1193" }] }));
  const sent = await offer(cast, "Tobias", "2026-02-18T15:05", order.id, { lines: offerLines(parts, HERO_LABOR, HERO_SHELF), discount: "0", freight: "0", deposit: "0", to: "odalys@brennan.example" });
  await answer(cast, sent.estimateId, "2026-02-19T10:42", "Odalys Brennan");
  const tag = await bookIn(cast, "Emeka", "2026-02-24T14:30", order.pieces[0]?.id ?? "");
  return { ...founded, order: order.number, tag };
}
