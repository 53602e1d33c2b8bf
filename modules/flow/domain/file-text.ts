export type TextEncoding = "UTF-8" | "UTF-16" | "Windows-1252";

/**
 * Text of a file by its marks: a byte-order mark first, then strict UTF-8, else Windows-1252, which reads every byte.
 * Sources: Unicode Standard section 23.8 (byte order mark); WHATWG Encoding Standard (decoders).
 */
export function decodeText(bytes: Uint8Array): { text: string; encoding: TextEncoding } {
  const [a, b, c] = bytes;
  if (a === 0xff && b === 0xfe) return { text: new TextDecoder("utf-16le").decode(bytes.subarray(2)), encoding: "UTF-16" };
  if (a === 0xfe && b === 0xff) return { text: new TextDecoder("utf-16be").decode(bytes.subarray(2)), encoding: "UTF-16" };
  const body = a === 0xef && b === 0xbb && c === 0xbf ? bytes.subarray(3) : bytes;
  try {
    return { text: new TextDecoder("utf-8", { fatal: true }).decode(body), encoding: "UTF-8" };
  } catch {
    return { text: new TextDecoder("windows-1252").decode(body), encoding: "Windows-1252" };
  }
}
