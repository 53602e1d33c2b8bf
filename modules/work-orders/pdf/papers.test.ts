import { describe, expect, it } from "vitest";
import { renderPdf } from "@/modules/outbound/pdf/render";
import { TAG_WIDTH, shortName, tagLabel, type TagFacts } from "./tag-label";
import { traveler, type TravelerFacts } from "./traveler";

const when = { creationDate: new Date("2026-02-24T17:00:00Z") };
const pages = (pdf: Buffer) => pdf.toString("latin1").match(/\/Type \/Page\b(?!s)/g)?.length ?? 0;
const widths = (pdf: Buffer) => [...pdf.toString("latin1").matchAll(/\/MediaBox \[0 0 ([\d.]+)/g)].map((m) => Number(m[1]));
/** All text of a description, in order. */
function textOf(node: unknown): string {
  if (typeof node === "string") return node;
  if (Array.isArray(node)) return node.map(textOf).join(" ");
  if (typeof node !== "object" || node === null) return "";
  return Object.entries(node).filter(([k]) => ["text", "stack", "columns", "content", "table", "body"].includes(k)).map(([, v]) => textOf(v)).join(" ");
}

const tag: TagFacts = {
  tag: "260224-07", address: "https://shop.example/s/first/orders/WO-2026-0118/pieces/1", customer: "The Very Long Name of a Racing Team Somewhere", family: "S250-4V", castingNumber: "K7-2201", serial: "A1193",
  orderNumber: "WO-2026-0118", promisedOn: "2026-03-20", ownerKind: "customer", locale: "en-US",
};
const sheet: TravelerFacts = {
  shop: { name: "Test Headworks", address: "1 Lane", phone: "555", email: "a@b.example", locale: "en-US" }, orderNumber: "WO-2026-0118", customer: "Odalys Brennan", use: "closed_course", wants: "Full port", promisedOn: "2026-03-20", printedAt: "today",
  heads: [1, 2].map((pieceNo) => ({
    tag: pieceNo === 1 ? "260224-07" : null, pieceNo, address: "https://shop.example/x", family: "S250-4V", castingNumber: "K7-2201", serial: "A1193", ownerKind: "customer", tray: { valves: 4 }, damage: "nick", benchNotes: "",
    operations: [{ sequence: 70, code: "PIN", name: "Intake porting", skill: "porting", qtyMilli: 1000, bookMinutes: 270, mustRecord: "throat diameter", benchNote: "", state: "open" }],
    parts: [{ sku: "SEL-55", description: "Stem seal", neededMilli: 4000, bin: "C-02" }], cautions: [{ title: "Dust.", words: "Draw it off.", source: "29 CFR 1910.134" }],
  })),
};

describe("the tag", () => {
  it("is one label of 62 mm", async () => {
    const pdf = await renderPdf(tagLabel(tag), when);
    expect(pages(pdf)).toBe(1);
    expect(widths(pdf)[0]).toBeCloseTo((62 / 25.4) * 72, 1);
    expect(TAG_WIDTH).toBeCloseTo(175.75, 2);
  });
  it("stands in 36 points and bears the owner's letter, a short name and the promise", () => {
    const text = textOf(tagLabel(tag));
    for (const words of ["260224-07", " C ", "S250-4V", "WO-2026-0118", "Promised Mar 20, 2026"]) expect(text).toContain(words);
    expect(JSON.stringify(tagLabel(tag))).toContain('"fontSize":36');
    expect(shortName(tag.customer).length).toBeLessThanOrEqual(26);
    expect(textOf(tagLabel({ ...tag, ownerKind: "shop" }))).toContain(" S ");
  });
  it("is the same bytes when printed again", async () => {
    expect(await renderPdf(tagLabel(tag), when)).toEqual(await renderPdf(tagLabel(tag), when));
  });
});

describe("the traveler", () => {
  it("has a page a head, route, parts and cautions, and neither price nor pay", async () => {
    const text = textOf(traveler(sheet));
    for (const words of ["Intake porting", "4.5", "SEL-55", "C-02", "29 CFR 1910.134", "nick", "4 valves"]) expect(text).toContain(words);
    expect(text).not.toMatch(/\$|USD|price|rate/i);
    expect(pages(await renderPdf(traveler(sheet), when))).toBe(2);
  });
});
