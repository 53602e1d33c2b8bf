// The named export of the same name draws the symbology called "raw"; the encoder is on the default export.
import bwip from "bwip-js/node";

// `parse` only makes the object one that the library's types accept: they leave out what one symbology needs.
const QR_OPTIONS = { eclevel: "M", parse: false };

/** A square of modules, row by row; true = dark. Without quiet zone. */
export interface Matrix {
  readonly size: number;
  readonly dark: readonly boolean[];
}

/** Bars and spaces in modules, first a bar. Without quiet zone. */
export interface Bars {
  readonly widths: readonly number[];
  readonly modules: number;
}

/**
 * QR code, error level M (about 15 % of the symbol may be lost).
 * Source: ISO/IEC 18004. At most 300 characters here, so that a label stays readable.
 * @throws RangeError when the text is empty or too long
 */
export function qr(text: string): Matrix {
  if (text.length === 0 || text.length > 300) throw new RangeError("a QR text has 1 to 300 characters");
  const [symbol] = bwip.raw("qrcode", text, QR_OPTIONS);
  if (symbol === undefined || !("pixs" in symbol) || symbol.pixx !== symbol.pixy) throw new Error("the QR encoder gave no square");
  return { size: symbol.pixx, dark: symbol.pixs.map((p) => p === 1) };
}

/**
 * Code 128 of printable ASCII, at most 48 characters.
 * Source: ISO/IEC 15417.
 * @throws RangeError when a character can't be encoded
 */
export function code128(text: string): Bars {
  if (!/^[\x20-\x7e]{1,48}$/.test(text)) throw new RangeError("a Code 128 text has 1 to 48 plain characters");
  const [symbol] = bwip.raw({ bcid: "code128", text });
  if (symbol === undefined || !("sbs" in symbol)) throw new Error("the Code 128 encoder gave no bars");
  return { widths: symbol.sbs, modules: symbol.sbs.reduce((a, b) => a + b, 0) };
}
