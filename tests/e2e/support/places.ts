import type { Page } from "@playwright/test";
import { inboxAt, linkIn } from "@/tests/support/stand-ins";
import { product } from "./product";

/** Real addresses in the demo shop for pages that name something: found by looking, as a person finds them. */
export interface Places {
  readonly page: Page;
  readonly slug: string;
}

const textAt = async ({ page }: Places, path: string): Promise<string> => {
  const answer = await page.request.get(path);
  if (!answer.ok()) throw new Error(`${path}: ${answer.status()}`);
  return answer.text();
};
const api = async <T>({ page, slug }: Places, path: string): Promise<T> => {
  const answer = await page.request.get(`/api/v1/s/${slug}${path}`);
  if (!answer.ok()) throw new Error(`${path}: ${answer.status()} ${await answer.text()}`);
  return (await answer.json()) as T;
};

/** The first address on a page that fits. */
export async function linkOn(places: Places, path: string, wanted: RegExp): Promise<string> {
  const found = wanted.exec(await textAt(places, path))?.[0];
  if (found === undefined) throw new Error(`no ${String(wanted)} on ${path}`);
  return found.replaceAll("&amp;", "&");
}

/** The newest order whose page leads to an address of this kind. */
export async function orderWith(places: Places, wanted: RegExp): Promise<string> {
  const { rows } = await api<{ rows: { number: string }[] }>(places, "/orders?view=open&limit=60");
  for (const { number } of rows) {
    const found = wanted.exec(await textAt(places, `/s/${places.slug}/orders/${number}`))?.[0];
    if (found !== undefined) return found;
  }
  throw new Error(`no open order leads to ${String(wanted)}`);
}

/** A head on the flow bench's list. */
export async function someHead(places: Places): Promise<string> {
  const { rows } = await api<{ rows: { headId: string; tests: number }[] }>(places, "/flow/heads");
  const row = rows.find((r) => r.tests > 0) ?? rows[0];
  if (!row) throw new Error("no head is on the flow bench's list");
  return row.headId;
}

/** Two finished tests that can be laid over each other, as query text. */
export async function twoTests(places: Places): Promise<string> {
  const { rows } = await api<{ rows: { testId: string }[] }>(places, "/flow/library");
  return `a=${rows[0]?.testId ?? ""}&b=${rows[1]?.testId ?? ""}`;
}

export async function someInvoice(places: Places): Promise<string> {
  const { rows } = await api<{ rows: { id: string }[] }>(places, "/invoices?view=all");
  return rows[0]?.id ?? "";
}

/** A customer's link to an estimate that waits for the answer. */
export async function mailedLink(subject: string): Promise<string> {
  const mails = await inboxAt(product.inbox).list({ subject });
  const [mail] = mails;
  if (!mail) throw new Error(`no mail about "${subject}"`);
  return new URL(linkIn(mail, "/l/")).pathname;
}
