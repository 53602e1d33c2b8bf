/**
 * A whole entry by keyboard alone in a real browser: a head nobody flowed yet, intake and exhaust, ten lifts each, before and
 * after. The browser plays the keys at its own speed; a person's time is reckoned from them by the keystroke-level model.
 */
import { chromium } from "@playwright/test";

/**
 * Seconds a key of an average typist who is no clerk, and to look and decide before each thing done. Source: Card, Moran and
 * Newell, "The Keystroke-Level Model for User Performance Time with Interactive Systems", CACM 23 (1980) 396-410, K and M;
 * values from memory.
 */
export const PACE = { key: 0.28, decide: 1.35 };

const INTAKE = ["24.6", "48.9", "71.2", "90.8", "106.5", "117.9", "124.4", "127.0", "128.1", "128.6"];
const EXHAUST = ["21.8", "43.0", "60.7", "74.1", "83.6", "89.7", "93.1", "94.8", "95.6", "95.9"];
const LIFTS = INTAKE.length;
const raised = (values) => values.map((v) => (Number(v) * 1.08).toFixed(1));

/** Keys pressed, decisions taken, and seconds waited for the product. A run of Tabs is one decision, and so is a figure typed. */
function keyboardOf(page) {
  const counted = { keys: 0, decisions: 0, waited: 0 };
  const press = async (key) => { counted.keys += 1; await page.keyboard.press(key); };
  const isFocused = (wanted) => wanted.evaluate((el) => el === document.activeElement);
  return {
    counted, press,
    async decide(key) { counted.decisions += 1; await press(key); },
    async waitFor(seen) {
      const since = performance.now();
      await seen();
      counted.waited += (performance.now() - since) / 1000;
    },
    async tabTo(wanted, most = 60) {
      await wanted.waitFor();
      counted.decisions += 1;
      for (let i = 0; i < most; i += 1) {
        if (await isFocused(wanted)) return;
        await press("Tab");
      }
      throw new Error(`Tab never reached ${wanted}.`);
    },
    async type(text) {
      counted.decisions += 1;
      for (const key of text) await press(key);
    },
  };
}

const focused = (page, wanted) => page.waitForFunction((css) => document.activeElement?.matches(css), wanted);

async function oneTest(page, hands, when, sides) {
  // The next step of the sheet: starts the test. Enter in a field sends the form; the after test takes everything over.
  await hands.decide("Control+Enter");
  const dialog = page.getByRole("dialog");
  await hands.waitFor(() => dialog.waitFor());
  if (when === "before") {
    // One lift past 0.460 makes a ladder of ten.
    await hands.tabTo(dialog.getByLabel("Past cam lift"));
    await hands.press("Control+a");
    await hands.type("0.460");
  } else await hands.tabTo(dialog.getByLabel("Step"));
  await hands.press("Enter");
  await hands.waitFor(() => dialog.waitFor({ state: "hidden" }));
  for (const [side, values] of Object.entries(sides)) {
    // The hand is taken to the first cell, and from the last intake lift to the first exhaust one.
    await hands.waitFor(() => focused(page, `input[id^="c-${side}-${when}-"]`));
    for (const value of values) {
      await hands.type(value);
      await hands.press("Enter");
    }
  }
  await hands.waitFor(() => page.getByRole("status").filter({ hasText: /^Saved \d/ }).waitFor());
  await hands.decide("Control+Enter");
  await hands.waitFor(() => page.getByText(/Before test finished|Before and after are finished/).first().waitFor());
}

/**
 * @param options `app` the address served, `cookie` of somebody who may record, `sheet` the path of a head without tests,
 *   `executablePath` of the browser.
 * @returns keys, decisions, seconds the browser took in all and of them waiting for the product, and the seconds of a person:
 *   keys and decisions at their pace, and what was waited for.
 */
export async function measureEntry({ app, cookie, sheet, executablePath }) {
  const browser = await chromium.launch({ executablePath, args: process.getuid?.() === 0 ? ["--no-sandbox"] : [] });
  try {
    const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
    await page.context().addCookies(cookie.split("; ").map((pair) => ({ name: pair.slice(0, pair.indexOf("=")), value: pair.slice(pair.indexOf("=") + 1), url: app })));
    await page.goto(`${app}${sheet}`);
    await page.waitForTimeout(1000);
    const hands = keyboardOf(page);
    const begun = performance.now();
    await oneTest(page, hands, "before", { intake: INTAKE, exhaust: EXHAUST });
    await oneTest(page, hands, "after", { intake: raised(INTAKE), exhaust: raised(EXHAUST) });
    const browserSeconds = (performance.now() - begun) / 1000;
    const { keys, decisions, waited } = hands.counted;
    return { lifts: LIFTS, keys, decisions, browserSeconds, waited, personSeconds: keys * PACE.key + decisions * PACE.decide + waited };
  } finally {
    await browser.close();
  }
}
