import { addBench, addFixture } from "@/modules/flow/commands/gear";
import { addDays, localDate } from "@/modules/kernel/instant";
import { addPart } from "@/modules/stock/commands/parts";
import { openStock } from "@/modules/stock/commands/adjust";
import { castOf, must, type Cast } from "../cast";
import { TAMARACK } from "../facts/tamarack";
import { engineFamilies } from "./gear";
import { tellJob, type Gear, type JobPlan } from "./job";
import { customersOf, menuOnTheWall } from "./set-up";

const HANDS = { CLN: "Ines", TDN: "Ines", PRT: "Ines", FLB: "Ines", PIN: "Radek", PEX: "Radek", SEA: "Radek", LAP: "Radek", FLF: "Ines", ASM: "Ines", INS: "Ines" };
const SEATS: JobPlan["labor"] = [["CLN", "1"], ["TDN", "1"], ["SEA", "4"], ["LAP", "1"], ["INS", "1"]];
const PORTS: JobPlan["labor"] = [["CLN", "1"], ["TDN", "1"], ["FLB", "1"], ["PIN", "1"], ["PEX", "1"], ["SEA", "4"], ["LAP", "1"], ["FLF", "1"], ["INS", "1"]];

/** What it works on; the first and the third are flowed. */
const FAMILIES = ["S450-4V", "T690-8V", "Q450-4V"] as const;

/** Tamarack Bench & Valve: three people, six orders, euros and VAT. */
export async function tellTamarack(ownerUrl: string, pinPepper: string, now: Date): Promise<Cast> {
  const cast = await castOf(ownerUrl, pinPepper, TAMARACK);
  const first = "2025-06-02T08:00";
  await menuOnTheWall(cast, "Svea", first, 0.9);
  const bench = must(await addBench(cast.as("Ines", first), { name: "Prüfstand" }));
  const fixture = must(await addFixture(cast.as("Ines", first), { name: "Bohrung 96", boreMm: "96" }));
  await engineFamilies(cast, "Ines", first, FAMILIES);
  const part = must(await addPart(cast.as("Svea", first), { sku: "DICHT-82", description: "Head gasket 82", partClass: "gasket", salePrice: "24.50" }));
  must(await openStock(cast.as("Svea", first), { partId: part.id, qty: "6", value: "61.20", reason: "taken on" }));
  const people = [
    { name: "Jonas Wiebe", email: "jonas@wiebe.example", phone: "030 5550101" }, { name: "Atelier Moreau", email: "atelier@moreau.example", phone: "030 5550102" }, { name: "Zoë Ångström", email: "zoe@angstrom.example", phone: "030 5550103" },
  ];
  const ids = await customersOf(cast, "Svea", first, people);
  const gear: Gear = { parts: {}, room: { benchId: bench.id, olderBenchId: bench.id, fixtures: new Map([[96, fixture.id]]), liftDeviceId: "", camshaftId: "" }, hands: HANDS, counter: "Svea", receiver: "Ines", books: "Svea", inspector: "Ines" };
  const today = localDate(now, cast.shop.zone);
  const stories: [opened: string, to: JobPlan["to"], done?: number][] = [["2026-04-13", "gone"], ["2026-06-08", "gone"], [addDays(today, -40), "invoiced"], [addDays(today, -24), "in work", 3], [addDays(today, -8), "booked in"], [addDays(today, -1), "sent"]];
  for (const [i, [opened, to, done]] of stories.entries()) {
    const c = people[i % people.length];
    await tellJob(cast, gear, {
      customerId: ids[c?.name ?? ""] ?? "", mail: c?.email ?? "", customer: c?.name ?? "", family: FAMILIES[i % FAMILIES.length] ?? "S450-4V", opened, promised: addDays(opened, 21), labor: i % 2 ? SEATS : PORTS, shelf: [], to, ...(done ? { done } : {}),
    }, i + 70);
  }
  return cast;
}
