import { expect, type Page } from "@playwright/test";
import { HERO_FOUND_LABOR, HERO_FOUND_SHELF, HERO_LABOR, HERO_SHELF } from "@/seed/facts/hero";
import { choose, type Crew } from "../support/crew";

/** A call: the customer is added and the order opened on one page. Returns its number. */
export async function openOrder(crew: Crew): Promise<string> {
  const page = await crew.as("Tobias");
  await page.getByRole("link", { name: /^New/ }).first().click();
  await page.getByRole("heading", { level: 1, name: "New work order" }).waitFor();
  await choose(page, "Customer", "Odalys Brennan", "Add “Odalys Brennan” as a new customer");
  await page.getByLabel("Telephone").fill("555-0142");
  await page.getByLabel("E-mail").fill("odalys@brennan.example");
  await page.getByLabel("Engine family").fill("S250-4V");
  await page.getByLabel("Casting number").fill("K7-2201");
  await page.getByLabel("Serial").fill("A1193");
  await page.getByLabel("Declared value").fill("3,200.00");
  await page.getByLabel("What they want").fill("Full port, intake floor filled. Wants proof on the bench.");
  await page.getByRole("radio", { name: "Closed course" }).check();
  await page.getByLabel("Promised").fill("2026-03-20");
  await page.keyboard.press("F9");
  await page.waitForURL(/\/orders\/WO-[\d-]+\/estimate$/);
  return /orders\/(WO-[\d-]+)\//.exec(page.url())?.[1] ?? "";
}

/** Adds one line by its code or number, with its quantity. */
export async function addLine(page: Page, code: string, qty: string): Promise<void> {
  await choose(page, "Add work or a part", code, new RegExp(`^${code}\\b`));
  const line = page.getByRole("listitem", { name: /^Line \d+, / }).last();
  await expect(line).toContainText(code);
  await line.getByLabel(/quantity$/).fill(qty);
}

/** Sums of the version on the screen. */
export async function sums(page: Page): Promise<string> {
  return (await page.getByRole("region", { name: "Sums" }).innerText()).replace(/\s+/g, " ");
}

/** Prices the work from menu and shelf, with discount, freight and deposit. Ends on the builder. */
export async function priceOrder(crew: Crew): Promise<string> {
  const page = await crew.as("Tobias");
  for (const [code, qty] of [...HERO_LABOR, ...HERO_SHELF]) await addLine(page, code, qty);
  await page.getByLabel("Off labor").fill("5");
  await page.getByLabel("Freight").fill("42.00");
  await page.getByLabel("Deposit").fill("30");
  await page.getByLabel("Ready about").fill("2026-03-20");
  await expect(page.getByRole("status").filter({ hasText: /^Saved/ })).toBeVisible();
  return sums(page);
}

/** Sends the version that is written. */
export async function sendEstimate(crew: Crew): Promise<void> {
  const page = await crew.as("Tobias");
  await page.keyboard.press("F9");
  const dialog = page.getByRole("dialog");
  await expect(dialog.getByLabel("E-mail")).toHaveValue("odalys@brennan.example");
  await dialog.getByRole("button", { name: "Send it" }).click();
  await page.waitForURL(/\/orders\/WO-[\d-]+$/);
}

/** Turns what was found into the next version: two guides with their work and two valves on top of what stands. Ends on the builder. */
export async function priceFinding(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Tobias");
  await page.goto(crew.at(`/orders/${order}`));
  await page.getByRole("button", { name: "Ask customer" }).click();
  await page.waitForURL(/\/estimate$/);
  for (const [code, qty] of [...HERO_FOUND_LABOR, ...HERO_FOUND_SHELF]) await addLine(page, code, qty);
  await page.getByLabel("To the customer").fill("Two exhaust guides and two exhaust valves on top of what you agreed. The rest goes on meanwhile.");
  await expect(page.getByRole("status").filter({ hasText: /^Saved/ })).toBeVisible();
  return sums(page);
}
