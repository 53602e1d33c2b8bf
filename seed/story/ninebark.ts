import { recordBenchCheck } from "@/modules/flow/commands/gear";
import { setHold } from "@/modules/work-orders/commands/holds";
import { recordFinding } from "@/modules/work-orders/commands/findings";
import { addSupplier } from "@/modules/purchasing/commands/suppliers";
import { addDays, localDate, localMinute } from "@/modules/kernel/instant";
import { castOf, must, type Cast } from "../cast";
import { BENCH_STORIES } from "../facts/bench-stories";
import { FAMILIES, NINEBARK, NINEBARK_SUPPLIERS } from "../facts/ninebark";
import { demoCustomers } from "../facts/people";
import { noteWork } from "./flowed";
import { benchRoom, engineFamilies } from "./gear";
import { heroJob } from "./hero";
import { runsSince, tellJob, type Gear, type JobPlan } from "./job";
import { limitsOfTheManual, measured } from "./measured";
import { ownHeads } from "./own-heads";
import { customersOf, heroShelf, menuOnTheWall } from "./set-up";
import { restOfTheShelf } from "./shelf";

const FULL: JobPlan["labor"] = [["CLN", "1"], ["TDN", "1"], ["PRT", "1"], ["FLB", "1"], ["PIN", "1"], ["PEX", "1"], ["SEA", "4"], ["LAP", "1"], ["SPR", "1"], ["FLF", "1"], ["ASM", "1"], ["INS", "1"]];
const SEATS: JobPlan["labor"] = [["CLN", "1"], ["TDN", "1"], ["SEA", "4"], ["LAP", "1"], ["ASM", "1"], ["INS", "1"]];
const PORTS: JobPlan["labor"] = [["CLN", "1"], ["TDN", "1"], ["FLB", "1"], ["PIN", "1"], ["PEX", "1"], ["SEA", "4"], ["LAP", "1"], ["FLF", "1"], ["INS", "1"]];
const SMALL: JobPlan["shelf"] = [["SEL-55", "4"], ["GSK-S250-HD", "1"]];

/** Ninebark Headworks: set-up, eighteen months of past jobs, the hero job, and a floor that is alive today. */
export async function tellNinebark(ownerUrl: string, pinPepper: string, now: Date, say: (line: string) => void): Promise<Cast> {
  const cast = await castOf(ownerUrl, pinPepper, { ...NINEBARK, numbersFrom: { "WO-2025": 1, "WO-2026": 117, "PO-2026": 231, "INV-2025": 1, "INV-2026": 316, "TAG-260224": 7 } });
  const first = "2025-05-01T08:00";
  say("  shop, menu, shelf, customers");
  await menuOnTheWall(cast, "Ilse", first);
  const suppliers: Record<string, string> = {};
  for (const s of NINEBARK_SUPPLIERS) suppliers[s.name] = must(await addSupplier(cast.as("Ilse", first), { name: s.name, email: s.email, leadDays: String(s.leadDays) })).id;
  const parts = await heroShelf(cast, "Ilse", first, suppliers);
  await restOfTheShelf(cast, "Ilse", first, suppliers);
  const today = localDate(now, cast.shop.zone);
  const room = await benchRoom(cast, "June", first, today);
  await engineFamilies(cast, "June", first, FAMILIES);
  await limitsOfTheManual(cast, "June", first);
  const customers = demoCustomers();
  const ids = await customersOf(cast, "Tobias", first, customers.map((c) => ({ ...c, laborDiscountPercent: c.name === "Odalys Brennan" ? "5" : "0" })));
  const gear: Gear = { parts, room, counter: "Tobias", receiver: "Emeka", books: "Priya", inspector: "June" };
  const whose = (i: number) => customers[(i * 7 + 3) % customers.length] ?? customers[0];
  const plan = (i: number, more: Partial<JobPlan> & Pick<JobPlan, "opened" | "to">): JobPlan => {
    const c = whose(i);
    return { customerId: ids[c?.name ?? ""] ?? "", mail: c?.email ?? "", customer: c?.name ?? "", family: BENCH_STORIES[i]?.family ?? FAMILIES[i % 5] ?? "S250-4V", labor: [FULL, SEATS, PORTS][i % 3] ?? FULL, shelf: [], ...more };
  };

  say("  past jobs");
  const pastJobs = 26;
  let hero = false;
  for (let i = 0; i < pastJobs; i++) {
    const opened = addDays("2025-05-05", i * 20);
    if (opened >= "2026-02-01" && !hero) {
      hero = true;
      for (const day of ["2026-02-26T09:25", "2026-03-12T10:10"]) must(await recordBenchCheck(cast.as("June", day), { benchId: room.benchId, isFine: true }));
      const { pieceId } = await heroJob(cast, { parts, suppliers, customerId: ids["Odalys Brennan"] ?? "", benchId: room.benchId, fixtureId: room.fixtures.get(77) ?? "" });
      await noteWork(cast, "June", "2026-03-12T15:20", pieceId, { work: ["epoxy", "port shape", "seat"], words: "Intake floor filled and recut; exhaust guides and valves new." });
    }
    if (opened >= "2026-02-01" && opened < "2026-03-20") continue;
    await tellJob(cast, gear, plan(i, { opened, promised: addDays(opened, 14), to: "gone", shelf: i % 4 === 0 ? SMALL : [] }), i);
  }

  await ownHeads(cast, room, "Anselm");

  say("  the floor today");
  const ago = (days: number) => addDays(today, -days);
  const minutesAgo = (m: number) => localMinute(new Date(now.getTime() - m * 60_000), cast.shop.zone);
  const live = (i: number, more: Partial<JobPlan> & Pick<JobPlan, "opened" | "to">) => tellJob(cast, gear, plan(40 + i, more), 40 + i);
  // In the order in which the bench saw them: a person's clock only runs forward.
  await live(0, { opened: ago(38), promised: ago(20), to: "gone", labor: SEATS });
  await live(14, { opened: ago(36), promised: ago(24), to: "gone", labor: PORTS });
  await live(15, { opened: ago(34), promised: ago(1), to: "paid", labor: SEATS });
  await live(1, { opened: ago(30), promised: today, to: "invoiced", labor: PORTS });
  const neighbour = await live(2, { opened: ago(26), promised: today, to: "in work", labor: FULL, done: 10 });
  await live(3, { opened: ago(22), promised: today, to: "in work", labor: FULL, done: 9 });
  const seats = await live(4, { opened: ago(18), promised: addDays(today, 2), to: "in work", labor: FULL, done: 6 });
  const intake = await live(5, { opened: ago(15), promised: addDays(today, 4), to: "in work", labor: FULL, done: 4, pieces: 2, wants: "Keep the bowl under 90 % of the seat. Short side wide." });
  const held = await live(6, { opened: ago(12), promised: addDays(today, 6), to: "in work", labor: PORTS, done: 3 });
  const flowing = await live(7, { opened: ago(9), promised: addDays(today, 7), to: "in work", labor: FULL, done: 3 });
  const down = await live(8, { opened: ago(6), promised: addDays(today, 9), to: "in work", labor: FULL, done: 1 });
  const short = await live(9, { opened: ago(5), promised: addDays(today, 9), to: "booked in", labor: [...SEATS, ["GDE", "4"]], shelf: [["GDE-S250-BRZ", "14"], ["VEX-S250-265", "6"]], family: "S250-4V" });
  await measured(cast, "Hollis", neighbour.pieceIds[0] ?? "", { before: `${ago(24)}T10:20`, after: `${ago(22)}T15:30` });
  await live(10, { opened: ago(2), promised: addDays(today, 12), to: "booked in", labor: SEATS });
  await live(11, { opened: ago(1), promised: addDays(today, 14), to: "agreed", labor: PORTS });
  await live(12, { opened: ago(1), promised: addDays(today, 12), to: "sent", labor: FULL, pieces: 2 });
  await live(13, { opened: ago(3), promised: addDays(today, 10), to: "sent", labor: SEATS });

  must(await setHold(cast.as("Ilse", minutesAgo(60 * 26)), { pieceId: held.pieceIds[0] ?? "", reason: "customer answer", words: "asked about the cracked guide boss" }), "hold");
  must(await recordFinding(cast.as("Hollis", minutesAgo(60 * 25)), { pieceId: short.pieceIds[0] ?? "", position: "intake", words: "Seat ring loose in the pocket, intake left.", goOnMeanwhile: true }), "finding");
  if (localDate(new Date(now.getTime() - 110 * 60_000), cast.shop.zone) === today) {
    await runsSince(cast, "Anselm", intake.pieceIds[0] ?? "", "PIN", minutesAgo(102));
    await runsSince(cast, "June", flowing.pieceIds[0] ?? "", "FLB", minutesAgo(12));
    await runsSince(cast, "Hollis", down.pieceIds[0] ?? "", "TDN", minutesAgo(51));
    await runsSince(cast, "Bram", seats.pieceIds[0] ?? "", "SEA", minutesAgo(36));
  }
  return cast;
}
