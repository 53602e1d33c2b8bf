import { expect, type Page } from "@playwright/test";
import { inboxAt, linkIn, paymentLever } from "@/tests/support/stand-ins";
import { type Crew } from "../support/crew";
import { product } from "../support/product";

export const CUSTOMER = "odalys@brennan.example";

/** Number of the newest message in the inbox: what comes later is asked for "after" it. */
export async function newestMail(): Promise<number> {
  const [newest] = await inboxAt(product.inbox).list();
  return newest?.number ?? 0;
}

/** Takes the link out of the mail and opens it on a telephone. */
export async function openMailedLink(crew: Crew, after: number, subject?: string): Promise<Page> {
  const mail = await inboxAt(product.inbox).wait({ to: CUSTOMER, after, ...(subject === undefined ? {} : { subject }) });
  const phone = await crew.phone();
  await phone.goto(linkIn(mail, "/l/"));
  return phone;
}

/** Says yes to the version on the page, by name. */
export async function approve(phone: Page, amount: string): Promise<void> {
  await phone.getByLabel("Your name, as your signature").fill("Odalys Brennan");
  await phone.getByRole("button", { name: `Approve ${amount}` }).tap();
  await expect(phone.getByRole("heading", { level: 1, name: "You said yes. Thank you" })).toBeVisible();
}

export const CARDS = { good: "4242 4242 4242 4242", declined: "4000 0000 0000 0002", secondStep: "4000 0025 0000 3155" } as const;

/** From the shop's page to the provider's. Returns the amount that stands there. */
export async function goToPay(phone: Page, amount: string): Promise<string> {
  await phone.getByRole("button", { name: `Pay ${amount}` }).tap();
  await phone.waitForURL(`${product.payments}/c/pay/**`);
  return await phone.locator(".big").innerText();
}

/** Types a card on the provider's page and pays. */
export async function payWith(phone: Page, card: keyof typeof CARDS): Promise<void> {
  await phone.getByLabel("Card number").fill(CARDS[card]);
  await phone.getByLabel("Expires").fill("12/34");
  await phone.getByLabel("Security code").fill("123");
  await phone.getByLabel("Name on the card").fill("O Brennan");
  await phone.getByRole("button", { name: /^Pay [\d,.]+ USD$/ }).tap();
}

/** Looks again until the shop's page says so. */
export async function untilPage(page: Page, words: string | RegExp): Promise<void> {
  await expect(async () => {
    await page.reload();
    await expect(page.getByText(words).first()).toBeVisible({ timeout: 1000 });
  }).toPass({ timeout: 30_000 });
}

/** Events the provider told of, newest last: `type` and id. */
export async function eventsOf(type: string): Promise<string[]> {
  const response = await fetch(`${product.payments}/_control/events`);
  const all = (await response.json()) as { data?: { id: string; type: string }[] } | { id: string; type: string }[];
  return (Array.isArray(all) ? all : (all.data ?? [])).filter((e) => e.type === type).map((e) => e.id);
}

export const lever = (what: string, input: object = {}): Promise<unknown> => paymentLever(product.payments, what, input);
