import { randomUUID } from "node:crypto";
import { eq } from "drizzle-orm";
import { beforeAll, describe, expect, it } from "vitest";
import { invoices, payoutItems, payouts } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { draftInvoice } from "@/modules/invoices/draft";
import { openOf } from "@/modules/books/domain/open-sum";
import { issueInvoice } from "@/modules/invoices/issue";
import { draftSheet } from "@/modules/invoices/sheet";
import { answerByLink } from "@/modules/work-orders/commands/answer-estimate";
import { behindTheCurtain } from "@/tests/support/database";
import { asCustomer, hashOf, heroLines, heroMenu, heroParts, openHero, sendVersion } from "@/tests/support/hero-order";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { matchBoard } from "./bank-board";
import { lookAtBankFile, takeInBankFile } from "./bank-import";
import { lockMatch, unlockMatch } from "./bank-match";
import { takePayment } from "./commands";
import type { BankMapping } from "./domain/bank-file";

let a: TestShop;
let b: TestShop;
let ids: Record<string, string>;
let n = 0;
const at = "2026-03-20T17:00:00Z";
const mapping: BankMapping & { textColumns: number[] } = { hasHeader: true, dateColumn: 0, dateOrder: "ymd", textColumns: [1], amountColumn: 2, outColumn: null, decimalComma: false };
const book = () => a.as("book", at);
const file = (lines: string[], name = "march.csv") => ({ name, text: ["Date,Text,Amount", ...lines].join("\n"), mapping });
const lineOf = async (text: string) => (await matchBoard(book())).lines.find((l) => l.text.includes(text)) ?? (() => { throw new Error(`no line ${text}`); })();
const openSum = async (id: string) => { const [i] = await withShop(a.shop.id, (tx) => tx.select().from(invoices).where(eq(invoices.id, id))); return i ? openOf(i) : null; };
const ledger = async (account: string) => Number((await behindTheCurtain(`select coalesce(sum(amount_minor), 0) from journal_lines where shop_id = '${a.shop.id}' and account_code = '${account}'`))[0]);

async function openInvoice(): Promise<{ invoiceId: string; number: string; reference: string; openMinor: number }> {
  n += 1;
  const order = await openHero(a, ids, `B-${n}`);
  const v = await sendVersion(a, order, heroLines(ids, [["PIN", "1"]], []), at);
  must(await answerByLink(await asCustomer(a, order, v.estimateId, at), { answer: "approved", name: "Odalys Brennan", documentHash: await hashOf(a, v.estimateId) }));
  await behindTheCurtain(`update pieces set booked_in_at = now(), tag = 'B-${n}', released_at = now() where id = '${order.pieceId}'`);
  const { invoiceId } = must(await draftInvoice(a.as("mgr", at), { workOrderId: order.orderId }));
  const total = await withShop(a.shop.id, async (tx) => { const [i] = await tx.select().from(invoices).where(eq(invoices.id, invoiceId)); if (!i) throw new Error("no draft"); return must(await draftSheet({ ...a.as("mgr", at), tx }, i)).snapshot.totals.totalMinor; });
  return must(await issueInvoice(a.as("mgr", at), { invoiceId, version: 1, totalMinor: total }));
}
const text = (minor: number) => (minor / 100).toFixed(2);

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  await heroMenu(a);
  ids = await heroParts(a);
});

describe("taking a bank's file in", () => {
  it("looks first, refuses rows by their number, and keeps nothing of a file with one bad row", async () => {
    const bad = file(["2026-03-14,Deposit,10.00", "14.3.,x,1.00", "2026-03-15,y,1.005"]);
    expect(must(lookAtBankFile(book(), { ...bad, delimiter: "auto" }))).toMatchObject({ lineCount: 1, sumMinor: 1000, refused: [{ row: 3 }, { row: 4 }] });
    expect(await takeInBankFile(book(), bad)).toMatchObject({ ok: false, refusal: { code: "ROWS_REFUSED", fields: [{ path: "rows.3" }, { path: "rows.4" }] } });
    expect((await matchBoard(book())).lines).toEqual([]);
  });

  it("refuses a closing balance that the lines do not reach", async () => {
    const f = file(["2026-03-14,Deposit,10.00"]);
    expect(await takeInBankFile(book(), { ...f, opening: "5.00", closing: "16.00" })).toMatchObject({ ok: false, refusal: { code: "CLOSING_DIFFERS", field: "closing" } });
  });

  it("adds each line once, however often and in however many files it comes", async () => {
    const f = file(["2026-03-14,Coffee,-4.00", "2026-03-14,Coffee,-4.00", "2026-03-14,Rent,-900.00"]);
    expect(must(await takeInBankFile(book(), f))).toMatchObject({ added: 3, knownBefore: 0 });
    expect(await takeInBankFile(book(), f)).toMatchObject({ ok: false, refusal: { code: "FILE_KNOWN" } });
    expect(must(await takeInBankFile(book(), file(["2026-03-14,Coffee,-4.00", "2026-03-14,Coffee,-4.00", "2026-03-14,Rent,-900.00", "2026-03-16,Interest,1.00"])))).toMatchObject({ added: 1, knownBefore: 3 });
  });

  it("is only for who keeps the bank, and stays in its shop", async () => {
    await expect(takeInBankFile(a.as("counter", at), file(["2026-03-14,x,1.00"]))).rejects.toThrow(NotFound);
    await expect(matchBoard(a.as("mgr", at))).rejects.toThrow(NotFound);
    expect((await matchBoard(b.as("owner", at))).lines).toEqual([]);
  });
});

describe("matching", () => {
  it("proposes by reference first, locks by a person, and unlocking turns the booking round", async () => {
    const inv = await openInvoice();
    must(await takeInBankFile(book(), file([`2026-03-18,Transfer ${inv.reference} thanks,${text(inv.openMinor)}`])));
    const line = await lineOf(inv.reference);
    expect(line).toMatchObject({ state: "proposed", why: "reference and sum fit", targets: [{ kind: "invoice", id: inv.invoiceId }] });
    expect(await openSum(inv.invoiceId)).toBe(inv.openMinor);
    const bank = await ledger("1010");
    const input = { lineId: line.id, version: line.version, kind: "invoice" as const, ids: [inv.invoiceId] };
    expect(await lockMatch(b.as("owner", at), input)).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    must(await lockMatch(book(), input));
    expect(await lockMatch(book(), input)).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect([await openSum(inv.invoiceId), (await ledger("1010")) - bank]).toEqual([0, inv.openMinor]);
    must(await unlockMatch(book(), { lineId: line.id, version: line.version }));
    expect([await openSum(inv.invoiceId), (await ledger("1010")) - bank]).toEqual([inv.openMinor, 0]);
    must(await lockMatch(book(), { ...input, version: line.version + 1 }));
    expect(await openSum(inv.invoiceId)).toBe(0);
  });

  it("leaves what is short open, or writes it off up to the shop's limit, and takes both back", async () => {
    const inv = await openInvoice();
    must(await takeInBankFile(book(), file([`2026-03-18,Pays ${inv.number},${text(inv.openMinor - 80)}`])));
    const line = await lineOf(inv.number);
    expect(line).toMatchObject({ state: "proposed", differenceMinor: -80, why: "0.80 short" });
    must(await lockMatch(book(), { lineId: line.id, version: line.version, kind: "invoice", ids: [inv.invoiceId], rest: "write-off" }));
    expect([await openSum(inv.invoiceId), await ledger("6200")]).toEqual([0, 80]);
    must(await unlockMatch(book(), { lineId: line.id, version: line.version }));
    expect([await openSum(inv.invoiceId), await ledger("6200")]).toEqual([inv.openMinor, 0]);
    must(await lockMatch(book(), { lineId: line.id, version: line.version + 1, kind: "invoice", ids: [inv.invoiceId] }));
    expect(await openSum(inv.invoiceId)).toBe(80);
    const much = await openInvoice();
    must(await takeInBankFile(book(), file([`2026-03-19,Pays ${much.number},100.00`])));
    const short = await lineOf(much.number);
    expect(await lockMatch(book(), { lineId: short.id, version: short.version, kind: "invoice", ids: [much.invoiceId], rest: "write-off" })).toMatchObject({ ok: false, refusal: { code: "ABOVE_LIMIT" } });
  });

  it("spreads one transfer over the invoices named, and keeps what is over as credit", async () => {
    const [one, two] = [await openInvoice(), await openInvoice()];
    must(await takeInBankFile(book(), file([`2026-03-19,${one.number} and ${two.number},${text(one.openMinor + two.openMinor + 1200)}`])));
    const line = await lineOf(`${one.number} and`);
    const credits = await ledger("2110");
    must(await lockMatch(book(), { lineId: line.id, version: line.version, kind: "invoice", ids: [one.invoiceId, two.invoiceId] }));
    expect([await openSum(one.invoiceId), await openSum(two.invoiceId), (await ledger("2110")) - credits]).toEqual([0, 0, -1200]);
  });

  it("links a check booked at the counter without booking it again", async () => {
    const inv = await openInvoice();
    const p = must(await takePayment(book(), { invoiceId: inv.invoiceId, method: "cheque", amount: "200.00", note: "2041" }));
    must(await takeInBankFile(book(), file(["2026-03-20,Check 2041,200.00"])));
    const line = await lineOf("Check 2041");
    expect(line.targets).toEqual([{ kind: "payment", id: p.id }]);
    const bank = await ledger("1010");
    must(await lockMatch(book(), { lineId: line.id, version: line.version, kind: "payment", ids: [p.id] }));
    expect(await ledger("1010")).toBe(bank);
  });

  it("does not lock a payout that differs by a cent or holds an unknown charge", async () => {
    const [id, itemId] = [randomUUID(), randomUUID()];
    await withShop(a.shop.id, async (tx) => {
      await tx.insert(payouts).values({ shopId: a.shop.id, id, providerPayoutId: "po_1", amountMinor: 217461, arrivesOn: "2026-03-17", state: "open" });
      await tx.insert(payoutItems).values({ shopId: a.shop.id, id: itemId, payoutId: id, providerTransactionId: "txn_1", kind: "charge", sourceId: "pi_x", grossMinor: 223784, feeMinor: 6323, netMinor: 217461 });
    });
    must(await takeInBankFile(book(), file(["2026-03-17,Card payout,2174.61", "2026-03-17,Card payout short,2174.60"])));
    const board = await matchBoard(book());
    const short = board.lines.find((l) => l.text === "Card payout short");
    const exact = board.lines.find((l) => l.text === "Card payout");
    expect(exact?.targets).toEqual([{ kind: "payout", id }]);
    expect(await lockMatch(book(), { lineId: short?.id ?? "", version: 1, kind: "payout", ids: [id] })).toMatchObject({ ok: false, refusal: { code: "PAYOUT_DIFFERS", data: { differenceMinor: 1 } } });
    expect(await lockMatch(book(), { lineId: exact?.id ?? "", version: 1, kind: "payout", ids: [id] })).toMatchObject({ ok: false, refusal: { code: "PAYOUT_OPEN" } });
  });

  it("books a line without a document to an account that a person names, and the ledger sums to zero", async () => {
    const rent = await lineOf("Rent");
    expect(await lockMatch(book(), { lineId: rent.id, version: rent.version, kind: "account", account: "1100" })).toMatchObject({ ok: false, refusal: { code: "ACCOUNT_UNKNOWN", field: "account" } });
    must(await lockMatch(book(), { lineId: rent.id, version: rent.version, kind: "account", account: "2000" }));
    expect(await ledger("2000")).toBe(90000);
    expect(await behindTheCurtain("select sum(amount_minor) from journal_lines")).toEqual(["0"]);
  });
});
