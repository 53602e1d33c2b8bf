import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { breaches, invariants } from "@/db/invariants";
import { chainFault, type KeptRow } from "@/modules/access/audit-chain";
import { currentDatabase } from "@/tests/support/database";
import { furnish, type FurnishedShop } from "@/tests/support/furnished-shop";
import { testShop } from "@/tests/support/shop";

let a: FurnishedShop;
let all: pg.Client;
beforeAll(async () => {
  a = await furnish(await testShop("first"));
  all = new pg.Client({ connectionString: currentDatabase().superuserUrl });
  await all.connect();
}, 120_000);
afterAll(() => all.end());

/** Breaks something with the triggers off, looks, and takes it back. */
async function broken(...plants: string[]): Promise<string[]> {
  await all.query("begin");
  try {
    await all.query("set local session_replication_role = replica");
    for (const plant of plants) {
      const { rowCount, command } = await all.query(plant.replaceAll("$shop", `'${a.shop.id}'`));
      if (/^(INSERT|UPDATE|DELETE)$/.test(command) && !rowCount) throw new Error(`planted nothing: ${plant}`);
    }
    return (await breaches(all)).map((b) => b.id);
  } finally {
    await all.query("rollback");
  }
}

const PLANTS: Record<string, string[][]> = {
  "I-1": [["update journal_lines set amount_minor = amount_minor + 1 where (entry_id, line_no) = (select entry_id, line_no from journal_lines where shop_id = $shop limit 1)"]],
  "I-2": [["alter table punches disable trigger insert_only"], ["grant delete on journal_lines to vk_job"]],
  "I-3": [["update invoices set total_minor = total_minor + 1 where shop_id = $shop and state = 'issued'"], ["update invoice_lines set amount_minor = amount_minor - 100 where shop_id = $shop and kind = 'part' and line_no = (select max(line_no) from invoice_lines where shop_id = $shop and kind = 'part')"]],
  "I-4": [["update invoices set paid_minor = paid_minor + 100 where shop_id = $shop and state = 'issued'"]],
  "I-5": [["update payments set refunded_minor = amount_minor + 1 where shop_id = $shop and purpose = 'deposit'"], ["delete from journal_entries where shop_id = $shop and rule = 'depositReceived'"]],
  "I-6": [["update stock_balances set on_hand_milli = on_hand_milli + 1000 where shop_id = $shop and on_hand_milli > 0"], ["update lots set on_hand_milli = on_hand_milli + 1 where shop_id = $shop"], ["update work_order_parts set issued_milli = issued_milli + 1000 where shop_id = $shop and issued_milli > 0"]],
  "I-7": [["update stock_balances set value_minor = value_minor + 1 where shop_id = $shop and part_id = (select part_id from stock_balances where shop_id = $shop and value_minor > 0 limit 1)"]],
  "I-8": [["alter table time_entries drop constraint time_no_overlap", "insert into time_entries (shop_id, id, person_id, clock, started_at, ended_at, source) select shop_id, gen_random_uuid(), person_id, clock, started_at, ended_at, 'entered' from time_entries where shop_id = $shop limit 1"], ["delete from punches where shop_id = $shop and kind = 'start'"]],
  "I-9": [["delete from work_orders where shop_id = $shop", "insert into work_orders (shop_id, id, number, customer_id, opened_at) select shop_id, gen_random_uuid(), 'WO-2026-0007', id, '2026-02-17' from customers where shop_id = $shop"], ["update counters set next = next + 1 where shop_id = $shop and series = 'JOURNAL'"]],
  "I-10": [["insert into command_log (shop_id, request_id, command, actor, input_hash, reply) values ($shop, gen_random_uuid(), 'customers.add', 'person:x', 'x', '{}')"], ["update audit_log set request_id = gen_random_uuid() where shop_id = $shop and seq = 1"]],
  "I-11": [["insert into jobs (shop_id, id, task, payload, run_at) values ($shop, gen_random_uuid(), 'mail.send', '{}', now() - interval '1 hour')"], ["insert into jobs (shop_id, id, task, payload, parked_at) values ($shop, gen_random_uuid(), 'mail.send', '{}', now())"]],
  "I-12": [["delete from audit_log where shop_id = $shop and seq = 3"], ["update audit_log set hash = repeat('0', 64) where shop_id = $shop and seq = 2"]],
  "I-13": [["update files set sha256 = 'none' where shop_id = $shop"], ["update invoices set pdf_file_id = gen_random_uuid() where shop_id = $shop"]],
  "I-14": [["alter table customers add constraint planted check (name <> '') not valid"]],
  "I-15": [["update payments set work_order_id = gen_random_uuid() where shop_id = $shop"], ["update stock_movements set person_id = gen_random_uuid() where shop_id = $shop"]],
  "I-16": [["update customers set version = version + 1 where shop_id = $shop"]],
  "I-17": [["insert into provider_events (id, type, body, received_at) values ('evt_planted', 'payout.paid', '{}', now() - interval '1 hour')"]],
  "I-18": [["update invoices set issued_on = issued_on + 1 where shop_id = $shop and state = 'issued'"]],
};

describe("invariants", () => {
  it("all hold over a whole job", async () => expect(await breaches(all)).toEqual([]));
  it("each have a planted breach", () => expect(invariants().map((i) => i.id)).toEqual(Object.keys(PLANTS)));
  for (const [id, plants] of Object.entries(PLANTS)) {
    it.each(plants.map((p) => [p]))(`${id} sees what was planted: %s`, async (plant) => expect(await broken(...plant)).toContain(id));
  }
  it("see nothing of a plant that was taken back", async () => expect(await breaches(all)).toEqual([]));
});

describe("the chain of the trail", () => {
  const kept = async (): Promise<KeptRow[]> => (await all.query<KeptRow & Record<string, unknown>>(`select seq::int, at, actor, actor_name as "actorName", command, request_id as "requestId", subject_kind as "subjectKind",
    subject_id as "subjectId", note, detail, prev_hash as "prevHash", hash from audit_log where shop_id = $1 order by seq`, [a.shop.id])).rows;
  it("is whole after a whole job, up to its known head", async () => {
    const rows = await kept();
    expect(rows.length).toBeGreaterThan(20);
    const last = rows.at(-1);
    expect(chainFault(rows, last && { seq: last.seq, hash: last.hash })).toBeNull();
  });
  it("names the first row that was changed, taken out, put elsewhere or cut off", async () => {
    const rows = await kept();
    const at = (seq: number, change: Partial<KeptRow>) => rows.map((r) => (r.seq === seq ? { ...r, ...change } : r));
    expect(chainFault(at(5, { detail: { input: {}, value: 1 } }))).toEqual({ seq: 5, why: "changed" });
    expect(chainFault(at(6, { actorName: "Nobody" }))).toEqual({ seq: 6, why: "changed" });
    expect(chainFault(rows.filter((r) => r.seq !== 7))).toEqual({ seq: 7, why: "missing" });
    expect(chainFault(at(8, { prevHash: "0".repeat(64) }))).toEqual({ seq: 8, why: "not joined" });
    const last = rows.at(-1);
    expect(chainFault(rows.slice(0, -1), last && { seq: last.seq, hash: last.hash })).toEqual({ seq: rows.length, why: "missing" });
  });
});
