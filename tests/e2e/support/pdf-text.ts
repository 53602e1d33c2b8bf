import { inflateSync } from "node:zlib";

/**
 * The words of a PDF that pdfmake made, page by page in drawing order on one line, without another program. Fonts are embedded with
 * their own glyph numbers; the map of each font back to characters (its ToUnicode table, ISO 32000-1, 9.10.3) is read.
 */
export function textOfPdf(file: Buffer): string {
  const objects = objectsOf(file.toString("latin1"));
  const streamOf = (id: number): string => unpacked(objects.get(id) ?? "");
  const mapOfFont = new Map<number, Map<string, string>>();
  for (const [id, body] of objects) {
    const to = /\/ToUnicode (\d+) 0 R/.exec(body);
    if (to) mapOfFont.set(id, charactersOf(streamOf(Number(to[1]))));
  }
  const text: string[] = [];
  for (const body of objects.values()) {
    if (!/\/Type \/Page\b(?!s)/.test(body)) continue;
    const resources = inlineOrReferred(body, "Resources", objects);
    const fonts = inlineOrReferred(resources, "Font", objects);
    const fontOf = new Map([...fonts.matchAll(/\/(\w+) (\d+) 0 R/g)].map((m) => [m[1] ?? "", mapOfFont.get(Number(m[2])) ?? new Map<string, string>()]));
    const contents = /\/Contents (\d+) 0 R/.exec(body);
    if (contents) text.push(drawn(streamOf(Number(contents[1])), fontOf));
  }
  return text.join("\n").replace(/\s+/g, " ");
}

function objectsOf(raw: string): Map<number, string> {
  const found = new Map<number, string>();
  for (const m of raw.matchAll(/(?:^|\n)(\d+) 0 obj\r?\n([\s\S]*?)\r?\nendobj/g)) found.set(Number(m[1]), m[2] ?? "");
  return found;
}

function unpacked(body: string): string {
  const at = /stream\r?\n/.exec(body);
  if (!at) return "";
  const bytes = Buffer.from(body.slice(at.index + at[0].length, body.lastIndexOf("endstream")), "latin1");
  return /\/FlateDecode/.test(body.slice(0, at.index)) ? inflateSync(bytes, { finishFlush: 2 }).toString("latin1") : bytes.toString("latin1");
}

function inlineOrReferred(body: string, key: string, objects: Map<number, string>): string {
  const referred = new RegExp(`/${key} (\\d+) 0 R`).exec(body);
  if (referred) return objects.get(Number(referred[1])) ?? "";
  const at = body.indexOf(`/${key} <<`);
  return at < 0 ? "" : body.slice(at);
}

/** Glyph (hex) to character. */
function charactersOf(table: string): Map<string, string> {
  const map = new Map<string, string>();
  const hex = (code: string) => String.fromCodePoint(...(code.match(/.{4}/g) ?? []).map((u) => parseInt(u, 16)));
  for (const range of table.matchAll(/beginbfrange([\s\S]*?)endbfrange/g)) {
    for (const m of (range[1] ?? "").matchAll(/<([0-9a-fA-F]+)>\s*<([0-9a-fA-F]+)>\s*(?:\[([^\]]*)\]|<([0-9a-fA-F]+)>)/g)) {
      const from = parseInt(m[1] ?? "0", 16);
      const listed = [...(m[3] ?? "").matchAll(/<([0-9a-fA-F ]+)>/g)].map((x) => (x[1] ?? "").replace(/ /g, ""));
      const to = parseInt(m[2] ?? "0", 16);
      for (let code = from; code <= to; code += 1) {
        const listedCode = listed[code - from];
        const character = listedCode === undefined ? (m[4] === undefined ? "" : String.fromCodePoint(parseInt(m[4], 16) + code - from)) : hex(listedCode);
        map.set(code.toString(16).padStart(4, "0"), character);
      }
    }
  }
  for (const single of table.matchAll(/beginbfchar([\s\S]*?)endbfchar/g)) {
    for (const m of (single[1] ?? "").matchAll(/<([0-9a-fA-F]+)>\s*<([0-9a-fA-F]+)>/g)) map.set((m[1] ?? "").toLowerCase().padStart(4, "0"), hex(m[2] ?? ""));
  }
  return map;
}

/** Text of a page's drawing: a line for each text object. */
function drawn(content: string, fontOf: Map<string, Map<string, string>>): string {
  const lines: string[] = [];
  for (const block of content.matchAll(/BT([\s\S]*?)ET/g)) {
    let font = new Map<string, string>();
    let line = "";
    for (const m of (block[1] ?? "").matchAll(/\/(\w+) [\d.]+ Tf|<([0-9a-fA-F]+)>/g)) {
      if (m[1] !== undefined) font = fontOf.get(m[1]) ?? font;
      else for (const glyph of (m[2] ?? "").toLowerCase().match(/.{4}/g) ?? []) line += font.get(glyph) ?? "";
    }
    lines.push(line);
  }
  return lines.join("\n");
}
