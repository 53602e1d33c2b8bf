import { readdirSync } from "node:fs";
import type { TDocumentDefinitions } from "pdfmake/interfaces";
import { describe, expect, it } from "vitest";
import { code128, qr } from "@/modules/outbound/barcodes/encode";
import { code128Rects, qrRects } from "@/modules/outbound/barcodes/vectors";
import { FONT_FOLDER, fontFamilies } from "./font-files";
import { renderPdf } from "./render";

const creationDate = new Date("2026-03-14T16:20:00Z");
const tag = (text = "WO-1042-1"): TDocumentDefinitions => ({
  pageSize: { width: 288, height: 180 },
  pageMargins: 12,
  info: { title: text },
  defaultStyle: { font: "SpecialGothic", fontSize: 9 },
  compress: false,
  content: [{ text, font: "NationalPark", bold: true }, { canvas: qrRects(qr(text), 90) }, { canvas: code128Rects(code128(text), 200, 30) }],
});

describe("a document", () => {
  it("comes out the same for the same definition and date, and only then", async () => {
    const first = await renderPdf(tag(), { creationDate });
    expect(first.subarray(0, 5).toString("latin1")).toBe("%PDF-");
    expect(first.equals(await renderPdf(tag(), { creationDate }))).toBe(true);
    expect(first.equals(await renderPdf(tag(), { creationDate: new Date("2026-03-15T00:00:00Z") }))).toBe(false);
    expect(first.equals(await renderPdf(tag("WO-1042-2"), { creationDate }))).toBe(false);
  });
  it("carries its fonts, its date, and codes as drawings instead of pictures", async () => {
    const text = (await renderPdf(tag(), { creationDate })).toString("latin1");
    expect(text).toContain("/FontFile2");
    expect(text).toContain("(D:20260314162000Z)");
    expect(text).not.toContain("/Subtype /Image");
    const rects = qrRects(qr("WO-1042-1"), 90).length + code128Rects(code128("WO-1042-1"), 200, 30).length;
    expect(text.match(/ re\n/g)?.length).toBeGreaterThanOrEqual(rects);
  });
  it("is refused when it names a file, an address or a vector file", async () => {
    for (const content of [{ image: "/etc/hostname" }, { image: "http://127.0.0.1:1/a.png" }, { svg: "<svg/>" }]) {
      await expect(renderPdf({ content, defaultStyle: { font: "SpecialGothic" } }, { creationDate })).rejects.toThrow(/not allowed|only inline/);
    }
  });
  it("is refused for a font that is not there", async () => {
    await expect(renderPdf({ content: "x", defaultStyle: { font: "Nowhere" } }, { creationDate })).rejects.toThrow("Nowhere");
  });
});

describe("the fonts", () => {
  it("are all known by family and cut", () => {
    const families = fontFamilies(FONT_FOLDER);
    const files = readdirSync(FONT_FOLDER).filter((n) => n.endsWith(".ttf"));
    const used = new Set(Object.values(families).flatMap((f) => Object.values(f).map((p) => String(p).split("/").at(-1))));
    expect([...used].sort()).toEqual(files.sort());
  });
  it("need a regular cut and a plain name", () => {
    expect(() => fontFamilies("/x", ["A-Bold.ttf"])).toThrow("no Regular");
    expect(() => fontFamilies("/x", ["A.ttf"])).toThrow("name it");
    expect(() => fontFamilies("/x", [])).toThrow("no fonts");
    expect(fontFamilies("/x", ["A-Regular.ttf", "A-Bold.ttf"])).toEqual({ A: { normal: "/x/A-Regular.ttf", bold: "/x/A-Bold.ttf", italics: "/x/A-Regular.ttf", bolditalics: "/x/A-Bold.ttf" } });
  });
});
