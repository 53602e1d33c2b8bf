import { expect, test, type Page } from "@playwright/test";
import { HERO_BENCH } from "@/seed/facts/hero";
import * as bench from "./journeys/bench";
import * as books from "./journeys/bookkeeper";
import * as counter from "./journeys/counter";
import * as customer from "./journeys/customer";
import * as inspector from "./journeys/inspector";
import * as owner from "./journeys/owner";
import * as parts from "./journeys/parts";
import * as receiving from "./journeys/receiving";
import * as technician from "./journeys/technician";
import { itIs, realTime } from "./support/clock";
import { mainOf, Crew } from "./support/crew";
import { foundShopFor } from "./support/founded";

/**
 * The hero job by hand, role by role, from an empty shop to the matched bank line: what each role does stands in
 * journeys/<role>.ts, the order of the days here. Every figure that is compared stands in docs/hero-job.md.
 */
test.describe.configure({ mode: "serial" });

const TAG = "260224-07";
let crew: Crew;
let tablet: Page;
let order = "";
/** The customer's telephone with the page of the version that stands. */
let phone: Page;
let mailsSeen = 0;
let invoiceLink = "";

test.beforeAll(async ({ browser }) => {
  const shop = await foundShopFor(`headworks-${Date.now().toString(36)}`);
  await customer.lever("clear");
  await customer.lever("fee", { basisPoints: 270, fixedMinor: 25 });
  itIs("2026-02-17T11:20");
  crew = new Crew(browser, shop.slug);
});
test.afterAll(async () => {
  await crew.leave();
  realTime();
});

/** The stretches of the bench clock from one line of the table to before another, as told in docs/hero-job.md. */
async function atTheBench(from: number, to: number): Promise<void> {
  for (const [day, who, code, start, end, isDone] of HERO_BENCH.slice(from, to)) {
    await technician.stretch(tablet, day, who, code, start, end, isDone ? "done" : "stop", from === 0 ? "pin" : "badge");
  }
}

test("counter: opens the order while the customer is on the telephone", async () => {
  order = await counter.openOrder(crew);
  expect(order).toBe("WO-2026-0118");
});

test("counter: prices it from menu and shelf and sends version 1", async () => {
  itIs("2026-02-18T15:05");
  const sums = await counter.priceOrder(crew);
  expect(sums).toContain("$2,410.32");
  expect(sums).toContain("Deposit $723.10");
  for (const figure of ["18.1 h book 1,950.00", "5 % -97.50", "Parts 420.50", "Shop supplies 60.00", "Freight & insurance 42.00", "7.35 % on 480.50 35.32"]) expect(sums).toContain(figure);
  mailsSeen = await customer.newestMail();
  await counter.sendEstimate(crew);
});

test("customer: reads it on a telephone and says yes", async () => {
  itIs("2026-02-19T10:42");
  phone = await customer.openMailedLink(crew, mailsSeen);
  await expect(phone.getByText("$2,410.32").first()).toBeVisible();
  await customer.approve(phone, "$2,410.32");
});

test("customer: pays the deposit; a declined card does nothing, the bank's second step is answered", async () => {
  itIs("2026-02-19T10:47");
  expect(await customer.goToPay(phone, "$723.10")).toBe("723.10 USD");
  await customer.payWith(phone, "declined");
  await expect(phone.getByText("Your card was declined. Use another card.").first()).toBeVisible();
  await customer.payWith(phone, "secondStep");
  await phone.getByRole("button", { name: "Confirm the payment" }).tap();
  await phone.waitForURL(/\/l\//);
  await customer.untilPage(phone, "Deposit of $723.10 received.");
  itIs("2026-02-20T09:00");
  await customer.lever("payout", { currency: "usd", arrivalDate: "2026-02-20" });
});

test("receiving: books the head in on a telephone and prints its tag", async () => {
  itIs("2026-02-24T14:30");
  expect(await receiving.bookIn(crew, order)).toBe(TAG);
  expect(await receiving.tagLabel(crew)).toContain(TAG);
});

test("technician: enrols the tablet, comes in by PIN, cleans, takes apart, tests and flows", async () => {
  tablet = await technician.enrolTablet(crew, "Back door", "2026-02-25T08:00");
  await atTheBench(0, 4);
  expect(await counterOfOrder()).toContain("3.2 of 18.1 h");
});

test("bench: the baseline, by keyboard alone", async () => {
  itIs("2026-02-26T10:20");
  const sheet = await bench.openSheet(crew, TAG);
  await bench.startTest(sheet, "before", "on the cleaned original seats");
  await bench.typeReadings(sheet, "before");
  await bench.finish(sheet);
  await expect(sheet.getByText("16 of 16")).toBeVisible();
});

test("inspector: writes down what was found; counter: makes it version 2", async () => {
  itIs("2026-02-26T15:10");
  await inspector.recordFinding(crew, order);
  itIs("2026-02-26T16:40");
  const sums = await counter.priceFinding(crew, order);
  for (const figure of ["$2,633.43", "$223.11 against version 1", "18.9 h book 2,034.00", "5 % -101.70", "Parts 554.00", "7.35 % on 614.00 45.13"]) expect(sums).toContain(figure);
  mailsSeen = await customer.newestMail();
  await counter.sendEstimate(crew);
});

test("customer: agrees to version 2; no second deposit is asked", async () => {
  itIs("2026-02-27T08:05");
  phone = await customer.openMailedLink(crew, mailsSeen);
  await expect(phone.getByText("+223.11").first()).toBeVisible();
  await expect(phone.getByText("No second deposit is asked.", { exact: false })).toBeVisible();
  await customer.approve(phone, "$2,633.43");
});

let purchaseOrder = "";
test("parts: what is short becomes a purchase order, mailed with its paper", async () => {
  itIs("2026-02-27T09:00");
  await parts.orderWhatIsShort(crew, order);
  const sent = await parts.sendPurchaseOrder(crew, await customer.newestMail());
  purchaseOrder = sent.number;
  expect(purchaseOrder).toBe("PO-2026-0231");
  for (const figure of ["132.00", "78.00", "210.00"]) expect(sent.paper).toContain(figure);
});

test("parts: the parcel is taken in with its freight, shared by value", async () => {
  itIs("2026-03-03T10:15");
  await parts.takeIn(crew, purchaseOrder, { "VEX-S250-265": "6", "GDE-S250-BRZ": "10" }, "15.00", "GV 88121");
  expect(await parts.orderFigures(crew, purchaseOrder)).toContain("225.00");
  expect(await parts.partFigures(crew, "VEX-S250-265")).toContain("141.43");
  expect(await parts.partFigures(crew, "GDE-S250-BRZ")).toContain("128.57");
});

test("technician: guides, porting, epoxy with its cure over the change of clocks, seats, springs", async () => {
  await atTheBench(4, 7);
  itIs("2026-03-07T11:32");
  expect(await technician.recordEpoxy(crew, order)).toMatch(/30 g of lot E-2602, 12 g of lot E-2604.*12:30/);
  await atTheBench(7, 13);
  expect(await counterOfOrder()).toContain("17.2 of 18.9 h");
});

test("bench: the final test; the gain of both sides is what was measured", async () => {
  itIs("2026-03-12T11:08");
  const sheet = await bench.openSheet(crew, TAG);
  await bench.startTest(sheet, "after", "on fresh seats");
  await bench.typeReadings(sheet, "after");
  await expect(sheet.getByText("+9.45").first()).toBeVisible();
  await expect(sheet.getByText("+6.25").first()).toBeVisible();
  await bench.finish(sheet);
  await bench.issueReport(sheet);
});

test("parts: everything that is ready goes to the job at what it cost", async () => {
  itIs("2026-03-13T07:50");
  expect(await parts.issueAll(crew, order)).toBeGreaterThan(5);
  expect(await parts.costInWork(crew, order)).toContain("$260.52");
});

test("technician: lash, assembly and inspection; the bench clock comes to 1,149 minutes", async () => {
  await atTheBench(13, 16);
  expect(await counterOfOrder()).toContain("19.2 of 18.9 h");
});

test("inspector: whoever ported it may not release it, somebody else does", async () => {
  itIs("2026-03-13T10:27");
  const ported = await inspector.inspect(crew, "Anselm", order);
  await expect(ported.getByText("You ported this piece. Somebody else must release it.").first()).toBeVisible();
  const released = await inspector.inspect(crew, "June", order);
  await expect(released.getByText(`${TAG} is released`)).toBeVisible();
});

test("bookkeeper: drafts the invoice, issues it and mails it with its paper", async () => {
  itIs("2026-03-13T14:15");
  const sheet = await books.draftInvoice(crew, order);
  for (const figure of ["2,034.00", "101.70", "554.00", "60.00", "42.00", "45.13", "2,633.43", "723.10", "1,910.33", "+9.45", "+6.25", "10.63 %", "8.92 %"]) expect(sheet).toContain(figure);
  mailsSeen = await customer.newestMail();
  expect(await books.issueInvoice(crew)).toBe("INV-2026-00318");
  const paper = await books.invoicePaper(crew);
  for (const figure of ["INV-2026-00318", "RF95 NB20 2600 318", "2,633.43", "1,910.33", "+9.45", "+6.25"]) expect(paper).toContain(figure);
  const mail = await books.invoiceMail(mailsSeen);
  expect(mail.paper).toBe(paper);
  invoiceLink = mail.link;
});

test("customer: pays the open sum; the provider's event comes late and twice, and is one payment", async () => {
  itIs("2026-03-14T19:22");
  mailsSeen = await customer.newestMail();
  phone = await crew.phone();
  await phone.goto(invoiceLink);
  await customer.lever("webhooks", { mode: "hold" });
  expect(await customer.goToPay(phone, "$1,910.33")).toBe("1,910.33 USD");
  await customer.payWith(phone, "good");
  await phone.waitForURL(/\/l\//);
  await expect(phone.getByText("Your payment is on its way to us", { exact: false })).toBeVisible();
  await customer.lever("webhooks/release", { order: "reversed" });
  await customer.lever("webhooks", { mode: "normal" });
  const [event] = (await customer.eventsOf("checkout.session.completed")).slice(-1);
  await customer.lever("webhooks/resend", { event, times: 2 });
  await customer.untilPage(phone, "Paid already.");
  expect(await books.receiptOf(mailsSeen)).toContain("1,910.33");
  expect(await books.openOf(crew, order)).toContain("Paid in full.");
});

test("receiving: packs it; the carrier's price goes to the books", async () => {
  itIs("2026-03-16T15:40");
  await receiving.ship(crew, order);
  await expect((await crew.as("Emeka")).getByText("PP-558120").first()).toBeVisible();
});

test("bookkeeper: the payouts are matched to the bank's lines, fee and all", async () => {
  itIs("2026-03-16T16:00");
  const sale = (await customer.lever("sale", { amountMinor: 41250, currency: "USD", description: "terminal" })) as { id: string };
  await customer.lever("refund", { charge: sale.id, amountMinor: 8500 });
  itIs("2026-03-17T09:00");
  await customer.lever("payout", { currency: "usd", arrivalDate: "2026-03-17" });
  const page = await books.takeInBankFile(crew, "march.csv", ["Date,Text,Amount", "2026-02-20,CARD PAYOUT,703.33", "2026-03-17,CARD PAYOUT,2174.61"]);
  await books.lockLine(page, "703.33");
  await books.explainSale(page, "412.50", "INV-2026-00317");
  await books.lockLine(page, "2,174.61");
  expect(await books.matched(page)).toMatch(/2 of 2 lines locked/i);
});

test("bookkeeper: the journal balances to 0.00", async () => {
  const balance = await books.trialBalance(crew);
  expect(balance.Sum).toBe("0.00");
  expect(balance).toMatchObject({ 5000: "260.52", 5200: "36.40", 2000: "-36.40", 2050: "-225.00" });
});

test("owner: sees the floor and what the job earned", async () => {
  const earned = await owner.profit(crew, order);
  for (const figure of ["$1,506.42", "58.20 %", "2,588.30", "-260.52", "-713.36", "-36.40", "-71.60", "19.15 h", "Hollis Tran, 253 min", "Anselm Quist, 345 min", "108.82"]) expect(earned).toContain(figure);
  expect(await owner.floor(crew)).not.toContain(TAG);
});

test("nothing broke unseen on the way", () => {
  expect(crew.faults).toEqual([]);
});

async function counterOfOrder(): Promise<string> {
  const page = await crew.as("Tobias");
  await page.goto(crew.at(`/orders/${order}`));
  return mainOf(page);
}
