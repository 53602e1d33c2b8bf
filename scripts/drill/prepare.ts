/**
 * Founds the two shops that a drill is driven in, with what its commands need: people with sign-ins, tablets, parts on the
 * shelf, orders with agreed work, open flow tests. Prints the facts as JSON; run as the owner of the tables.
 */
import { randomUUID } from "node:crypto";
import { closeDatabase } from "@/db/client";
import type { ShopContext } from "@/modules/access/context";
import { addBench, addFixture } from "@/modules/flow/commands/gear";
import { addOwnHead } from "@/modules/flow/commands/families";
import { startTest } from "@/modules/flow/commands/start-test";
import { addSupplier } from "@/modules/purchasing/commands/suppliers";
import { addDevice, freshEnrolCode, makeEnrolCode } from "@/modules/time/commands/devices";
import { enrolTablet } from "@/modules/time/identity/enrol";
import { enterSpokenAnswer } from "@/modules/work-orders/commands/answer-estimate";
import { saveEstimate, startEstimate } from "@/modules/work-orders/commands/estimate-draft";
import { addMenuOperation } from "@/modules/work-orders/commands/menu";
import { openOrder } from "@/modules/work-orders/commands/open-order";
import { sendEstimate } from "@/modules/work-orders/commands/send-estimate";
import { addPart } from "@/modules/stock/commands/parts";
import { openStock } from "@/modules/stock/commands/adjust";
import { castOf, must, type Cast } from "@/seed/cast";
import type { NewPerson } from "@/seed/found-shop";

const PASSWORD = "drills do not forgive";
const CLIENTS_A_SHOP = 4;
const PARTS = 6;
const LIFTS = ["0.050", "0.100", "0.150", "0.200", "0.250", "0.300", "0.350", "0.400"];

/** Owner, counter and bookkeeper sign in; four technicians use the tablet. */
function staff(slug: string): NewPerson[] {
  const office: NewPerson[] = (["owner", "counter", "bookkeeper", "receiving"] as const).map((role) => ({ name: `${role} of ${slug}`, shortName: role, roles: [role], email: `${role}@${slug}.example`, password: PASSWORD }));
  const bench: NewPerson[] = Array.from({ length: CLIENTS_A_SHOP }, (_, i) => ({ name: `Bench ${i + 1} of ${slug}`, shortName: `bench${i + 1}`, roles: ["technician"], badge: `${slug}-${i + 1}` }));
  return [...office, ...bench];
}

async function tabletOf(owner: ShopContext, name: string): Promise<string> {
  const { id } = must(await addDevice(owner, { name }));
  const code = freshEnrolCode();
  must(await makeEnrolCode(owner, { id, code }));
  return must(await enrolTablet(code, { ip: name, agent: "drill" })).token;
}

async function agreedOrder(owner: ShopContext, n: number): Promise<string> {
  const order = must(await openOrder(owner, { newCustomer: { name: `Agreed ${n}`, email: `agreed${n}@drill.example` }, pieces: [{ family: "S250-4V" }], use: "road" }));
  const draft = must(await startEstimate(owner, { workOrderId: order.id }));
  const saved = must(await saveEstimate(owner, {
    estimateId: draft.estimateId, version: draft.version, laborDiscountPercent: "0", freight: "0", depositPercent: "30", exclusions: "", message: "", readyOn: "",
    lines: [{ kind: "labor", pieceNo: 1, operationCode: "CLN", description: "Clean and hot wash", qty: "1", unitPrice: "1000.00" }],
  }));
  must(await sendEstimate(owner, { estimateId: draft.estimateId, version: saved.version, to: "" }));
  must(await enterSpokenAnswer(owner, { estimateId: draft.estimateId, answer: "approved", via: "counter", name: "Drill" }));
  return order.id;
}

async function furnished(cast: Cast) {
  const owner: ShopContext = { ...cast.as("owner", "2026-01-02T09:00"), now: new Date() };
  must(await addMenuOperation(owner, { code: "CLN", name: "Clean and hot wash", station: "Tear-down", skill: "wash", sequence: 10, bookHours: "0.5", price: "1000.00" }));
  const parts: string[] = [];
  for (let i = 0; i < PARTS; i++) {
    const { id } = must(await addPart(owner, { sku: `D-${i}`, description: `Drilled part ${i}`, partClass: "valve", salePrice: "10.00" }));
    must(await openStock(owner, { partId: id, qty: "5000", value: `${5000 * (3 + i)}.37` }));
    parts.push(id);
  }
  const supplierId = must(await addSupplier(owner, { name: "Drill supply", email: "supply@drill.example" })).id;
  const orders: string[] = [];
  for (let i = 0; i < CLIENTS_A_SHOP; i++) orders.push(await agreedOrder(owner, i));
  const benchId = must(await addBench(owner, { name: "Bench" })).id;
  const fixtureId = must(await addFixture(owner, { name: "77", boreMm: "77" })).id;
  const tests: string[] = [];
  for (let i = 0; i < CLIENTS_A_SHOP; i++) {
    const head = must(await addOwnHead(owner, { mark: `DRILL-${i}`, family: "S250-4V", cylinders: 1 }));
    tests.push(must(await startTest(owner, { headId: head.id, side: "intake", purpose: "baseline", benchId, fixtureId, nominal: "28", lifts: LIFTS })).testId);
  }
  const tablets: string[] = [];
  for (let i = 0; i < CLIENTS_A_SHOP; i++) tablets.push(await tabletOf(owner, `Tablet ${i}`));
  return {
    id: cast.shop.id, slug: cast.shop.slug, parts, supplierId, orders, tests, lifts: LIFTS, tablets,
    people: cast.people, badges: Array.from({ length: CLIENTS_A_SHOP }, (_, i) => `${cast.shop.slug}-${i + 1}`),
    signIns: Object.fromEntries(["owner", "counter", "bookkeeper", "receiving"].map((role) => [role, { email: `${role}@${cast.shop.slug}.example`, password: PASSWORD }])),
  };
}

const ownerUrl = process.env.VK_OWNER_URL ?? "";
const pepper = process.env.VK_PIN_PEPPER ?? "";
const settings = { email: "counter@drill.example", address: "1 Drill Lane", taxMode: "sales", taxName: "Drill tax", taxRateText: "7.35", depositBasisPoints: 3000, burdenBasisPoints: 1800 };
const shops = [];
for (const [slug, zone, currency, locale] of [["drillone", "America/Denver", "USD", "en-US"], ["drilltwo", "Europe/London", "GBP", "en-GB"]] as const) {
  shops.push(await furnished(await castOf(ownerUrl, pepper, { slug, name: `Drill ${slug}`, zone, currency, locale, settings, ratesFrom: "2026-01-01", people: staff(slug) })));
}
await closeDatabase();
console.log(JSON.stringify({ run: randomUUID(), shops }));
