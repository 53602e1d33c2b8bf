/**
 * From a key to the picture that follows it, in a real browser, by the browser's own Event Timing entries (W3C): on an
 * almost empty form, and in the cells of a flow sheet whose flow, gain and curve are computed anew at every key.
 */
import { randomUUID } from "node:crypto";
import { chromium } from "@playwright/test";

/** Presses digits in one field, then moves on by Enter; returns what each key took, ms. Keys under 16 ms count as 16: the entries begin there. */
async function pressKeys(page, values) {
  await page.evaluate(() => {
    window.keyTimes = [];
    new PerformanceObserver((list) => {
      for (const e of list.getEntries()) if (e.name === "keydown") window.keyTimes.push(e.duration);
    }).observe({ type: "event", durationThreshold: 16 });
  });
  let keys = 0;
  for (const value of values) {
    await page.keyboard.press("Control+a");
    for (const key of [...value, "Enter"]) {
      await page.keyboard.press(key);
      await page.waitForTimeout(60);
      keys += 1;
    }
  }
  await page.waitForTimeout(500);
  const slow = await page.evaluate(() => window.keyTimes);
  return [...slow, ...Array(Math.max(0, keys - slow.length)).fill(16)].sort((a, b) => a - b);
}

const shown = (times) => ({ keys: times.length, p50: times[Math.floor(times.length / 2)], p95: times[Math.floor(times.length * 0.95)], worst: times.at(-1) });

/** Begins a test of eight lifts on a head, through the API, as a bench computer would; it stays open. */
export async function beginTest({ app, cookie, slug, headId, gear }) {
  const readings = ["0.050", "0.100", "0.150", "0.200", "0.250", "0.300", "0.350", "0.400"].map((lift, i) => ({ lift, value: String(20 + i * 12) }));
  const answer = await fetch(`${app}/api/v1/s/${slug}/flow/tests`, {
    method: "POST", headers: { cookie, origin: app, "content-type": "application/json", "idempotency-key": randomUUID() },
    body: JSON.stringify({ headId, side: "intake", purpose: "after", benchId: gear.bench, fixtureId: gear.fixture, nominal: "28", liftUnit: "in", camLift: "0.340", valve: "31", readings, complete: false }),
  });
  if (!answer.ok) throw new Error(`The test could not be begun: ${answer.status} ${await answer.text()}`);
}

/**
 * @param options `app` the address served, `cookie` of somebody who may record, `sheet` the path of a head with a test that
 *   is being taken, `executablePath` of the browser.
 */
export async function measureTyping({ app, cookie, sheet, executablePath }) {
  const browser = await chromium.launch({ executablePath, args: process.getuid?.() === 0 ? ["--no-sandbox"] : [] });
  try {
    const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
    await page.goto(`${app}/sign-in`);
    await page.waitForTimeout(1000);
    await page.locator("#email").focus();
    // Enter would send the form: the field is the floor for digits only.
    await page.locator("form").evaluate((form) => form.addEventListener("submit", (e) => e.preventDefault(), true));
    const floor = shown(await pressKeys(page, ["24.6", "48.9", "71.2", "90.8"]));
    await page.context().addCookies(cookie.split("; ").map((pair) => ({ name: pair.slice(0, pair.indexOf("=")), value: pair.slice(pair.indexOf("=") + 1), url: app })));
    await page.goto(`${app}${sheet}`);
    const cell = page.locator('input[id^="c-"]:not([readonly]):not([disabled])').first();
    await cell.waitFor();
    await page.waitForTimeout(1000);
    await cell.focus();
    return { floor, sheet: shown(await pressKeys(page, ["24.6", "48.9", "71.2", "90.8", "106.5", "117.9"])) };
  } finally {
    await browser.close();
  }
}
