import "server-only";
import { and, asc, desc, eq, gte, inArray, isNull, isNotNull, ne, or, sql } from "drizzle-orm";
import { bankFiles, bankLines, customers, invoices, journalEntries, journalLines, payments, payoutItems, payouts } from "@/db/schema";
import { inShop, mustBeAble, settingsOf, type ShopContext } from "@/modules/access/context";
import { openOf } from "@/modules/books/domain/open-sum";
import { amount } from "@/modules/kernel/format";
import { addDays, daysBetween, localDate } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { matchBankLine } from "./domain/match-bank-line";
import { needsPayment } from "./payouts";

export interface BoardPart { id: string; kind: string; what: string; grossMinor: number; feeMinor: number; netMinor: number; explained: boolean }
/** What a bank line can be locked to. */
export interface BoardTarget {
  kind: "invoice" | "payment" | "payout";
  id: string;
  label: string;
  name: string;
  /** Open sum of an invoice, sum of a payment, gross of a payout. */
  amountMinor: number;
  dueOn: string | null;
  daysLate: number;
  note: string;
  parts: BoardPart[];
}
export interface BoardLine {
  id: string; version: number; date: string; text: string; amountMinor: number;
  /** Locked to these, or proposed. */
  state: "locked" | "proposed" | "none";
  targets: { kind: BoardTarget["kind"]; id: string }[];
  /** Words under the joint: `locked, exact`, `14.10 short`. */
  why: string;
  differenceMinor: number;
  lockedTo: string;
}
export interface MatchBoard {
  lines: BoardLine[]; targets: BoardTarget[]; file: { name: string; at: string } | null; bankMinor: number | null; booksMinor: number; notLockedMinor: number; lockedCount: number; lineCount: number; openMinor: number; writeOffLimitMinor: number;
}

/** Days back that locked lines stay on the board. */
const DAYS_SHOWN = 45;

/** The bank's lines against open invoices, payouts and money booked at the counter, each with what it most likely paid. */
export async function matchBoard(ctx: ShopContext): Promise<MatchBoard> {
  mustBeAble(ctx, "bank.match");
  const { shop } = ctx;
  const today = localDate(ctx.now, shop.zone);
  return inShop(ctx, async (tx) => {
    const settings = await settingsOf({ ...ctx, tx });
    const lines = await tx.select().from(bankLines).where(and(eq(bankLines.shopId, shop.id), or(isNull(bankLines.matchedKind), gte(bankLines.date, addDays(today, -DAYS_SHOWN))))).orderBy(asc(bankLines.date), asc(bankLines.id)).limit(400);
    const open = await tx.select({ i: invoices, name: customers.name }).from(invoices).innerJoin(customers, and(eq(customers.shopId, invoices.shopId), eq(customers.id, invoices.customerId)))
      .where(and(eq(invoices.shopId, shop.id), eq(invoices.kind, "invoice"), eq(invoices.state, "issued"), sql`${invoices.totalMinor} - ${invoices.depositAppliedMinor} - ${invoices.paidMinor} - ${invoices.creditedMinor} > 0`)).orderBy(asc(invoices.dueOn)).limit(300);
    const waiting = await tx.select().from(payouts).where(and(eq(payouts.shopId, shop.id), isNull(payouts.bankLineId))).orderBy(desc(payouts.arrivesOn)).limit(60);
    const matchedPayouts = lines.flatMap((l) => (l.matchedKind === "payout" && l.matchedId ? [l.matchedId] : []));
    const shownPayouts = [...waiting, ...(matchedPayouts.length ? await tx.select().from(payouts).where(and(eq(payouts.shopId, shop.id), inArray(payouts.id, matchedPayouts))) : [])];
    const items = shownPayouts.length ? await tx.select({ it: payoutItems, receipt: payments.receiptNumber }).from(payoutItems)
      .leftJoin(payments, and(eq(payments.shopId, payoutItems.shopId), eq(payments.id, payoutItems.paymentId)))
      .where(and(eq(payoutItems.shopId, shop.id), inArray(payoutItems.payoutId, shownPayouts.map((p) => p.id)))) : [];
    const counter = await tx.select({ p: payments, name: customers.name }).from(payments).innerJoin(customers, and(eq(customers.shopId, payments.shopId), eq(customers.id, payments.customerId)))
      .where(and(eq(payments.shopId, shop.id), inArray(payments.method, ["cheque", "transfer"]), ne(payments.purpose, "undone"), isNull(payments.providerPaymentId),
        sql`not exists (select 1 from bank_lines bl where bl.shop_id = ${payments.shopId} and bl.matched_id = ${payments.id})`)).orderBy(desc(payments.receivedAt)).limit(100);
    const lockedInvoiceIds = lines.flatMap((l) => (l.matchedKind === "invoice" && l.matchedId ? [l.matchedId] : []));
    const lockedInvoices = lockedInvoiceIds.length ? await tx.select({ i: invoices, name: customers.name }).from(invoices).innerJoin(customers, and(eq(customers.shopId, invoices.shopId), eq(customers.id, invoices.customerId))).where(and(eq(invoices.shopId, shop.id), inArray(invoices.id, lockedInvoiceIds))) : [];
    const [file] = await tx.select().from(bankFiles).where(eq(bankFiles.shopId, shop.id)).orderBy(desc(bankFiles.at)).limit(1);
    const [closing] = await tx.select({ c: bankFiles.closingMinor }).from(bankFiles).where(and(eq(bankFiles.shopId, shop.id), isNotNull(bankFiles.closingMinor))).orderBy(desc(bankFiles.at)).limit(1);
    const [books] = await tx.select({ sum: sql<string>`coalesce(sum(${journalLines.amountMinor}), 0)` }).from(journalLines)
      .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId))).where(and(eq(journalLines.shopId, shop.id), eq(journalLines.accountCode, "1010")));

    const invoiceTarget = ({ i, name }: (typeof open)[number]): BoardTarget => {
      const late = i.dueOn ? daysBetween(i.dueOn, today) : 0;
      return { kind: "invoice", id: i.id, label: i.number ?? "", name, amountMinor: openOf(i), dueOn: i.dueOn, daysLate: Math.max(0, late), note: "", parts: [] };
    };
    const payoutTarget = (p: (typeof shownPayouts)[number]): BoardTarget => {
      const parts = items.filter((x) => x.it.payoutId === p.id).map(({ it, receipt }): BoardPart => ({
        id: it.id, kind: it.kind, what: receipt ?? (needsPayment(it.kind) ? "not in the books yet" : it.kind), grossMinor: it.grossMinor, feeMinor: it.feeMinor, netMinor: it.netMinor, explained: !needsPayment(it.kind) || it.paymentId !== null,
      }));
      return { kind: "payout", id: p.id, label: "Card payout", name: `${parts.filter((x) => x.grossMinor > 0).length} charges`, amountMinor: parts.reduce((a, x) => a + x.grossMinor, 0), dueOn: p.arrivesOn, daysLate: 0, note: p.state === "booked" ? "" : "a part is not in the books yet", parts };
    };
    const paymentTarget = ({ p, name }: (typeof counter)[number]): BoardTarget => ({ kind: "payment", id: p.id, label: p.receiptNumber, name, amountMinor: p.amountMinor, dueOn: null, daysLate: 0, note: `${p.method === "cheque" ? "check" : "transfer"}${p.note ? ` ${p.note}` : ""}, booked`, parts: [] });
    const payouts_ = shownPayouts.map(payoutTarget);
    const targets = [...open.map(invoiceTarget), ...waiting.map(payoutTarget), ...counter.map(paymentTarget)];
    const nameOf = new Map<string, string>([...[...open, ...lockedInvoices].map(({ i, name }) => [i.id, `${i.number ?? ""} ${name}`] as const), ...payouts_.map((p) => [p.id, `${p.label}, ${p.name}`] as const)]);
    const documents = open.map(({ i }) => ({ documentId: i.id, number: i.number ?? "", reference: i.reference ?? "", openMinor: openOf(i) }));

    const taken = new Set<string>();
    const board = lines.map((l): BoardLine => {
      const base = { id: l.id, version: l.version, date: l.date, text: l.text, amountMinor: l.amountMinor };
      if (l.matchedKind) return { ...base, state: "locked", targets: [], why: l.matchedKind === "account" ? "locked, booked" : "locked, exact", differenceMinor: 0, lockedTo: (l.matchedId && nameOf.get(l.matchedId)) || (l.matchedKind === "payment" ? "Booked at the counter" : l.matchedKind === "account" ? "Booked to an account" : "Paid") };
      const none: BoardLine = { ...base, state: "none", targets: [], why: "", differenceMinor: 0, lockedTo: "" };
      const payout = waiting.find((p) => !taken.has(p.id) && p.amountMinor === l.amountMinor && Math.abs(daysBetween(p.arrivesOn, l.date)) <= 7);
      if (payout) {
        taken.add(payout.id);
        const fees = payouts_.find((p) => p.id === payout.id)?.parts.reduce((a, x) => a + x.feeMinor, 0) ?? 0;
        return { ...none, state: "proposed", targets: [{ kind: "payout", id: payout.id }], why: fees ? `fits, less ${amount(fees, shop)} card fee` : "fits" };
      }
      const paid = counter.find(({ p }) => !taken.has(p.id) && p.amountMinor === l.amountMinor && (p.note === "" || l.text.includes(p.note) || Math.abs(daysBetween(localDate(p.receivedAt, shop.zone), l.date)) <= 10));
      if (paid) { taken.add(paid.p.id); return { ...none, state: "proposed", targets: [{ kind: "payment", id: paid.p.id }], why: "booked before" }; }
      const match = matchBankLine({ amountMinor: minor(l.amountMinor), text: l.text, reference: null }, documents);
      if (match.kind === "unknown") return none;
      const ids = match.kind === "matched" ? [match.documentId] : match.why === "same amount only" ? match.documentIds.slice(0, 1) : [...match.documentIds];
      const diff = match.kind === "matched" ? 0 : (match.differenceMinor ?? 0);
      const why = match.kind === "matched" ? "reference and sum fit" : match.why === "same amount only" ? `same amount, ${match.documentIds.length} open` : diff === 0 ? "number in the text" : `${amount(Math.abs(diff), shop)} ${diff < 0 ? "short" : "over"}`;
      return { ...none, state: "proposed", targets: ids.map((id) => ({ kind: "invoice" as const, id })), why, differenceMinor: diff };
    });
    const notLocked = board.filter((l) => l.state !== "locked");
    return {
      lines: board, targets, file: file ? { name: file.name, at: file.at.toISOString() } : null, bankMinor: closing?.c ?? null, booksMinor: Number(books?.sum ?? 0), notLockedMinor: notLocked.reduce((a, l) => a + l.amountMinor, 0),
      lockedCount: board.length - notLocked.length, lineCount: board.length, openMinor: open.reduce((a, { i }) => a + openOf(i), 0), writeOffLimitMinor: settings.writeOffLimitMinor,
    };
  });
}
