import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addCustomer, changeCustomer } from "./commands";
import { findCustomers, getCustomer } from "./queries";

let a: TestShop;
let b: TestShop;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); });

describe("customers", () => {
  it("adds one and finds it by scraps", async () => {
    const { id } = must(await addCustomer(a.as("counter"), { name: "Odalys Brennan", email: "odalys@brennan.example", phone: "303-555-0142", laborDiscountPercent: "5" }));
    for (const q of ["brenn", "ODALYS", "0142", "odalys@"]) expect((await findCustomers(a.as("counter"), { q, limit: 10 })).rows.map((r) => r.id)).toEqual([id]);
    expect((await getCustomer(a.as("counter"), id)).laborDiscountBasisPoints).toBe(500);
  });

  it("answers a repeat of the same request with the first answer, and refuses other content under it", async () => {
    const key = requestId();
    const first = must(await addCustomer(a.as("counter"), { name: "Twice Typed", phone: "5550001" }, { requestId: key }));
    const again = must(await addCustomer(a.as("counter"), { name: "Twice Typed", phone: "5550001" }, { requestId: key }));
    expect(again).toEqual(first);
    expect((await findCustomers(a.as("counter"), { q: "twice typed", limit: 10 })).rows).toHaveLength(1);
    const other = await addCustomer(a.as("counter"), { name: "Other", phone: "5550002" }, { requestId: key });
    expect(other).toMatchObject({ ok: false, refusal: { code: "REQUEST_ID_REUSED" } });
  });

  it("takes fifty repeats at once as one", async () => {
    const key = requestId();
    const all = await Promise.all(Array.from({ length: 50 }, () => addCustomer(a.as("counter"), { name: "Fifty Taps", phone: "5550003" }, { requestId: key })));
    expect(new Set(all.map((r) => must(r).id)).size).toBe(1);
    expect((await findCustomers(a.as("counter"), { q: "fifty taps", limit: 10 })).rows).toHaveLength(1);
  });

  it("refuses somebody nobody can reach, and says what would do", async () => {
    const r = await addCustomer(a.as("counter"), { name: "No Way" });
    expect(r).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "email" }] } });
  });

  it("keeps a large discount for the manager", async () => {
    const input = { name: "Deal", phone: "5550009", laborDiscountPercent: "12" };
    expect(await addCustomer(a.as("counter"), input)).toMatchObject({ ok: false, refusal: { code: "DISCOUNT_TOO_LARGE", field: "laborDiscountPercent" } });
    expect((await addCustomer(a.as("mgr"), input)).ok).toBe(true);
  });

  it("shows the second editor that the record moved on", async () => {
    const { id } = must(await addCustomer(a.as("counter"), { name: "Edited", phone: "5550010" }));
    must(await changeCustomer(a.as("counter"), { id, version: 1, name: "Edited once", phone: "5550010" }));
    expect(await changeCustomer(a.as("mgr"), { id, version: 1, name: "Edited late", phone: "5550010" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect((await getCustomer(a.as("mgr"), id)).name).toBe("Edited once");
  });

  it("does not exist for the other shop, nor for a role that may not see it", async () => {
    const { id } = must(await addCustomer(a.as("counter"), { name: "Sealed", phone: "5550011" }));
    await expect(getCustomer(b.as("owner"), id)).rejects.toThrow(NotFound);
    expect((await findCustomers(b.as("owner"), { q: "sealed", limit: 10 })).rows).toEqual([]);
    expect(await changeCustomer(b.as("owner"), { id, version: 1, name: "Mine now", phone: "5550011" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(getCustomer(a.as("tech"), id)).rejects.toThrow(NotFound);
    expect((await getCustomer(a.as("owner"), id)).name).toBe("Sealed");
  });

  it("chains each change into the audit trail", async () => {
    const rows = await behindTheCurtain("select (count(*) = max(seq) and count(*) > 5)::text from audit_log where shop_id = '" + a.shop.id + "'");
    expect(rows).toEqual(["true"]);
  });
});
