import { expect, type Page } from "@playwright/test";
import { NINEBARK } from "@/seed/facts/ninebark";
import { instantIn, itIs } from "../support/clock";
import { TABLET, type Crew } from "../support/crew";

const person = (shortName: string) => {
  const p = NINEBARK.people.find((x) => x.shortName === shortName);
  if (!p) throw new Error(`nobody called ${shortName}`);
  return { badge: p.badge ?? "", pin: p.pin ?? "" };
};

/** Names of the operations on the tablet, by code. */
const OPERATION: Record<string, string> = {
  CLN: "Clean and hot wash", TDN: "Teardown and measure", PRT: "Crack and pressure test", FLB: "Baseline flow", GDE: "Guide replace, each", PIN: "Intake porting", EPX: "Epoxy floor fill", PEX: "Exhaust porting",
  SEA: "Seat cutting, each", LAP: "Lap and vacuum check", SPR: "Spring setup", FLF: "Final flow", LSH: "Lash shims", ASM: "Assembly", INS: "Final inspection",
};

/** A manager names a tablet and gets its code; the tablet, whose own clock says `local`, takes it. Returns the tablet's page. */
export async function enrolTablet(crew: Crew, name: string, local: string): Promise<Page> {
  itIs(local);
  const now = instantIn(local);
  const desk = await crew.as("Ilse");
  await desk.goto(crew.at("/settings/devices"));
  await desk.getByLabel("Name, by its place").fill(name);
  await desk.getByRole("button", { name: "Add and make a code" }).click();
  const plate = desk.getByRole("status").filter({ hasText: "Once, until" });
  const code = /[0-9A-Z]{4}-[0-9A-Z]{4}/.exec(await plate.innerText())?.[0] ?? "";
  const tablet = await crew.device(TABLET, { hasTouch: true });
  await tablet.clock.setSystemTime(now);
  await tablet.goto("/clock");
  await tablet.getByLabel("Code").fill(code.toLowerCase());
  await tablet.getByRole("button", { name: "Enrol this tablet" }).click();
  await expect(tablet.getByRole("heading", { name: "Who is working?" })).toBeVisible();
  return tablet;
}

/** Hours have passed: the tablet looks at the shop anew, as it does by itself every few seconds. */
async function wake(tablet: Page, local: string): Promise<void> {
  itIs(local);
  await tablet.clock.setSystemTime(instantIn(local));
  // One that began after both clocks were set: an earlier one would measure the jump.
  const board = tablet.waitForRequest((r) => r.url().endsWith("/api/v1/clock/board"));
  await tablet.evaluate(() => dispatchEvent(new Event("online")));
  await (await (await board).response())?.finished();
}

async function unlock(tablet: Page, shortName: string, by: "badge" | "pin"): Promise<void> {
  const { badge, pin } = person(shortName);
  if (by === "badge") {
    await tablet.getByLabel("Badge code, typed").fill(badge);
    await tablet.getByLabel("Badge code, typed").press("Enter");
  } else {
    await tablet.getByRole("button", { name: new RegExp(`^${shortName}\\b`) }).click();
    for (const digit of pin) await tablet.getByRole("group", { name: "Digits" }).getByRole("button", { name: digit, exact: true }).click();
    await tablet.getByRole("button", { name: /^(Clock in|Open)$/ }).click();
  }
  await expect(tablet.getByRole("heading", { name: /^(Start|Switch to|Head .*|Not on a head)$/ }).first()).toBeVisible();
}

const lock = async (tablet: Page): Promise<void> => {
  await tablet.getByRole("button", { name: "Lock", exact: true }).click();
  await expect(tablet.getByRole("heading", { name: "Who is working?" })).toBeVisible();
};

/** Starts or switches to an operation; gives a reason when the tablet asks for one. */
async function begin(tablet: Page, code: string): Promise<void> {
  const name = OPERATION[code] ?? code;
  const row = tablet.getByRole("button").filter({ has: tablet.getByText(name, { exact: true }) });
  const more = tablet.getByRole("button", { name: /^\d+ more$/ });
  if (!(await row.isVisible()) && (await more.isVisible())) await more.click();
  await row.click();
  const running = tablet.getByRole("region", { name: "Running now" });
  const reason = tablet.getByRole("button", { name: "Machine was free now" });
  await expect(running.getByText(name, { exact: true }).or(reason)).toBeVisible();
  if (await reason.isVisible()) await reason.click();
  await expect(running.getByText(name, { exact: true })).toBeVisible();
}

/** One stretch at the bench: comes in at the door if not in, starts at `from`, is done or stops at `to`; then home when told. */
export async function stretch(tablet: Page, day: string, who: string, code: string, from: string, to: string, end: "done" | "stop", by: "badge" | "pin" = "badge"): Promise<void> {
  await wake(tablet, `${day}T${from}`);
  await unlock(tablet, who, by);
  await begin(tablet, code);
  await lock(tablet);
  await wake(tablet, `${day}T${to}`);
  await unlock(tablet, who, "badge");
  await tablet.getByRole("button", { name: end === "done" ? "Operation done" : "Stop clock" }).click();
  await expect(tablet.getByRole("heading", { name: "Nothing running" })).toBeVisible();
  await tablet.getByRole("button", { name: "Clock out" }).click();
  await expect(tablet.getByRole("heading", { name: "Off the clock" })).toBeVisible();
  await lock(tablet);
}

/** From one operation straight to the next, without a stop between. */
export async function switchTo(tablet: Page, local: string, who: string, code: string): Promise<void> {
  await wake(tablet, local);
  await unlock(tablet, who, "badge");
  await begin(tablet, code);
  await lock(tablet);
}

/** Epoxy in the intake floor: grams, ratio, when it was mixed and the cure of its data sheet. Returns what was kept, in words. */
export async function recordEpoxy(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Anselm");
  await page.goto(crew.at(`/orders/${order}/epoxy/1`));
  await page.getByLabel("Operation").selectOption({ label: OPERATION.EPX ?? "" });
  await page.getByLabel("In the port").fill("38");
  await page.getByLabel("Left in the pot").fill("4");
  await page.getByLabel("Ratio, resin to hardener").fill("100:20");
  await page.getByLabel("Cure of the data sheet").fill("24");
  await page.getByLabel("Mixed at").fill("2026-03-07T11:30");
  await page.getByLabel("Surface cleaned and keyed as the data sheet says").check();
  await page.getByRole("button", { name: "Keep the fill, 42 g" }).click();
  return await page.getByText(/^Epoxy kept: /).innerText();
}
