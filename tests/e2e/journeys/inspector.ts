import { expect, type Page } from "@playwright/test";
import type { Crew } from "../support/crew";

/** The whole sheet ticked and the tray counted out; then released, or not. Returns the page. */
export async function inspect(crew: Crew, who: string, order: string): Promise<Page> {
  const page = await crew.as(who);
  await page.goto(crew.at(`/orders/${order}/pieces/1/inspect`));
  const form = page.getByRole("form", { name: "Final inspection" });
  await form.getByRole("checkbox").first().waitFor();
  for (const box of await form.getByRole("checkbox").all()) await box.check();
  for (const back of await form.getByLabel(/, go back$/).all()) await back.fill("4");
  await form.getByRole("button", { name: /^Release / }).click();
  return page;
}

/** Somebody finds something at the bench and says so in words for the customer. */
export async function recordFinding(crew: Crew, order: string): Promise<void> {
  const page = await crew.as("June");
  await page.goto(crew.at(`/orders/${order}`));
  await page.getByRole("button", { name: "Record finding" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("Where").fill("exhaust");
  await dialog.getByLabel("In words for the customer").fill("Exhaust guides and valves out of limit: guide bores belled, stems worn at the top.");
  await dialog.getByRole("button", { name: "Record it" }).click();
  await expect(page.getByText("Not asked yet")).toBeVisible();
}
