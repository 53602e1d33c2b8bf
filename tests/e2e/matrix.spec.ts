import { randomUUID } from "node:crypto";
import { readdirSync } from "node:fs";
import path from "node:path";
import { expect, request, test, type APIRequestContext } from "@playwright/test";
import pg from "pg";
import { DEMO_PASSWORD } from "@/seed/facts/ninebark";
import { product } from "./support/product";

/** Every page and route, asked for by a person of shop A with what belongs to shop B. */
const A = { slug: "ninebark", owner: "marit@ninebark.example" };
const B = { slug: "tamarack", owner: "svea@tamarack.example" };
const CANARY = "Quillfinch";
const ROOT = path.join(import.meta.dirname, "../..");

const files = readdirSync(path.join(ROOT, "app"), { recursive: true, withFileTypes: true })
  .filter((e) => e.isFile() && /^(page\.tsx|route\.tsx?)$/.test(e.name)).map((e) => path.relative(path.join(ROOT, "app"), path.join(e.parentPath, e.name))).sort();

/** What stands where an address has a name of a thing; the key is the path up to it. */
type Names = Record<string, string>;
const NEEDED = ["customers/[id]", "orders/[number]", "parts/[sku]", "parts/[part]", "books/invoices/[id]", "[head]", "estimate/[version]", "flow/gear/[bench]", "flow/reports/[comparison]", "purchases/[order]", "purchases/suppliers/[id]", "settings/people/[id]", "files/[id]", "[pieceNo]", "workings/[function]"];

/** Addresses that belong to no shop, each with the reason it is not asked for here. */
const SHOPLESS: Record<string, string> = {
  "page.tsx": "leads to the asker's own shops", "(front)/sign-in/page.tsx": "nobody is known yet", "clock/page.tsx": "opened by a tablet's own token", "join/[token]/page.tsx": "opened by who holds the invitation",
  "api/auth/[...nextauth]/route.ts": "next-auth's own", "api/health/route.ts": "says only whether the product can serve", "api/stripe/webhook/route.ts": "opened by the provider's signature",
  "api/v1/openapi.json/route.ts": "the document of the addresses", "api/v1/clock/board/route.ts": "opened by a tablet's own token", "api/v1/clock/enrol/route.ts": "opened by the code typed into a tablet",
  "api/v1/clock/identify/route.ts": "opened by a tablet's own token", "api/v1/clock/punches/route.ts": "opened by a tablet's own token",
};
/** Pages of a customer, opened by a secret link: another shop's people do not hold it, and guessing is a test of its own. */
const BY_LINK = /^(l\/\[token\]|api\/v1\/l\/)/;

/** A function of the bench is no thing of a shop: it has one name for everybody. */
const FUNCTION = "convert_unit";
const shopFiles = files.filter((f) => f.includes("s/[shop]"));
const addressOf = (file: string) => `/${path.dirname(file).split("/").filter((p) => !/^\(.*\)$/.test(p)).join("/")}`;

/** The address of a file in a shop, with names of things filled in; null when a name has no case. */
function filled(file: string, slug: string, names: Names): string | null {
  let missing = false;
  const parts = addressOf(file).split("/");
  const at = parts.map((part, i) => {
    if (part === "[shop]") return slug;
    if (!part.startsWith("[")) return part;
    const key = Object.keys(names).filter((k) => parts.slice(0, i + 1).join("/").endsWith(`/${k}`)).sort((x, y) => y.length - x.length)[0];
    if (!key) missing = true;
    return key ? encodeURIComponent(names[key] ?? "") : part;
  });
  return missing ? null : at.join("/");
}

async function signedIn(email: string): Promise<APIRequestContext> {
  const context = await request.newContext({ baseURL: product.app, extraHTTPHeaders: { origin: product.app } });
  const { csrfToken } = (await (await context.get("/api/auth/csrf")).json()) as { csrfToken: string };
  const answer = await context.post("/api/auth/callback/credentials", { form: { csrfToken, email, password: DEMO_PASSWORD, json: "true", callbackUrl: product.app }, maxRedirects: 0 });
  expect([200, 302]).toContain(answer.status());
  expect((await context.storageState()).cookies.map((c) => c.name).join(" ")).toContain("session-token");
  return context;
}

async function post(context: APIRequestContext, at: string, body: object): Promise<Record<string, unknown>> {
  const answer = await context.post(at, { data: body, headers: { "idempotency-key": randomUUID() } });
  expect(answer.status(), `${at}: ${await answer.text()}`).toBe(200);
  return (await answer.json()) as Record<string, unknown>;
}

let a: APIRequestContext;
let names: Names;
const nobody: Names = Object.fromEntries(NEEDED.map((k) => [k, k === "orders/[number]" ? "WO-2026-9998" : k === "parts/[sku]" ? "NO-SUCH-PART" : ["[pieceNo]", "estimate/[version]"].includes(k) ? "1" : k === "workings/[function]" ? FUNCTION : randomUUID()]));

test.beforeAll(async () => {
  a = await signedIn(A.owner);
  const b = await signedIn(B.owner);
  const s = `/api/v1/s/${B.slug}`;
  // Rows of B with the canary in their words, made the way B's own people make them.
  const customer = await post(b, `${s}/customers`, { name: `${CANARY} Customer`, phone: "5550177" });
  const order = await post(b, `${s}/orders/open`, { customerId: customer.id, pieces: [{ family: `${CANARY}-4V`, description: CANARY }], use: "road", wants: CANARY });
  const sku = `QF-${randomUUID().slice(0, 8).toUpperCase()}`;
  const part = await post(b, `${s}/parts/add`, { sku, description: `${CANARY} valve`, partClass: "valve", salePrice: "1.00" });
  const supplier = await post(b, `${s}/suppliers/add`, { name: `${CANARY} Supply ${sku}` });
  const purchase = await post(b, `${s}/purchases/draft`, { supplierId: supplier.id, notes: CANARY, lines: [{ partId: part.id, qty: "1", price: "1.00" }] });
  await b.dispose();

  const owner = new pg.Client({ connectionString: process.env.E2E_OWNER_URL });
  await owner.connect();
  const { rows: [shop] } = await owner.query<{ id: string }>("select id from shops where slug = $1", [B.slug]);
  await owner.query("select set_config('app.shop_id', $1, false)", [shop?.id ?? ""]);
  // What B's demo has none of stands here as an id that nobody has: the answer must be the same anyway.
  const anyOf = async (table: string, where = "true") => (await owner.query<{ id: string }>(`select id from ${table} where shop_id = $1 and ${where} limit 1`, [shop?.id])).rows[0]?.id ?? randomUUID();
  names = {
    "customers/[id]": String(customer.id), "orders/[number]": String(order.number), "parts/[sku]": sku, "parts/[part]": String(part.id), "purchases/[order]": String(purchase.id), "purchases/suppliers/[id]": String(supplier.id), "[pieceNo]": "1",
    "books/invoices/[id]": await anyOf("invoices"), "estimate/[version]": "1", "[head]": await anyOf("heads"), "flow/gear/[bench]": await anyOf("benches"), "flow/reports/[comparison]": await anyOf("flow_comparisons"),
    "settings/people/[id]": await anyOf("people"), "files/[id]": await anyOf("files"), "workings/[function]": FUNCTION,
  };
  await owner.end();
});
test.afterAll(() => a.dispose());

test("every page and route has its place in this list", () => {
  const unknown = files.filter((f) => !shopFiles.includes(f) && !(f in SHOPLESS) && !BY_LINK.test(f));
  expect(unknown, "say in tests/e2e/matrix.spec.ts why this address belongs to no shop").toEqual([]);
  expect(Object.keys(SHOPLESS).filter((f) => !files.includes(f)), "addresses that are gone").toEqual([]);
  expect(shopFiles.filter((f) => filled(f, A.slug, nobody) === null), "say in tests/e2e/matrix.spec.ts what stands in this address").toEqual([]);
  expect(Object.keys(names).sort()).toEqual([...NEEDED].sort());
});

/** What the server sent for the browser to draw: a page that is not there is drawn by the browser alone. */
const drawn = (html: string): string => [...html.matchAll(/self\.__next_f\.push\((\[1,"(?:[^"\\]|\\.)*"\])\)/g)].map((m) => (JSON.parse(m[1] ?? "[]") as [number, string])[1]).join("");

/** What a person reads of an answer, now and once the browser has drawn it, with the names that were asked for taken out. */
function words(html: string, asked: Names): string[] {
  const nameless = (text: string) => Object.values(asked).sort((x, y) => y.length - x.length)
    .reduce((t, name) => t.replaceAll(name, "NAME").replaceAll(encodeURIComponent(name), "NAME"), text);
  const plain = html.replace(/<(script|style)\b.*?<\/\1>|<template\b.*?<\/template>/gs, "").replace(/<[^>]*>/g, " ").replace(/\s+/g, " ").trim();
  const texts = [...drawn(html).matchAll(/"children":"((?!\$)(?:[^"\\]|\\.)*)"/g)].map((m) => nameless(m[1] ?? ""));
  return [nameless(plain), ...texts.sort()];
}

for (const file of shopFiles) {
  const isRoute = /route\.tsx?$/.test(file);
  test(`${file}: nothing of B for a person of A`, async () => {
    // In B's house A's people do not exist.
    const foreign = filled(file, B.slug, names) ?? "";
    const inB = await a.get(foreign, { maxRedirects: 0 });
    const bodyInB = await inB.text();
    expect(bodyInB).not.toContain(CANARY);
    expect(bodyInB).not.toContain("Tamarack");
    expect([404, 405], `${foreign} answered ${inB.status()}`).toContain(inB.status());
    if (isRoute) {
      const posted = await a.post(foreign, { data: {}, headers: { "idempotency-key": randomUUID() }, maxRedirects: 0 });
      expect([404, 405], `POST ${foreign} answered ${posted.status()}`).toContain(posted.status());
      expect(await posted.text()).not.toContain(CANARY);
    }
    // In their own house B's things have never been.
    const theirs = filled(file, A.slug, names) ?? "";
    const never = filled(file, A.slug, nobody) ?? "";
    const [asked, missing] = [await a.get(theirs, { maxRedirects: 0 }), await a.get(never, { maxRedirects: 0 })];
    const [text, other] = [await asked.text(), await missing.text()];
    expect(text).not.toContain(CANARY);
    expect(asked.status()).toBe(missing.status());
    expect(asked.status()).toBeLessThan(500);
    if (theirs !== never) {
      expect(asked.status(), theirs).toBe(404);
      expect(words(text, names)).toEqual(words(other, nobody));
      if (!isRoute) expect(words(text, names).join(" ")).toContain("There is nothing at this address");
    }
  });
}

test("a person who is not signed in gets nothing but the way in", async () => {
  const anonymous = await request.newContext({ baseURL: product.app });
  for (const file of shopFiles) {
    const at = filled(file, B.slug, names) ?? "";
    const answer = await anonymous.get(at, { maxRedirects: 0 });
    expect([307, 401, 404, 405], `${at} answered ${answer.status()}`).toContain(answer.status());
    expect(await answer.text()).not.toContain(CANARY);
  }
  await anonymous.dispose();
});
