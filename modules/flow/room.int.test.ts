import { beforeAll, describe, expect, it } from "vitest";
import { loadFlow } from "@/seed/factories/flow-load";
import { behindTheCurtain } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead } from "./commands/families";
import { roomPage, type RoomRow } from "./queries/room";

const NOW = "2026-02-18T17:00:00Z";
let a: TestShop;
let b: TestShop;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  // 12 heads of four finished tests each; then one more that is only begun, one on the bench, one whose tests are void, two of one moment.
  await loadFlow(a.shop.id, { operatorId: a.people.tech ?? "", tests: 48, lifts: 2, now: new Date(NOW) });
  await loadFlow(b.shop.id, { operatorId: b.people.tech ?? "", tests: 8, lifts: 2, now: new Date(NOW), mark: "B" });
  const at = (mark: string) => `(select id from heads where shop_id = '${a.shop.id}' and mark = '${mark}')`;
  await behindTheCurtain(`alter table flow_tests disable trigger all;
    delete from flow_test_summaries where head_id in (${at("L-00003")}, ${at("L-00004")}, ${at("L-00005")});
    update flow_tests set state = 'void' where head_id = ${at("L-00003")} and purpose = 'after';
    update flow_tests set state = 'draft', completed_at = null where head_id = ${at("L-00004")} and purpose = 'after' and side = 'exhaust';
    update flow_tests set state = 'void' where head_id = ${at("L-00005")};
    update flow_tests set started_at = '2025-01-01T00:00:00Z' where head_id in (${at("L-00006")}, ${at("L-00007")});
    alter table flow_tests enable trigger all`);
  must(await addOwnHead(a.as("tech"), { mark: "NEW-1", family: "Own" }));
});

async function walk(ask: { q?: string; state?: "" | "bench" | "before" | "after" | "proved" }, limit: number): Promise<RoomRow[]> {
  const rows: RoomRow[] = [];
  let after: string | undefined;
  do {
    const page = await roomPage(a.as("tech", NOW), { q: "", state: "", ...ask, limit, after });
    expect(page.rows.length).toBeLessThanOrEqual(limit);
    expect(page.counts === null).toBe(after !== undefined);
    rows.push(...page.rows);
    after = page.next ?? undefined;
  } while (after !== undefined);
  return rows;
}

describe("the flow room", () => {
  it("comes page by page without a head lost or twice, however large the page", async () => {
    const whole = await walk({}, 200);
    expect(whole).toHaveLength(13);
    for (const limit of [1, 2, 3, 5]) expect(await walk({}, limit)).toEqual(whole);
    // Newest bench work first; a head that was never flowed stands where it came in.
    const times = whole.map((r) => r.lastAt).filter((t) => t !== null);
    expect([...times].sort((x, y) => y.localeCompare(x))).toEqual(times);
    expect(whole.filter((r) => r.lastAt === null).map((r) => r.mark).sort()).toEqual(["L-00005", "NEW-1"]);
    expect(whole.filter((r) => r.lastAt === "2025-01-01T00:00:00.000Z").map((r) => r.mark).sort()).toEqual(["L-00006", "L-00007"]);
  });

  it("says of each head where it stands, the same filtered, counted and on the page", async () => {
    const whole = await walk({}, 200);
    const state = (mark: string) => whole.find((r) => r.mark === mark);
    expect(state("L-00003")).toMatchObject({ state: "after", tests: 2, lastBy: "tech" });
    expect(state("L-00004")).toMatchObject({ state: "bench", tests: 4 });
    expect(state("L-00005")).toMatchObject({ state: "before", tests: 0 });
    expect(state("NEW-1")).toMatchObject({ state: "before", tests: 0, orderNumber: null });
    const { counts } = await roomPage(a.as("tech", NOW), { q: "", state: "", limit: 2 });
    expect(counts).toEqual({ bench: 1, before: 2, after: 1, proved: 9 });
    for (const s of ["bench", "before", "after", "proved"] as const) expect(await walk({ state: s }, 2)).toEqual(whole.filter((r) => r.state === s));
  });

  it("is searched by mark and family, and shows nothing of another shop", async () => {
    expect((await walk({ q: "l-0001" }, 2)).map((r) => r.mark)).toEqual(["L-00012", "L-00011", "L-00010"]);
    expect((await walk({ q: "own" }, 5)).map((r) => r.mark)).toEqual(["NEW-1"]);
    expect(await walk({ q: "B-0000" }, 5)).toEqual([]);
    expect(await walk({ q: "%" }, 5)).toEqual([]);
    expect((await roomPage(b.as("owner", NOW), { q: "", state: "", limit: 50 })).rows.map((r) => r.mark)).toEqual(["B-00002", "B-00001"]);
    expect((await roomPage(a.as("tech", NOW), { q: "", state: "", limit: 3, after: "nonsense" })).counts).not.toBeNull();
  });
});
