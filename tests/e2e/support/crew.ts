import { expect, type Browser, type BrowserContext, type Page } from "@playwright/test";
import { DEMO_PASSWORD } from "@/seed/facts/ninebark";

export const DESK = { width: 1440, height: 900 } as const;
export const TABLET = { width: 1180, height: 820 } as const;
export const PHONE = { width: 390, height: 844 } as const;

/** The browser writes a line for every answer of 400 and above; those that a step means to get are named here. */
const MEANT = /Failed to load resource: the server responded with a status of (401|404|409|422|429)/;

/** The people of one shop, each in a browser of their own, signed in when first asked for. What goes wrong unseen is kept. */
export class Crew {
  /** Errors that the pages wrote to the console or threw. */
  readonly faults: string[] = [];
  private readonly pages = new Map<string, Page>();
  private readonly contexts: BrowserContext[] = [];

  constructor(private readonly browser: Browser, readonly slug: string) {}

  /** A page of its own in a fresh browser of this size. */
  async device(size: { width: number; height: number }, more: Parameters<Browser["newContext"]>[0] = {}): Promise<Page> {
    const context = await this.browser.newContext({ viewport: size, ...more });
    this.contexts.push(context);
    const page = await context.newPage();
    this.watch(page);
    return page;
  }

  /** A customer's telephone: small, touched, with no session. */
  phone(): Promise<Page> {
    return this.device(PHONE, { hasTouch: true, isMobile: true });
  }

  watch(page: Page): void {
    page.on("pageerror", (error) => this.faults.push(`${page.url()}: ${error.message}`));
    page.on("console", (message) => {
      if (message.type() === "error" && !MEANT.test(message.text())) this.faults.push(`${page.url()}: ${message.text()}`);
    });
  }

  /** Address of a page of the shop. */
  at(path: string): string {
    return `/s/${this.slug}${path}`;
  }

  /** The page of somebody with a sign-in, by short name. */
  async as(shortName: string, size: { width: number; height: number } = DESK): Promise<Page> {
    const key = `${shortName} ${size.width}`;
    const known = this.pages.get(key);
    if (known) return known;
    const page = await this.device(size);
    await signIn(page, `${shortName.toLowerCase()}@${this.slug}.example`);
    await expect(page).toHaveURL(new RegExp(`/s/${this.slug}$`));
    this.pages.set(key, page);
    return page;
  }

  async leave(): Promise<void> {
    await Promise.all(this.contexts.map((c) => c.close()));
  }
}

/** Signs in by hand. */
export async function signIn(page: Page, email: string, password: string = DEMO_PASSWORD): Promise<void> {
  await page.goto("/sign-in");
  await page.getByLabel("E-mail").fill(email);
  await page.getByLabel("Password", { exact: true }).fill(password);
  await page.getByRole("button", { name: "Sign in" }).click();
}

/** Picks from a list that opens while one types. */
export async function choose(page: Page, label: string | RegExp, typed: string, option: string | RegExp): Promise<void> {
  await page.getByRole("combobox", { name: label }).fill(typed);
  await page.getByRole("option", { name: option }).first().click();
}

/** Words of a page's main part on one line, once it has come. */
export async function mainOf(page: Page): Promise<string> {
  const main = page.getByRole("main");
  await main.getByRole("heading", { level: 1 }).waitFor();
  return (await main.innerText()).replace(/\s+/g, " ");
}
