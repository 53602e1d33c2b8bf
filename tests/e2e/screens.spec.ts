import fs from "node:fs";
import path from "node:path";
import AxeBuilder from "@axe-core/playwright";
import { expect, test, type Page } from "@playwright/test";
import { DEMO_PASSWORD, NINEBARK } from "@/seed/facts/ninebark";
import { realTime } from "./support/clock";
import { DESK, PHONE, signIn, TABLET } from "./support/crew";
import { linkOn, mailedLink, orderWith, someHead, someInvoice, twoTests, type Places } from "./support/places";

/**
 * Every page of the product: it answers, fits at three sizes, has no fault that axe can see, and the keyboard reaches it.
 * With E2E_EVERY_SIZE=1 axe looks at all three sizes, which takes twice as long.
 */
const EVERY_SIZE = process.env.E2E_EVERY_SIZE === "1";
const SIZES = [DESK, TABLET, PHONE] as const;
const SLUG = NINEBARK.slug;
const at = (rest: string) => `/s/${SLUG}${rest}`;
const UUID = "[0-9a-f-]{36}";

/** Where a page of this file stands in the demo. A page without an entry here fails. `out` pages are seen by nobody signed in. */
const PAGES: Record<string, { where: string | ((p: Places) => Promise<string>); out?: true; /** Answers of this status are meant. */ meant?: number }> = {
  "": { where: "/", out: true },
  "sign-in": { where: "/sign-in", out: true },
  // The board asks whose tablet this is, and is told that it is nobody's.
  clock: { where: "/clock", out: true, meant: 401 },
  "join/[token]": { where: "/join/not-a-good-invitation", out: true },
  "l/[token]": { where: () => mailedLink("your estimate"), out: true },
  "s/[shop]": { where: at("") },
  "s/[shop]/find": { where: at("/find") },
  "s/[shop]/orders": { where: at("/orders") },
  "s/[shop]/orders/new": { where: at("/orders/new") },
  "s/[shop]/orders/[number]": { where: (p) => orderWith(p, new RegExp(`/s/${SLUG}/orders/[\\w-]+(?=/pieces/\\d+/inspect)`)) },
  "s/[shop]/orders/[number]/estimate": { where: async (p) => `${await orderWith(p, new RegExp(`/s/${SLUG}/orders/[\\w-]+(?=/traveler)`))}/estimate` },
  "s/[shop]/orders/[number]/receive/[pieceNo]": { where: (p) => orderWith(p, new RegExp(`/s/${SLUG}/orders/[\\w-]+/receive/\\d+`)) },
  "s/[shop]/orders/[number]/pieces/[pieceNo]": { where: (p) => orderWith(p, new RegExp(`/s/${SLUG}/orders/[\\w-]+/pieces/\\d+(?=/inspect)`)) },
  "s/[shop]/orders/[number]/pieces/[pieceNo]/inspect": { where: (p) => orderWith(p, new RegExp(`/s/${SLUG}/orders/[\\w-]+/pieces/\\d+/inspect`)) },
  "s/[shop]/orders/[number]/epoxy/[pieceNo]": { where: async (p) => (await orderWith(p, new RegExp(`/s/${SLUG}/orders/[\\w-]+/pieces/\\d+(?=/inspect)`))).replace("/pieces/", "/epoxy/") },
  "s/[shop]/flow": { where: at("/flow") },
  "s/[shop]/flow/[head]": { where: async (p) => at(`/flow/${await someHead(p)}`) },
  "s/[shop]/flow/figures/[head]": { where: async (p) => at(`/flow/figures/${await someHead(p)}`) },
  "s/[shop]/flow/measure/[head]": { where: async (p) => at(`/flow/measure/${await someHead(p)}`) },
  "s/[shop]/flow/upload": { where: at("/flow/upload") },
  "s/[shop]/flow/ladder": { where: at("/flow/ladder") },
  "s/[shop]/flow/gear": { where: at("/flow/gear") },
  "s/[shop]/flow/gear/[bench]": { where: (p) => linkOn(p, at("/flow/gear"), new RegExp(`/s/${SLUG}/flow/gear/${UUID}`)) },
  "s/[shop]/flow/workings": { where: at("/flow/workings?f=gain_table&lifts_mm=1+2+3&before_cfm=14.2+27.8+40.1&after_cfm=13.6+27.5+41.9") },
  "s/[shop]/flow/library": { where: at("/flow/library") },
  "s/[shop]/flow/library/family": { where: at("/flow/library/family?family=S250-4V") },
  "s/[shop]/flow/library/overlay": { where: async (p) => at(`/flow/library/overlay?${await twoTests(p)}`) },
  "s/[shop]/customers": { where: at("/customers") },
  "s/[shop]/customers/new": { where: at("/customers/new") },
  "s/[shop]/customers/[id]": { where: (p) => linkOn(p, at("/customers"), new RegExp(`/s/${SLUG}/customers/${UUID}`)) },
  "s/[shop]/parts": { where: at("/parts") },
  "s/[shop]/parts/new": { where: at("/parts/new") },
  "s/[shop]/parts/count": { where: at("/parts/count") },
  "s/[shop]/parts/[sku]": { where: at("/parts/VEX-S250-265") },
  "s/[shop]/parts/[sku]/edit": { where: at("/parts/VEX-S250-265/edit") },
  "s/[shop]/purchases": { where: at("/purchases?view=all") },
  "s/[shop]/purchases/short": { where: at("/purchases/short") },
  "s/[shop]/purchases/[order]": { where: at("/purchases/PO-2026-0231") },
  "s/[shop]/purchases/suppliers": { where: at("/purchases/suppliers") },
  "s/[shop]/purchases/suppliers/new": { where: at("/purchases/suppliers/new") },
  "s/[shop]/purchases/suppliers/[id]": { where: (p) => linkOn(p, at("/purchases/suppliers"), new RegExp(`/s/${SLUG}/purchases/suppliers/${UUID}`)) },
  "s/[shop]/time": { where: at("/time") },
  "s/[shop]/books": { where: at("/books") },
  "s/[shop]/books/invoices/[id]": { where: async (p) => at(`/books/invoices/${await someInvoice(p)}`) },
  "s/[shop]/books/journal": { where: at("/books/journal") },
  "s/[shop]/books/balance": { where: at("/books/balance") },
  "s/[shop]/books/aging": { where: at("/books/aging") },
  "s/[shop]/books/match": { where: at("/books/match") },
  "s/[shop]/books/set-aside": { where: at("/books/set-aside") },
  "s/[shop]/settings": { where: at("/settings") },
  "s/[shop]/settings/menu": { where: at("/settings/menu") },
  "s/[shop]/settings/devices": { where: at("/settings/devices") },
  "s/[shop]/settings/people": { where: at("/settings/people") },
  "s/[shop]/settings/people/[id]": { where: (p) => linkOn(p, at("/settings/people"), new RegExp(`/s/${SLUG}/settings/people/${UUID}`)) },
};

const APP = path.resolve(import.meta.dirname, "../../app");
const pagesOfApp = fs.readdirSync(APP, { recursive: true }).map(String).filter((f) => path.basename(f) === "page.tsx")
  .map((f) => path.dirname(f).split("/").filter((part) => part !== "." && !/^\(.*\)$/.test(part)).join("/")).sort();

test.describe.configure({ mode: "default" });
let signedIn: Page;
let nobody: Page;
test.beforeAll(async ({ browser }) => {
  realTime();
  nobody = await (await browser.newContext()).newPage();
  signedIn = await (await browser.newContext()).newPage();
  const owner = NINEBARK.people.find((p) => p.roles.includes("owner"));
  await signIn(signedIn, owner?.email ?? "", DEMO_PASSWORD);
  await expect(signedIn).toHaveURL(new RegExp(`/s/${SLUG}$`));
});

test("every page of the product has an entry here, and every entry a page", () => {
  expect(Object.keys(PAGES).sort()).toEqual(pagesOfApp);
});

for (const [name, { where, out, meant }] of Object.entries(PAGES)) {
  test(`page ${name === "" ? "/" : name}`, async () => {
    const page = out ? nobody : signedIn;
    const faults: string[] = [];
    const note = (text: string) => faults.push(text);
    page.removeAllListeners();
    page.on("pageerror", (e) => note(e.message));
    page.on("console", (m) => { if (m.type() === "error" && !(meant !== undefined && m.text().includes(`status of ${meant}`))) note(m.text()); });
    const address = typeof where === "string" ? where : await where({ page, slug: SLUG });
    await page.setViewportSize(SIZES[0]);
    const answer = await page.goto(address);
    expect(answer?.status(), address).toBe(200);
    await page.getByRole("heading", { level: 1 }).first().waitFor();
    for (const size of SIZES) {
      await page.setViewportSize(size);
      expect(await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth), `sideways at ${size.width}`).toBeLessThanOrEqual(0);
      expect(await page.locator("h1:visible").count(), `h1 at ${size.width}`).toBe(1);
      if (size === DESK || EVERY_SIZE) expect(await axeFaults(page), `axe at ${size.width}`).toEqual([]);
    }
    await page.setViewportSize(SIZES[0]);
    expect(await keyboardFaults(page), "keyboard").toEqual([]);
    expect(faults, "console").toEqual([]);
  });
}

/** What axe finds: rule and the elements it names. */
async function axeFaults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page })
    .options({ runOnly: { type: "tag", values: ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"] }, rules: { "target-size": { enabled: true } }, resultTypes: ["violations"] }).analyze();
  return violations.map((v) => `${v.id}: ${v.nodes.slice(0, 3).map((n) => `${n.target.join(" ")} ${n.any[0]?.message ?? ""}`).join(" | ")}`);
}

interface Focused { readonly name: string; readonly main: boolean; readonly has: boolean; readonly unseen: string | null }

/**
 * What has the focus now, and whether the one before looked different while it had it: outline, shadow, border or ground of
 * itself, of its label or of up to three boxes around it.
 */
function lookAtFocus(): Focused | null {
  const holder = window as unknown as { before?: { el: HTMLElement; name: string; looks: string } };
  const looks = (el: HTMLElement): string => {
    const boxes: Element[] = [];
    for (let box: Element | null = el; box !== null && boxes.length < 4; box = box.parentElement) boxes.push(box);
    if (el instanceof HTMLInputElement && el.labels) boxes.push(...el.labels);
    return boxes.map((b) => { const s = getComputedStyle(b); return [s.outlineStyle, s.outlineWidth, s.outlineColor, s.boxShadow, s.borderColor, s.backgroundColor, s.clip].join(); }).join(";");
  };
  const last = holder.before;
  const unseen = last !== undefined && last.el.isConnected && last.el !== document.activeElement && looks(last.el) === last.looks ? last.name : null;
  const el = document.activeElement;
  if (!(el instanceof HTMLElement) || el === document.body) {
    delete holder.before;
    return null;
  }
  const name = `${el.tagName.toLowerCase()} ${(el.getAttribute("aria-label") ?? el.textContent ?? el.id).trim().slice(0, 40)}`;
  holder.before = { el, name, looks: looks(el) };
  const box = el.getBoundingClientRect();
  return { name, main: el.closest("main") !== null, has: box.width > 0 && box.height > 0, unseen };
}

/** Tabs through the page: the main part is reached, and whatever has the focus is there and looks different for it. */
async function keyboardFaults(page: Page): Promise<string[]> {
  const faults = new Set<string>();
  // From the top of the page, wherever the page itself has put the focus: the browser goes on from where the last one stood.
  await page.evaluate(() => {
    const top = document.createElement("button");
    document.body.prepend(top);
    top.focus();
    top.remove();
  });
  let inMain = 0;
  for (let i = 0; i < 60 && inMain < 12; i += 1) {
    await page.keyboard.press("Tab");
    const seen = await page.evaluate(lookAtFocus);
    if (seen === null) break;
    if (seen.main) inMain += 1;
    if (seen.unseen !== null) faults.add(`the focus does not show on ${seen.unseen}`);
    if (!seen.has) faults.add(`nothing to see of ${seen.name}`);
  }
  const wanted = await page.locator("main :is(a[href], button:not([disabled]), input:not([type=hidden]):not([disabled]), select, textarea):visible").count();
  if (wanted > 0 && inMain === 0) faults.add("the keyboard never reached the main part");
  return [...faults];
}
