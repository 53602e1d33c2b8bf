import { expect } from "@playwright/test";
import { PHONE, type Crew } from "../support/crew";
import { textOfPdf } from "../support/pdf-text";

/** Six photographs, each another: pictures of the very page, of growing height. */
async function photos(crew: Crew): Promise<{ name: string; mimeType: string; buffer: Buffer }[]> {
  const page = await crew.as("Emeka", PHONE);
  const taken = [];
  for (let i = 1; i <= 6; i += 1) {
    taken.push({ name: `head-${i}.jpg`, mimeType: "image/jpeg", buffer: await page.screenshot({ type: "jpeg", clip: { x: 0, y: 0, width: 390, height: 200 + i * 40 } }) });
  }
  return taken;
}

/** Books the head in on a telephone: photographs, parts in the tray, damage. Returns the tag. */
export async function bookIn(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Emeka", PHONE);
  await page.goto(crew.at(`/orders/${order}`));
  await page.getByRole("link", { name: "Book in" }).first().click();
  await page.getByRole("heading", { level: 1, name: "Book in" }).waitFor();
  await page.getByLabel("Add photos").setInputFiles(await photos(crew));
  await expect(page.getByRole("list", { name: "Photo of the head" }).getByRole("link")).toHaveCount(6);
  for (const kind of ["Valves", "Springs", "Shims"]) await page.getByLabel(kind, { exact: true }).fill("4");
  await expect(page.getByLabel("Casting number")).toHaveValue("K7-2201");
  await page.getByLabel("Where it lies").fill("Rack A");
  await page.getByLabel("Damage seen").fill("Nick on the deck edge, exhaust side. Photographed.");
  await page.getByRole("button", { name: /^Book in/ }).click();
  await page.waitForURL(/\/pieces\/1$/);
  return await page.getByRole("heading", { level: 1 }).innerText();
}

/** Opens the label of the head. Returns its words. */
export async function tagLabel(crew: Crew): Promise<string> {
  const page = await crew.as("Emeka", PHONE);
  const href = await page.getByRole("link", { name: "Print tag" }).getAttribute("href");
  const answer = await page.request.get(href ?? "");
  expect(answer.headers()["content-type"]).toBe("application/pdf");
  return textOfPdf(await answer.body());
}

/** The head is packed and leaves with the carrier; the books take the carrier's price. */
export async function ship(crew: Crew, order: string): Promise<void> {
  const page = await crew.as("Emeka");
  await page.goto(crew.at(`/orders/${order}`));
  await page.getByRole("button", { name: "Ship" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("Carrier", { exact: true }).fill("Pell Parcel");
  await dialog.getByLabel("Service").fill("ground, insured");
  await dialog.getByLabel("Tracking number").fill("PP-558120");
  await expect(dialog.getByLabel("Insured for")).toHaveValue("3200.00");
  await dialog.getByLabel("Carrier's price").fill("36.40");
  await dialog.getByRole("button", { name: "It is with the carrier" }).click();
  await expect(page.getByText("Shipped, and the customer told")).toBeVisible();
}
