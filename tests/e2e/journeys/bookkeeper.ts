import { expect, type Page } from "@playwright/test";
import { inboxAt, linkIn } from "@/tests/support/stand-ins";
import { mainOf, type Crew } from "../support/crew";
import { textOfPdf } from "../support/pdf-text";
import { product } from "../support/product";
import { CUSTOMER } from "./customer";

/** Draws the draft of a released order. Returns the words of the sheet. */
export async function draftInvoice(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Priya");
  await page.goto(crew.at("/books?view=ready"));
  await page.getByRole("row").filter({ hasText: order }).getByRole("button", { name: "Start invoice" }).click();
  await page.waitForURL(/\/books\/invoices\/[0-9a-f-]{36}$/);
  await page.getByRole("heading", { name: "Draft, issue, send" }).waitFor();
  return mainOf(page);
}

/** Issues it by F9, after the question with the amount. Returns its number. */
export async function issueInvoice(crew: Crew): Promise<string> {
  const page = await crew.as("Priya");
  await page.keyboard.press("F9");
  const question = page.getByRole("alertdialog");
  await expect(question).toContainText("$2,633.43");
  await question.getByRole("button", { name: "Issue it" }).click();
  const said = page.getByText(/^Invoice INV-[\d-]+ issued$/);
  await expect(said).toBeVisible();
  return /INV-\d{4}-\d{5}/.exec(await said.innerText())?.[0] ?? "";
}

/** The paper as the shop downloads it. */
export async function invoicePaper(crew: Crew): Promise<string> {
  const page = await crew.as("Priya");
  const print = page.getByRole("link", { name: "Print" }).first();
  await expect(async () => {
    await page.reload();
    await expect(print).toBeVisible({ timeout: 1000 });
  }).toPass({ timeout: 30_000 });
  const answer = await page.request.get((await print.getAttribute("href")) ?? "");
  return textOfPdf(await answer.body());
}

/** The mail with the paper and the link. */
export async function invoiceMail(after: number): Promise<{ paper: string; link: string }> {
  const inbox = inboxAt(product.inbox);
  const mail = await inbox.wait({ to: CUSTOMER, after, subject: "invoice" });
  return { paper: textOfPdf(await inbox.attachment(mail, 0)), link: linkIn(mail, "/l/") };
}

/** Takes in the bank's file of separated values. */
export async function takeInBankFile(crew: Crew, name: string, rows: readonly string[]): Promise<Page> {
  const page = await crew.as("Priya");
  await page.goto(crew.at("/books/match"));
  await page.getByRole("button", { name: "Bank file" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("File").setInputFiles({ name, mimeType: "text/csv", buffer: Buffer.from(`${rows.join("\n")}\n`) });
  await dialog.getByRole("button", { name: new RegExp(`^Take in ${rows.length - 1} lines`) }).click();
  await expect(dialog).toBeHidden();
  return page;
}

/** Locks the bank line of an amount to what is proposed. */
export async function lockLine(page: Page, amount: string): Promise<void> {
  const line = page.getByRole("button").filter({ hasText: amount }).first();
  await line.click();
  await page.getByRole("button", { name: "Lock this match" }).click();
  await expect(line).toHaveClass(/\bon\b/);
}

/** Sum row and rows of the trial balance, as on the screen: account to balance. */
export async function trialBalance(crew: Crew): Promise<Record<string, string>> {
  const page = await crew.as("Priya");
  await page.goto(crew.at("/books/balance"));
  const rows: Record<string, string> = {};
  const table = page.getByRole("table", { name: "Trial balance" });
  await table.waitFor();
  for (const row of await table.getByRole("row").all()) {
    const cells = (await row.locator("th, td").allTextContents()).map((c) => c.trim());
    rows[cells[0] ?? ""] = cells.at(-1) ?? "";
  }
  return rows;
}

/** A charge of the payout that came through the terminal: a person says which invoice it paid. */
export async function explainSale(page: Page, amount: string, invoice: string): Promise<void> {
  await page.getByRole("button").filter({ hasText: "2,174.61" }).first().click();
  const part = page.getByRole("region", { name: "What the payout is made of" }).getByRole("row").filter({ hasText: amount });
  const which = part.getByLabel("Which invoice did it pay");
  const option = await which.locator("option", { hasText: invoice }).getAttribute("value");
  await which.selectOption(option ?? "");
  await part.getByRole("button", { name: "Book it" }).click();
  await expect(which).toBeHidden();
  // Its refund, told before the charge was known, follows by itself.
  await expect(async () => {
    await page.reload();
    await page.getByRole("button").filter({ hasText: "2,174.61" }).first().click();
    await expect(part).toBeVisible({ timeout: 2000 });
    await expect(page.getByText("waits for its payment")).toBeHidden({ timeout: 500 });
  }).toPass({ timeout: 30_000 });
}

/** How many lines are locked. */
export async function matched(page: Page): Promise<string> {
  await page.reload();
  return mainOf(page);
}

/** Words of the receipt in the mail. */
export async function receiptOf(after: number): Promise<string> {
  const mail = await inboxAt(product.inbox).wait({ to: CUSTOMER, after, subject: "receipt" });
  return `${mail.subject} ${mail.text}`;
}

/** The page of the order's invoice. */
export async function openOf(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Priya");
  await page.goto(crew.at(`/orders/${order}`));
  await page.getByRole("link", { name: /^INV-/ }).first().click();
  await page.waitForURL(/\/books\/invoices\//);
  await page.getByRole("heading", { name: "Draft, issue, send" }).waitFor();
  return mainOf(page);
}
