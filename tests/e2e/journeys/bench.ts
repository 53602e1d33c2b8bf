import { expect, type Page } from "@playwright/test";
import { HERO_CAM_LIFT_IN, HERO_FLOW } from "@/seed/facts/hero";
import type { Crew } from "../support/crew";

/** Moves the focus by Tab alone until the wanted control has it. */
export async function tabTo(page: Page, name: string | RegExp, role: "button" | "textbox" | "combobox" | "link" | "spinbutton" = "textbox", most = 80): Promise<void> {
  const wanted = page.getByRole(role, { name }).first();
  for (let i = 0; i < most; i += 1) {
    if (await wanted.evaluate((el) => el === document.activeElement)) return;
    await page.keyboard.press("Tab");
  }
  throw new Error(`Tab never reached ${String(name)}`);
}

/** Opens a head's flow sheet by its tag, from the keyboard. */
export async function openSheet(crew: Crew, tag: string): Promise<Page> {
  const page = await crew.as("June");
  await page.goto(crew.at("/flow"));
  await tabTo(page, "Tag of the head");
  await page.keyboard.type(tag);
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/flow\/[0-9a-f-]{36}/);
  return page;
}

/** Starts a test of both sides from the keyboard, with the conditions of the hero job. */
export async function startTest(page: Page, when: "before" | "after", seat: string): Promise<void> {
  await tabTo(page, `Start ${when} test`, "button");
  await page.keyboard.press("Enter");
  const dialog = page.getByRole("dialog");
  await expect(dialog).toBeVisible();
  const type = async (label: string | RegExp, text: string) => {
    await tabTo(page, label);
    await page.keyboard.press("Control+a");
    await page.keyboard.type(text);
  };
  // One lift past 0.360 makes the ladder end at 0.400.
  await type("Past cam lift", "0.360");
  for (const label of ["Room temperature", "Barometer"] as const) await type(new RegExp(`^${label}`), label === "Barometer" ? "24.9 inHg" : "68 F");
  await fieldsOf(page, dialog, "Intake", seat);
  await fieldsOf(page, dialog, "Exhaust", seat);
  await page.keyboard.press("Enter");
  await expect(dialog).toBeHidden();
}

async function fieldsOf(page: Page, dialog: ReturnType<Page["getByRole"]>, side: "Intake" | "Exhaust", seat: string): Promise<void> {
  const group = dialog.getByRole("group", { name: side });
  for (const [label, text] of [["Cam lift", HERO_CAM_LIFT_IN], ["Seats", seat]] as const) {
    const field = group.getByLabel(label);
    for (let i = 0; i < 40 && !(await field.evaluate((el) => el === document.activeElement)); i += 1) await page.keyboard.press("Tab");
    await page.keyboard.press("Control+a");
    await page.keyboard.type(text);
    await expect(field).toHaveValue(text);
  }
}

/** Types a whole test: intake down the column, then exhaust, Enter after each reading. */
export async function typeReadings(page: Page, when: "before" | "after"): Promise<void> {
  const purpose = when === "before" ? "baseline" : "after";
  for (const side of ["intake", "exhaust"] as const) {
    await page.locator(`#c-${side}-${when}-1270`).waitFor();
    for (let i = 0; i < 120 && !(await page.locator(`#c-${side}-${when}-1270`).evaluate((el) => el === document.activeElement)); i += 1) await page.keyboard.press("Tab");
    for (const value of HERO_FLOW[side][purpose]) {
      await page.keyboard.type(value);
      await page.keyboard.press("Enter");
    }
  }
  await expect(page.getByRole("status").filter({ hasText: /^Saved \d/ })).toBeVisible();
}

export async function finish(page: Page): Promise<void> {
  await tabTo(page, "Finish both tests", "button", 200);
  await page.keyboard.press("Enter");
  await expect(page.getByText(/Before test finished|Before and after are finished/)).toBeVisible();
}

/** Issues the report of the gain. */
export async function issueReport(page: Page): Promise<void> {
  await tabTo(page, "Issue report", "button", 200);
  await page.keyboard.press("Enter");
  await expect(page.getByRole("link", { name: /^Report \d+/ })).toBeVisible();
}
