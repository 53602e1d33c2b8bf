import type { TDocumentDefinitions } from "pdfmake/interfaces";
import { describe, expect, it } from "vitest";
import { allowedDefinition } from "./allowed";

const png = "data:image/png;base64,iVBORw0KGgo=";

describe("what may be in a document", () => {
  it("takes text, tables, drawings and inline pictures", () => {
    const definition: TDocumentDefinitions = {
      images: { logo: png },
      content: [
        "plain",
        { table: { body: [["a", { image: "logo" }]] } },
        { canvas: [{ type: "line", x1: 0, y1: 0, x2: 9, y2: 9 }] },
        { image: png },
      ],
      footer: (page) => ({ text: String(page) }),
    };
    const allowed = allowedDefinition(definition);
    expect(allowed.content).toBe(definition.content);
    expect((allowed.footer as (n: number) => unknown)(3)).toEqual({ text: "3" });
  });

  it.each([
    ["a vector file", { content: { svg: "<svg/>" } }, "vector"],
    ["a vector file deep down", { content: [{ stack: [{ columns: [{ svg: "<svg/>" }] }] }] }, "content.0.stack.0.columns.0.svg"],
    ["a path", { content: { image: "/etc/passwd" } }, "inline"],
    ["an address", { content: { image: "https://example.com/a.png" } }, "inline"],
    ["an inline vector file", { content: { image: "data:image/svg+xml;base64,PHN2Zy8+" } }, "inline"],
    ["an address by name", { images: { logo: "https://example.com/a.png" }, content: "x" }, "images.logo"],
    ["an address with headers", { images: { logo: { url: "https://example.com/a.png" } }, content: "x" }, "images.logo"],
    ["a vector file in the background", { content: "x", background: { svg: "<svg/>" } }, "background"],
    ["an attached file", { content: "x", files: { a: { src: "/etc/passwd" } } }, "attached"],
  ])("refuses %s", (_what, definition, where) => {
    expect(() => allowedDefinition(definition as unknown as TDocumentDefinitions)).toThrow(where);
  });

  it("refuses a path in a part that is made page by page", () => {
    const allowed = allowedDefinition({ content: "x", header: () => ({ image: "/etc/passwd" }) });
    expect(() => (allowed.header as () => unknown)()).toThrow("inline");
  });
});
