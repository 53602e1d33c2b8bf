import { expect, type Page } from "@playwright/test";
import { inboxAt } from "@/tests/support/stand-ins";
import { mainOf, choose, type Crew } from "../support/crew";
import { textOfPdf } from "../support/pdf-text";
import { product } from "../support/product";

/** What is short becomes a purchase order: the list proposes the valves, the guides are added by hand. Ends on the draft. */
export async function orderWhatIsShort(crew: Crew, order: string): Promise<void> {
  const page = await crew.as("Tobias");
  await page.goto(crew.at("/purchases/short"));
  const group = page.getByRole("region", { name: "Greywater Valve Supply" });
  await expect(group.getByRole("row").filter({ hasText: "VEX-S250-265" })).toContainText(order);
  await group.getByRole("button", { name: "Write order, 1 line" }).click();
  await page.waitForURL(/\/purchases\/(?!short)/);
  await page.getByRole("textbox", { name: "Quantity" }).first().fill("6");
  await page.getByRole("textbox", { name: "Each" }).first().fill("22.00");
  await page.getByRole("button", { name: "Add a part" }).click();
  await choose(page, "Line 2, part", "GDE-S250", /^GDE-S250-BRZ/);
  await page.getByRole("textbox", { name: "Quantity" }).nth(1).fill("10");
  await page.getByRole("textbox", { name: "Each" }).nth(1).fill("7.80");
  await page.getByLabel("For").nth(1).selectOption({ label: `${order}, Odalys Brennan` });
  await page.getByLabel("Needed by").fill("2026-03-04");
  await page.getByRole("button", { name: "Save lines" }).click();
  await expect(page.getByText("Lines saved")).toBeVisible();
}

/** Sends it by mail. Returns its number and the text of the paper that the supplier got. */
export async function sendPurchaseOrder(crew: Crew, after: number): Promise<{ number: string; paper: string }> {
  const page = await crew.as("Tobias");
  await page.getByRole("button", { name: "Send order" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByRole("radio", { name: /^By mail/ }).check();
  await dialog.getByLabel("Expected on").fill("2026-03-03");
  await dialog.getByRole("button", { name: "Send it" }).click();
  await expect(dialog).toBeHidden();
  const inbox = inboxAt(product.inbox);
  const mail = await inbox.wait({ to: "orders@greywater.example", after });
  const paper = textOfPdf(await inbox.attachment(mail, 0));
  return { number: /PO-\d{4}-\d{4}/.exec(paper)?.[0] ?? "", paper };
}

/** The parcel is taken in with what came of each line, and its freight. */
export async function takeIn(crew: Crew, number: string, came: Readonly<Record<string, string>>, freight: string, note: string): Promise<Page> {
  const page = await crew.as("Emeka");
  await page.goto(crew.at(`/purchases/${number}`));
  for (const [sku, qty] of Object.entries(came)) await page.getByLabel(`Came, ${sku}`).fill(qty);
  await page.getByLabel("Freight on this delivery").fill(freight);
  await page.getByLabel("Delivery note").fill(note);
  await page.keyboard.press("F9");
  await expect(page.getByText(/^Taken in as /)).toBeVisible();
  return page;
}

/** Everything that lies ready for an order goes out to it. Returns how many kinds. */
export async function issueAll(crew: Crew, order: string): Promise<number> {
  const page = await crew.as("Emeka");
  await page.goto(crew.at(`/orders/${order}`));
  const key = page.getByRole("button", { name: /^Issue (all \d+ that are ready|the one that is ready)$/ });
  const words = await key.innerText();
  await key.click();
  await expect(page.getByText(/^Issued \d+ part/)).toBeVisible();
  return Number(/\d+/.exec(words)?.[0] ?? "1");
}

/** On hand and value of a part, as its page shows them to whoever may see cost. */
export async function partFigures(crew: Crew, sku: string): Promise<string> {
  const page = await crew.as("Ilse");
  await page.goto(crew.at(`/parts/${sku}`));
  return mainOf(page);
}

/** The purchase order as its page shows it. */
export async function orderFigures(crew: Crew, number: string): Promise<string> {
  const page = await crew.as("Ilse");
  await page.goto(crew.at(`/purchases/${number}`));
  return mainOf(page);
}

/** Parts in work at cost, on the order's page. */
export async function costInWork(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Ilse");
  await page.goto(crew.at(`/orders/${order}`));
  return (await page.getByText(/^Parts in work at cost/).innerText()).trim();
}
