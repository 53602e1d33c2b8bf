import type { TDocumentDefinitions } from "pdfmake/interfaces";

/** Only pictures that we made ourselves, inline: no address, no path, no vector file. */
const INLINE = /^data:image\/(?:png|jpeg);base64,[A-Za-z0-9+/=]+$/;

/**
 * Refuses whatever could make the renderer read a file or an address. The library's own policies stand
 * behind this; it exists because vector files have been a way around such policies before.
 * @throws Error that names the place
 */
function checkDefinition(node: unknown, images: ReadonlySet<string>, at = "document"): void {
  if (Array.isArray(node)) {
    node.forEach((child, i) => checkDefinition(child, images, `${at}.${i}`));
    return;
  }
  // Bytes and dates hold nothing to follow.
  if (typeof node !== "object" || node === null || ArrayBuffer.isView(node) || node instanceof Date) return;
  for (const [name, value] of Object.entries(node)) {
    if (value === undefined || typeof value === "function") continue;
    const place = `${at}.${name}`;
    if (name === "svg") throw new Error(`${place}: vector files are not allowed in documents`);
    if (name === "image") {
      if (typeof value !== "string" || !(images.has(value) || INLINE.test(value))) throw new Error(`${place}: only inline PNG or JPEG pictures`);
      continue;
    }
    checkDefinition(value, images, place);
  }
}

type Dynamic = "header" | "footer" | "background";

/** The definition with every picture checked, also in the parts that are made page by page. */
export function allowedDefinition(definition: TDocumentDefinitions): TDocumentDefinitions {
  const { images = {}, files, attachments, ...rest } = definition as TDocumentDefinitions & { files?: unknown; attachments?: unknown };
  if (files !== undefined || attachments !== undefined) throw new Error("document: attached files are not allowed");
  for (const [name, value] of Object.entries(images)) {
    if (typeof value !== "string" || !INLINE.test(value)) throw new Error(`document.images.${name}: only inline PNG or JPEG pictures`);
  }
  const known = new Set(Object.keys(images));
  checkDefinition(rest, known);
  const wrapped: Record<string, unknown> = {};
  for (const part of ["header", "footer", "background"] satisfies Dynamic[]) {
    const make: unknown = rest[part];
    if (typeof make !== "function") continue;
    wrapped[part] = (...args: unknown[]): unknown => {
      const made: unknown = Reflect.apply(make, undefined, args);
      checkDefinition(made, known, `document.${part}`);
      return made;
    };
  }
  return { ...rest, images, ...wrapped };
}
