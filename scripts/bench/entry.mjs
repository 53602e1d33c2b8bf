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

/** Keys pressed and decisions taken so far. A run of Tabs is one decision. */
function keyboardOf(page) {
  const counted = { keys: 0, decisions: 0 };
  const press = async (key) => { counted.keys += 1; await page.keyboard.press(key); };
  const isFocused = (wanted) => wanted.evaluate((el) => el === document.activeElement);
  return {
    counted, press,
    async tabTo(wanted, most = 200) {
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

async function oneTest(page, hands, when, sides) {
  await hands.tabTo(page.getByRole("button", { name: `Start ${when} test` }).first());
  await hands.press("Enter");
  const dialog = page.getByRole("dialog");
  if (when === "before") {
    // One lift past 0.460 makes a ladder of ten; the after test takes it over.
    await hands.tabTo(dialog.getByLabel("Past cam lift"));
    await hands.press("Control+a");
    await hands.type("0.460");
  }
  await hands.tabTo(dialog.getByRole("button", { name: `Start ${when} test` }));
  await hands.press("Enter");
  await dialog.waitFor({ state: "hidden" });
  for (const [side, values] of Object.entries(sides)) {
    await hands.tabTo(page.locator(`input[id^="c-${side}-${when}-"]`).first());
    for (const value of values) {
      await hands.type(value);
      await hands.press("Enter");
    }
  }
  await page.getByRole("status").filter({ hasText: /^Saved \d/ }).waitFor();
  await hands.tabTo(page.getByRole("button", { name: "Finish both tests" }));
  await hands.press("Enter");
  await page.getByText(/Before test finished|Before and after are finished/).first().waitFor();
}

/**
 * @param options `app` the address served, `cookie` of somebody who may record, `sheet` the path of a head without tests,
 *   `executablePath` of the browser.
 * @returns keys, decisions, seconds the browser took, and the seconds of a person: keys and decisions at their pace, and all
 *   of the browser's own time once more, as if nothing of it ran while the person was typing.
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
    const { keys, decisions } = hands.counted;
    return { lifts: LIFTS, keys, decisions, browserSeconds, personSeconds: keys * PACE.key + decisions * PACE.decide + browserSeconds };
  } finally {
    await browser.close();
  }
}
