import { expect, test, type Page } from "@playwright/test";
import * as bench from "./journeys/bench";
import * as counter from "./journeys/counter";
import * as customer from "./journeys/customer";
import * as technician from "./journeys/technician";
import { itIs, realTime } from "./support/clock";
import { choose, Crew, PHONE } from "./support/crew";
import { foundShopWithWork } from "./support/founded";

/**
 * Wrong things at every step. What must hold each time: a message says what is wrong beside where it is wrong, what was
 * typed is still there, and nothing happened twice or by half.
 */
test.describe.configure({ mode: "serial" });

let crew: Crew;
let order = "";
let tag = "";
test.beforeAll(async ({ browser }) => {
  const shop = await foundShopWithWork(`wrong-${Date.now().toString(36)}`);
  order = shop.order;
  tag = shop.tag;
  itIs("2026-02-25T08:00");
  crew = new Crew(browser, shop.slug);
});
test.afterAll(async () => {
  await crew.leave();
  realTime();
});

/** Whoever has this field's error reads it there: the message is tied to the field. */
async function errorAt(page: Page, field: string | RegExp): Promise<string> {
  const input = page.getByLabel(field).first();
  await expect(input).toHaveAttribute("aria-invalid", "true");
  const ids = ((await input.getAttribute("aria-describedby")) ?? "").split(" ");
  return (await Promise.all(ids.map((id) => page.locator(`[id="${id}"]`).innerText()))).join(" ");
}

test("sign-in with a wrong password keeps both fields and says so", async () => {
  const page = await crew.device({ width: 1440, height: 900 });
  await page.goto("/sign-in");
  await page.getByLabel("E-mail").fill(`tobias@${crew.slug}.example`);
  await page.getByLabel("Password", { exact: true }).fill("not the password");
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page.getByRole("alert").filter({ hasText: "do not go together" })).toBeVisible();
  await expect(page.getByLabel("E-mail")).toHaveValue(`tobias@${crew.slug}.example`);
  await expect(page.getByLabel("Password", { exact: true })).toHaveValue("not the password");
});

test("what is typed before the page's script runs stays, and the key waits for it", async () => {
  const page = await crew.as("Tobias");
  let letThrough: () => void = () => undefined;
  const held = new Promise<void>((go) => { letThrough = go; });
  await page.route("**/_next/static/**", async (route) => {
    if (route.request().resourceType() === "script") await held;
    await route.continue();
  });
  await page.goto(crew.at("/orders/new"), { waitUntil: "commit" });
  await page.getByLabel("What they want").fill("Typed early.");
  await page.getByRole("radio", { name: "Other" }).check();
  await expect(page.getByRole("button", { name: "Open order" })).toBeDisabled();
  letThrough();
  await expect(page.getByRole("button", { name: "Open order" })).toBeEnabled();
  await page.unroute("**/_next/static/**");
  await expect(page.getByLabel("What they want")).toHaveValue("Typed early.");
  await expect(page.getByRole("radio", { name: "Other" })).toBeChecked();
});

test("an order with gaps says each beside its field and loses nothing", async () => {
  const page = await crew.as("Tobias");
  await page.goto(crew.at("/orders/new"));
  await page.getByLabel("Declared value").fill("three thousand");
  await page.getByLabel("What they want").fill("Seats, please.");
  await page.keyboard.press("F9");
  await expect(page.getByText(/\d+ things to fix before this order opens\./)).toBeVisible();
  expect(await errorAt(page, "Engine family")).not.toBe("");
  expect(await errorAt(page, "Declared value")).toMatch(/amount/i);
  await expect(page.getByLabel("Declared value")).toHaveValue("three thousand");
  await expect(page.getByLabel("What they want")).toHaveValue("Seats, please.");
});

test("the server breaks, then answers: the text stays, a second try opens one order; a double click opens one more", async () => {
  const page = await crew.as("Tobias");
  const orders = async () => ((await (await page.request.get(`/api/v1${crew.at("/orders")}`)).json()) as { rows: unknown[] }).rows.length;
  const before = await orders();
  await choose(page, "Customer", "Odalys", /^Odalys Brennan/);
  await page.getByLabel("Engine family").fill("S250-4V");
  await page.getByLabel("Declared value").fill("300.00");
  await page.getByRole("radio", { name: "Other" }).check();
  await page.route("**/orders/new", (route) => (route.request().method() === "POST" ? route.fulfill({ status: 500, body: "broken" }) : route.continue()));
  await page.getByRole("button", { name: "Open order" }).click();
  await expect(page.getByText(/^Not saved:/).first()).toBeVisible();
  await expect(page.getByLabel("What they want")).toHaveValue("Seats, please.");
  await page.unroute("**/orders/new");
  await page.getByRole("button", { name: "Try again" }).click();
  await page.waitForURL(/\/estimate$/);
  await page.goto(crew.at("/orders/new"));
  await choose(page, "Customer", "Odalys", /^Odalys Brennan/);
  await page.getByLabel("Engine family").fill("S450-4V");
  await page.getByRole("radio", { name: "Other" }).check();
  await page.getByRole("button", { name: "Open order" }).dblclick();
  await page.waitForURL(/\/estimate$/);
  await page.goto(crew.at("/orders?view=open"));
  await expect(page.getByRole("row").filter({ hasText: "S450-4V" }).filter({ hasText: "Odalys Brennan" })).toHaveCount(1);
  expect(await orders()).toBe(before + 2);
});

test("signed out in between: the form says so and keeps what was typed", async () => {
  const page = await crew.as("Kalea");
  await page.goto(crew.at("/parts/SEL-55/edit"));
  await page.getByLabel("What it is").fill("Stem seal 5.5, green");
  const cookies = await page.context().cookies();
  await page.context().clearCookies();
  await page.getByRole("button", { name: "Save part" }).click();
  await expect(page.getByText("Not saved: you are signed out.")).toBeVisible();
  await expect(page.getByLabel("What it is")).toHaveValue("Stem seal 5.5, green");
  await page.context().addCookies(cookies);
  await page.getByRole("button", { name: "Try again" }).click();
  await page.waitForURL(/\/parts\/SEL-55$/);
  await expect(page.getByText("Stem seal 5.5, green").first()).toBeVisible();
});

test("a stale tab is told that somebody changed it meanwhile", async () => {
  const [mine, theirs] = [await crew.as("Tobias"), await crew.as("Kalea")];
  for (const page of [mine, theirs]) await page.goto(crew.at("/parts/SHM-748/edit"));
  await theirs.getByLabel("Shelf").fill("C-21");
  await theirs.getByRole("button", { name: "Save part" }).click();
  await theirs.waitForURL(/\/parts\/SHM-748$/);
  await mine.getByLabel("Shelf").fill("C-99");
  await mine.getByRole("button", { name: "Save part" }).click();
  await expect(mine.getByText("Not saved: someone else changed this meanwhile.")).toBeVisible();
  await expect(mine.getByLabel("Shelf")).toHaveValue("C-99");
});

test("no part goes below zero", async () => {
  const page = await crew.as("Ilse");
  await page.goto(crew.at("/parts/GSK-S250-HD"));
  await page.getByRole("button", { name: "Throw out" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("How much").fill("99");
  await dialog.getByLabel("Why").fill("wet");
  await dialog.getByRole("button", { name: "Throw it out" }).click();
  await expect(dialog.getByText(/99|only|not enough|there (is|are)/i).first()).toBeVisible();
  await expect(dialog.getByLabel("How much")).toHaveValue("99");
  await expect(dialog.getByLabel("Why")).toHaveValue("wet");
});

test("addresses of another shop, and of nothing, are not there", async () => {
  const page = await crew.as("Tobias");
  for (const path of ["/s/ninebark", "/s/ninebark/orders", "/s/ninebark/parts/VEX-S250-265", crew.at("/orders/WO-2026-9999"), crew.at("/books/balance"), "/s/nowhere"]) {
    const answer = await page.goto(path);
    // A page that had begun to stream can say it only in its words.
    await expect(page.getByText("There is nothing at this address"), path).toBeVisible();
    expect([404, 200], path).toContain(answer?.status());
  }
});

test("a version that was replaced can't be answered, and an old link opens nothing", async () => {
  const seen = await customer.newestMail();
  const desk = await crew.as("Tobias");
  await desk.goto(crew.at(`/orders/${order}`));
  for (const _ of ["version 2", "version 3"]) {
    await desk.getByRole("button", { name: "Next version" }).click();
    await desk.waitForURL(/\/estimate$/);
    await counter.addLine(desk, "GDE", "2");
    await expect(desk.getByRole("status").filter({ hasText: /^Saved/ })).toBeVisible();
    await counter.sendEstimate(crew);
  }
  const phone = await customer.openMailedLink(crew, seen);
  await expect(phone.getByRole("heading", { level: 1, name: "This version was replaced" })).toBeVisible();
  await expect(phone.getByRole("button", { name: /^Approve/ })).toHaveCount(0);
  itIs("2026-07-01T08:00");
  await phone.reload();
  await expect(phone.getByRole("heading", { level: 1, name: "This link opens nothing" })).toBeVisible();
  itIs("2026-02-25T09:00");
});

test("a wrong PIN opens nothing and says so; the right one still does", async () => {
  const tablet = await technician.enrolTablet(crew, "Bench 2", "2026-02-25T09:05");
  await tablet.getByRole("button", { name: /^Emeka\b/ }).click();
  for (const digit of "918273") await tablet.getByRole("group", { name: "Digits" }).getByRole("button", { name: digit, exact: true }).click();
  await tablet.getByRole("button", { name: "Clock in" }).click();
  await expect(tablet.getByRole("alert").filter({ hasText: /PIN/ })).toBeVisible();
  await technician.stretch(tablet, "2026-02-25", "Emeka", "CLN", "09:10", "09:20", "done", "pin");
  await expect(tablet.getByRole("heading", { name: "Who is working?" })).toBeVisible();
});

test("the flow sheet keeps readings without a link, over a reload, and without an answer, and sends them when it can", async () => {
  itIs("2026-02-26T10:20");
  const page = await bench.openSheet(crew, tag);
  await bench.startTest(page, "before", "on the cleaned original seats");
  const first = page.locator("#c-intake-before-1270");
  await first.focus();
  await page.keyboard.type("24.6");
  await page.keyboard.press("Enter");
  await expect(page.getByRole("status").filter({ hasText: /^Saved \d/ })).toBeVisible();
  await page.context().setOffline(true);
  for (const value of ["48.9", "71.2"]) {
    await page.keyboard.type(value);
    await page.keyboard.press("Enter");
  }
  await expect(page.getByText("2 waiting, no link. Kept on this tablet.")).toBeVisible();
  await page.context().setOffline(false);
  await page.reload();
  await expect(page.getByRole("status").filter({ hasText: /^Saved/ })).toBeVisible();
  await expect(page.locator("#c-intake-before-3810")).toHaveValue("71.2");
  // The link holds, but the server does not answer.
  await page.route("**/flow/readings", (route) => route.fulfill({ status: 503, body: "away" }));
  await page.locator("#c-intake-before-5080").focus();
  await page.keyboard.type("90.8");
  await page.keyboard.press("Enter");
  await expect(page.getByText(/^[1-3] waiting, no link\. Kept on this tablet\.$/)).toBeVisible();
  await page.unroute("**/flow/readings");
  await expect(page.getByRole("status").filter({ hasText: /^Saved \d/ })).toBeVisible({ timeout: 20_000 });
  const elsewhere = await crew.as("Anselm");
  await elsewhere.goto(new URL(page.url()).pathname);
  await expect(elsewhere.locator("#c-intake-before-3810")).toHaveValue("71.2");
  await expect(elsewhere.locator("#c-intake-before-5080")).toHaveValue("90.8");
});

test("a reading that can't be is asked about, and kept as typed", async () => {
  const page = await crew.as("June");
  await page.locator("#c-intake-before-6350").focus();
  await page.keyboard.type("1O6.5");
  await page.keyboard.press("Enter");
  await expect(page.locator("#c-intake-before-6350")).toHaveAttribute("aria-invalid", "true");
  await expect(page.locator("#c-intake-before-6350")).toHaveValue("1O6.5");
});

test("booking in without enough photographs asks, and keeps the counts", async () => {
  const desk = await crew.as("Tobias");
  await desk.goto(crew.at("/orders?view=open"));
  const other = (await desk.getByRole("link", { name: /WO-2026-\d{4}|^\d+$/ }).first().getAttribute("href")) ?? "";
  const phone = await crew.as("Emeka", PHONE);
  await phone.goto(`${other}/receive/1`);
  await phone.getByLabel("Valves", { exact: true }).fill("four");
  await phone.getByRole("button", { name: /^Book in/ }).click();
  expect(await errorAt(phone, "Valves")).toMatch(/whole number/i);
  await expect(phone.getByLabel("Valves", { exact: true })).toHaveValue("four");
});

test("nothing broke unseen on the way", () => {
  expect(crew.faults.filter((f) => !/ERR_INTERNET_DISCONNECTED|Failed to fetch|status of 50[03]/.test(f))).toEqual([]);
});
