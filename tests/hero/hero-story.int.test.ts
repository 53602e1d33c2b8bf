import { beforeAll, describe, expect, it } from "vitest";
import { gainForPiece } from "@/modules/flow/queries/gain";
import { currentDatabase, behindTheCurtain } from "@/tests/support/database";
import type { Cast } from "@/seed/cast";
import { benchMinutes } from "@/seed/story/bench-day";
import { heroJob, issuedValue, type HeroOutcome } from "@/seed/story/hero";
import { heroScene } from "./scene";

// Every figure here stands in docs/hero-job.md.
let cast: Cast;
let hero: HeroOutcome;
beforeAll(async () => {
  const made = await heroScene(currentDatabase().ownerUrl);
  cast = made.cast;
  hero = await heroJob(cast, made.scene);
});

describe("the hero job through the product's own commands", () => {
  it("carries the numbers of the papers", () => {
    expect(hero).toMatchObject({ number: "WO-2026-0118", tag: "260224-07", invoiceNumber: "INV-2026-00318" });
  });
  it("has the bench minutes of each person, 1,149 in all", async () => {
    const minutes = Object.fromEntries(await Promise.all(["Emeka", "Hollis", "June", "Anselm", "Rosa", "Bram"].map(async (who) => [who, await benchMinutes(cast, hero.workOrderId, who)] as const)));
    expect(minutes).toEqual({ Emeka: 66, Hollis: 253, June: 140, Anselm: 345, Rosa: 195, Bram: 150 });
  });
  it("took parts worth 260.52 off the shelf", async () => {
    expect(await issuedValue(cast, hero.workOrderId)).toBe(26052);
  });
  it("let the epoxy cure for 24 h across the change of clocks", async () => {
    expect(await behindTheCurtain(`select to_char(ready_at at time zone 'UTC', 'YYYY-MM-DD HH24:MI') from epoxy_fills`)).toEqual(["2026-03-08 18:30"]);
  });
  it("shows the measured gain of both sides", async () => {
    const gain = await gainForPiece(cast.as("Marit", "2026-03-14T09:00"), hero.pieceId);
    expect(JSON.stringify(gain)).toMatch(/9\.4[45]/);
    expect(JSON.stringify(gain)).toMatch(/6\.2[45]/);
  });
  it("leaves the balances of the job, and the books sum to zero", async () => {
    const rows = await behindTheCurtain(`select l.account_code || ' ' || sum(l.amount_minor) from journal_lines l join journal_entries e on e.shop_id = l.shop_id and e.id = l.entry_id
      where e.work_order_id = '${hero.workOrderId}' group by 1, l.account_code having sum(l.amount_minor) <> 0 order by 1`.replace("group by 1, l.account_code", "group by l.account_code"));
    const balances = Object.fromEntries(rows.map((r) => r.split(" ") as [string, string]));
    // The goods received (1200 22500 / 2050 -22500) are the purchase order's; payouts come with the bank.
    expect(balances).toMatchObject({ "1020": "263343", "2000": "-3640", "2200": "-4513", "4000": "-203400", "4100": "-55400", "4150": "-6000", "4200": "-4200", "4900": "10170", "5000": "26052", "5200": "3640" });
    expect(balances["1250"]).toBeUndefined();
    expect(balances["1100"]).toBeUndefined();
    expect(balances["2100"]).toBeUndefined();
    expect(await behindTheCurtain("select coalesce(sum(amount_minor), 0)::text from journal_lines")).toEqual(["0"]);
  });
  it("prints total, deposit and open sum, and the reference of the invoice", async () => {
    expect(await behindTheCurtain(`select concat_ws(' ', total_minor, deposit_applied_minor, paid_minor, reference) from invoices where id = '${hero.invoiceId}'`)).toEqual(["263343 72310 191033 RF95NB202600318"]);
  });
});
